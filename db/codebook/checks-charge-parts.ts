import type { CheckItem } from '@/lib/model/code-book'
import { KEY_OFF, MONOXIDE, MOVING_PARTS } from './cautions'
import { HOT_REGULATOR, SPEED_CAP, STATOR_SHOCK } from './cautions-charge'
import { check } from './draft'
import { PRACTICE } from './sources'

/** Stator and regulator, each by itself. */
export const CHARGE_PART_CHECKS: CheckItem[] = [
  check({
    id: 'statorLegs',
    name: 'Stator legs: alike, and none to ground',
    purpose: 'Finds a stator winding that is open or touches the engine.',
    gate: {},
    setups: ['sidePanelOff'],
    tools: [['multimeter', '1 % + 3 digits, leads touched first']],
    minutes: 6,
    steps: [
      ['Key off, engine off. Part the plug from the stator.', KEY_OFF],
      'Touch the leads together. Note what they read by themselves.',
      'Measure between each two of the thick wires: three figures, or one.',
      'Measure from each wire to bare engine metal: it must read open.',
      'Turn the plug and its cable while you read the last one.',
    ],
    cautions: [KEY_OFF, HOT_REGULATOR],
    record: 'Three figures, the leads alone, each wire to ground, hot or cold.',
    outcomes: [
      ['alike', 'All alike, none to ground'],
      ['odd', 'One differs from the others'],
      ['ground', 'One is open, or touches ground'],
    ],
    table: {
      statorFault: [21, 20, 59],
      chargingPlugBurnt: [66, 19, 15],
    },
    otherwise: [93, 6, 1],
    expected: [
      {
        words: 'Three figures alike within the reach of the meter; open to engine metal.',
        source: PRACTICE,
      },
      {
        words: 'Below one ohm a pocket meter shows an open leg, not a few shorted turns.',
        source: PRACTICE,
      },
    ],
    passDoesNotProve: 'Shorted turns read alike; a winding may open only when hot.',
    basis: 'physics',
    basisWords: 'Copper that is whole reads alike in each leg. Shares are guesses.',
  }),
  check({
    id: 'statorVoltsRunning',
    name: 'Stator volts, leg against leg, running',
    purpose: 'Shows whether the stator makes its share in every leg under way.',
    gate: { battery: ['yes'] },
    people: 2,
    onePersonWay: 'Fix the probes before each start, then work the throttle only.',
    light: 'daylight',
    setups: ['sidePanelOff'],
    tools: [['multimeter', 'AC volts, 2 %'], 'backProbes'],
    machineState: 'runningNeutral',
    mayMoveMachine: true,
    minutes: 9,
    steps: [
      ['Engine off. Part the stator plug. Fix both probes in two of its pins.', STATOR_SHOCK],
      ['Meter on AC volts, highest range. Hands off. Brake on, start it.', SPEED_CAP],
      'It will not start with this plug off? Plug it in and stop here: that tells nothing of the stator.',
      'Read at idle, then at one steady speed under where it pulls.',
      ['Stop it before you move a probe. Do the next two pairs.', STATOR_SHOCK],
    ],
    cautions: [STATOR_SHOCK, SPEED_CAP, MOVING_PARTS, MONOXIDE],
    record: 'AC volts of each pair at the same engine speed.',
    outcomes: [
      ['alike', 'Alike in all pairs, rises with speed'],
      ['uneven', 'One pair lower by a tenth or more'],
      ['none', 'Little or nothing in a pair'],
    ],
    table: {
      statorFault: [9, 53, 38],
      chargingPlugBurnt: [76, 17, 7],
    },
    otherwise: [94, 5, 1],
    expected: [
      {
        words: 'All pairs within a tenth of each other; the sheet says how many volts.',
        source: PRACTICE,
      },
    ],
    passDoesNotProve: 'Good volts with nothing connected may still fall under load or hot.',
    stopWhen: 'It wants to pull, or a probe slips: stop switch.',
    basis: 'physics',
    basisWords: 'Legs wound alike make the same volts at the same speed. Shares are guesses.',
  }),
  check({
    id: 'regulatorDiodes',
    name: 'Regulator: one way only, pin by pin',
    purpose: 'Finds a regulator whose diodes are open or shorted.',
    gate: {},
    setups: ['sidePanelOff'],
    tools: [['multimeter', 'diode range']],
    minutes: 8,
    steps: [
      ['Key off, regulator cold. Part all of its plugs.', KEY_OFF],
      'Meter on diode range. Black on its plus pin, red on each stator pin in turn.',
      'Swap the leads and do the same. One way must be open.',
      'Do both from its ground pin or case to each stator pin.',
    ],
    cautions: [KEY_OFF, HOT_REGULATOR],
    record: 'Each pin both ways, temperature, meter used.',
    outcomes: [
      ['oneWay', 'One way only, all pins alike'],
      ['uneven', 'One pin differs'],
      ['dead', 'Both ways or no way on a pin'],
    ],
    table: {
      regulatorDead: [35, 22, 43],
      regulatorFailed: [12, 13, 75],
      regulatorOvercharges: [68, 21, 11],
      statorFault: [84, 11, 5],
    },
    otherwise: [90, 9, 1],
    expected: [
      {
        words: 'About 0.4 to 0.7 V one way, open the other. Some kinds differ: see the sheet.',
        source: PRACTICE,
      },
    ],
    passDoesNotProve: 'The part that regulates is not in this test, nor what heat does.',
    basis: 'commonPractice',
    basisWords: 'Guess: half of dead regulators show it on the diode range.',
  }),
]
