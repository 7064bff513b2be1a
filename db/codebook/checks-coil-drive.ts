import type { CheckItem } from '@/lib/model/code-book'
import { HIGH_VOLTAGE, KEY_OFF, MONOXIDE, MOVES, MOVING_PARTS } from './cautions'
import { GUESS, PRACTICE } from './sources'

/** What drives the coil, and whether the spark outlasts the engine. */
export const COIL_DRIVE_CHECKS: CheckItem[] = [
  {
    kind: 'check',
    id: 'coilControlWire',
    name: 'Coil control wire, both plugs off',
    purpose:
      'Parts the wire from the driver: a short that stays with the module off is in the wire.',
    gate: { coilType: ['inductive'], battery: ['yes'] },
    people: 1,
    onePersonWay: null,
    roles: ['mechanic'],
    guideSafe: false,
    light: 'lampEnough',
    weather: 'Not in rain: the module plug must stay dry.',
    setups: ['sidePanelOff', 'coilPlugOff', 'seatOff', 'modulePlugOff'],
    tools: [
      { tool: 'multimeter', accuracy: '1 % + 3 digits is enough' },
      { tool: 'backProbes', accuracy: null },
    ],
    machineState: 'keyOn',
    mayMoveMachine: false,
    minutes: 10,
    costMinor: 0,
    steps: [
      { text: 'Key off. Unplug the coil. Leave the module plugged in.', caution: KEY_OFF },
      {
        text: 'Key on. Measure volts from the control pin on the wire side to engine metal. Note it.',
        caution: HIGH_VOLTAGE,
      },
      { text: 'Key off. Measure ohms from the same pin to engine metal. Note it.', caution: null },
      {
        text: 'Key off. Unplug the control module. Key on: volts again. Key off: ohms again.',
        caution: KEY_OFF,
      },
      {
        text: 'Measure ohms along the wire, coil plug to module plug, while you move the loom.',
        caution: null,
      },
      { text: 'Key off. Plug the module in, then the coil, until they click.', caution: null },
    ],
    cautions: [
      { signal: 'NOTICE', text: 'Back probes only. Do not spread the pins of the module plug.' },
    ],
    record: 'Volts and ohms with the module plugged in and unplugged; wire end to end.',
    outcomes: [
      { id: 'clean', name: 'Near 0 V, no path to ground, wire whole', good: true },
      { id: 'withModule', name: 'Shorted only with the module plugged in', good: false },
      { id: 'inWire', name: 'Shorted with the module off too, or wire broken', good: false },
    ],
    table: {
      ignitionCoilWiring: [40, 4, 56],
      ignitionCoilDriver: [42, 52, 6],
    },
    otherwise: [94, 3, 3],
    expected: [
      {
        words:
          'Key on, coil unplugged: near 0 V on the control pin of a coil switched on its ground side.',
        source: PRACTICE,
      },
      {
        words:
          'Module unplugged: over 100 kohm to ground; wire end to end within half an ohm of the leads.',
        source: PRACTICE,
      },
    ],
    reading: null,
    passDoesNotProve: 'A driver can fail only under load or heat, and this test draws no current.',
    stopWhen:
      'Battery volts on the control pin with the module off: find the touching wire before anything is plugged in.',
    basis: 'physics',
    basisWords:
      'What goes away with the module is the module. How often each fault shows it is a guess.',
    source: GUESS,
  },
  {
    kind: 'check',
    id: 'sparkWhileItDies',
    name: 'Spark while it starts and dies',
    purpose:
      'Parts spark faults from fuel faults: does the spark stop before the engine, or after it?',
    gate: {},
    people: 2,
    onePersonWay: 'Film the tester with the phone on a stand, then look at it slowly.',
    roles: ['mechanic'],
    guideSafe: false,
    light: 'lampEnough',
    weather: 'Not in rain.',
    setups: ['sidePanelOff'],
    tools: [{ tool: 'sparkTester', accuracy: '6 to 8 mm gap' }],
    machineState: 'runningNeutral',
    mayMoveMachine: true,
    minutes: 6,
    costMinor: 0,
    steps: [
      {
        text: 'Sniff. If you smell petrol, stop and let it air first.',
        caution: {
          signal: 'DANGER',
          text: 'A spark lights petrol vapour. No open fuel line, no wet plug hole, cap on the tank.',
        },
      },
      {
        text: 'Key off. Put the tester in line between the cap and the plug, clip on engine metal.',
        caution: HIGH_VOLTAGE,
      },
      { text: 'Neutral, brake on. Stand beside the machine.', caution: MOVES },
      {
        text: 'Start it and watch the spark, not the engine, until it has died.',
        caution: MOVING_PARTS,
      },
      {
        text: 'Do it three times. Key off. Take the tester out, push the cap home.',
        caution: null,
      },
    ],
    cautions: [HIGH_VOLTAGE, MOVES, MONOXIDE],
    record: 'Spark strong to the last turn, weak, or gone before the engine stopped.',
    outcomes: [
      { id: 'stays', name: 'Strong until the engine stops turning', good: true },
      { id: 'weak', name: 'Weak, yellow or uneven', good: false },
      { id: 'stopsFirst', name: 'Stops before the engine, or none', good: false },
    ],
    table: {
      ignitionCoilPart: [8, 24, 68],
      ignitionCoilWiring: [14, 14, 72],
      ignitionCoilSupply: [10, 30, 60],
      ignitionCoilDriver: [8, 16, 76],
      coilOutputLeaks: [24, 52, 24],
      sparkPlugBad: [78, 17, 5],
      crankSensorPart: [12, 14, 74],
      crankSensorWiring: [14, 12, 74],
      stopCircuitFault: [10, 6, 84],
      tipOverTripped: [10, 4, 86],
      keySwitchHarness: [16, 12, 72],
      mainRelayFault: [22, 14, 64],
      batteryTerminalLoose: [40, 22, 38],
      batteryLow: [55, 30, 15],
      groundPoor: [52, 26, 22],
      controlModuleFault: [25, 15, 60],
    },
    otherwise: [90, 7, 3],
    expected: [
      {
        words: 'A blue spark over 6 to 8 mm on every turn until the engine stands.',
        source: PRACTICE,
      },
    ],
    reading: null,
    passDoesNotProve: 'A spark in open air can fail under compression or when hot.',
    stopWhen: 'You smell petrol, or fuel drips anywhere.',
    basis: 'physics',
    basisWords:
      'Without spark the engine stops; without fuel the spark goes on. How clearly each fault shows it is a guess.',
    source: GUESS,
  },
]
