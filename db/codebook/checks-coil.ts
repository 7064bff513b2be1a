import type { CheckItem } from '@/lib/model/code-book'
import { HIGH_VOLTAGE, HOT_ENGINE, KEY_OFF } from './cautions'
import { GUESS, PRACTICE } from './sources'

/** The coil's own circuit: a look that costs nothing, its winding, its feed. */
export const COIL_CHECKS: CheckItem[] = [
  {
    kind: 'check',
    id: 'coilConnectorLook',
    name: 'Coil connector: look and tug',
    purpose: 'Finds a loose, green or pushed-back pin and a chafed wire before any part is blamed.',
    gate: {},
    people: 1,
    onePersonWay: null,
    roles: ['mechanic', 'guide'],
    guideSafe: true,
    light: 'lampEnough',
    weather: 'Keep snow and rain out of the open plug.',
    setups: ['sidePanelOff', 'coilPlugOff'],
    tools: [{ tool: 'lamp', accuracy: null }],
    machineState: 'off',
    mayMoveMachine: false,
    minutes: 4,
    costMinor: 0,
    steps: [
      {
        text: 'Key off. Let the coil cool if you cannot keep a hand on it.',
        caution: HOT_ENGINE,
      },
      { text: 'Press the lock and pull the plug off the coil, not the wires.', caution: KEY_OFF },
      { text: 'Shine the lamp in. Look for green, wet, bent or pushed-back pins.', caution: null },
      { text: 'Tug each wire gently, one by one. None may slide.', caution: null },
      {
        text: 'Run your fingers along the loom to the first clamp. Feel for bare or flat spots.',
        caution: null,
      },
      { text: 'Push the plug on until it clicks.', caution: null },
    ],
    cautions: [HOT_ENGINE],
    record: 'What you saw, and a photo of the open plug.',
    outcomes: [
      { id: 'sound', name: 'Clean, dry, tight', good: true },
      { id: 'doubtful', name: 'Dirty or damp, nothing loose', good: false },
      { id: 'badPin', name: 'Loose, green or pushed-back pin, or chafed wire', good: false },
    ],
    table: {
      ignitionCoilWiring: [30, 25, 45],
      ignitionCoilSupply: [75, 15, 10],
    },
    otherwise: [84, 13, 3],
    expected: [{ words: 'Bright pins, no water, no wire that slides.', source: PRACTICE }],
    reading: null,
    passDoesNotProve:
      'A pin can look right and still lose contact when it shakes; a wire can be broken inside its cover.',
    stopWhen: 'Burnt or melted plastic: stop, find out why before power goes on again.',
    basis: 'commonPractice',
    basisWords:
      'Guess: about half of bad coil plugs show it to the eye; sound ones seldom look bad.',
    source: GUESS,
  },
  {
    kind: 'check',
    id: 'coilPrimaryResistance',
    name: 'Coil primary resistance',
    purpose:
      'Finds an open or plainly shorted primary winding. It seldom proves a coil good or bad.',
    gate: {},
    people: 1,
    onePersonWay: null,
    roles: ['mechanic'],
    guideSafe: false,
    light: 'lampEnough',
    weather: null,
    setups: ['sidePanelOff', 'coilPlugOff'],
    tools: [
      {
        tool: 'multimeter',
        accuracy:
          'For half an ohm: 0.3 % + 2 digits at 0.01 ohm steps with the leads nulled, or four-wire',
      },
    ],
    machineState: 'off',
    mayMoveMachine: false,
    minutes: 5,
    costMinor: 0,
    steps: [
      { text: 'Key off. Unplug the coil.', caution: KEY_OFF },
      {
        text: 'Feel the coil: cold, hand-warm or hot. Write down its temperature.',
        caution: HOT_ENGINE,
      },
      {
        text: 'Meter on ohms, lowest range. Hold the probes together and note what the leads show.',
        caution: null,
      },
      {
        text: 'Put the probes on the two primary pins of the coil itself. Press hard.',
        caution: null,
      },
      { text: 'Wait until the figure stands still. Record it as shown.', caution: null },
      { text: 'Plug the coil in again until it clicks.', caution: null },
    ],
    cautions: [HIGH_VOLTAGE],
    record: 'The figure as shown, leads nulled or not, and the coil temperature.',
    outcomes: [
      { id: 'in', name: 'Within limits', good: true },
      { id: 'tooClose', name: 'Too close to call', good: false },
      { id: 'outLow', name: 'Below limits', good: false },
      { id: 'outHigh', name: 'Above limits or open', good: false },
    ],
    table: {
      ignitionCoilPart: [19, 71, 4, 6],
    },
    otherwise: [20, 78, 1, 1],
    expected: [
      {
        words: "The maker's figure at 20 C; copper reads about 4 % more for each 10 C above.",
        source: 'IEC 60028 copper coefficient 0.00393 per C',
      },
      {
        words:
          'On some coils a good one and a failed one read the same. Resistance alone does not convict.',
        source: PRACTICE,
      },
    ],
    reading: {
      quantity: 'resistance',
      component: 'ignitionCoil1',
      value: 'primaryResistance',
      fallback: null,
      good: [{ weight: 1, from: 0.9, to: 1.1 }],
      byFault: {
        ignitionCoilPart: [
          { weight: 0.86, from: 0.9, to: 1.1 },
          { weight: 0.06, from: 0.6, to: 0.9 },
          { weight: 0.03, from: 0, to: 0.3 },
          { weight: 0.05, from: 200, to: 2000000 },
        ],
      },
    },
    passDoesNotProve:
      'A coil can read right cold and fail hot or under high voltage. Wiring, supply and driver are not in this reading at all: it is taken at the coil.',
    stopWhen: null,
    basis: 'commonPractice',
    basisWords:
      'Guess: most failed coils read like good ones on an ohmmeter; about one in twenty is open, fewer are plainly shorted. The table is for an ordinary pocket meter.',
    source: GUESS,
  },
  {
    kind: 'check',
    id: 'coilSupplyDrop',
    name: 'Volts lost on the way to the coil, under load',
    purpose: 'Shows whether the feed of the coil can carry current, not only show volts.',
    gate: { coilType: ['inductive'], battery: ['yes'] },
    people: 1,
    onePersonWay: null,
    roles: ['mechanic'],
    guideSafe: false,
    light: 'lampEnough',
    weather: 'Not in rain with the plug open.',
    setups: ['sidePanelOff', 'coilPlugOff'],
    tools: [
      { tool: 'multimeter', accuracy: '0.5 % + 2 digits, 0.01 V steps' },
      { tool: 'loadBulb', accuracy: null },
      { tool: 'backProbes', accuracy: null },
    ],
    machineState: 'keyOn',
    mayMoveMachine: false,
    minutes: 6,
    costMinor: 0,
    steps: [
      { text: 'Key off. Unplug the coil.', caution: KEY_OFF },
      { text: 'Find the feed pin on the wire side, from the spec sheet.', caution: null },
      {
        text: 'Put the bulb between the feed pin and bare engine metal.',
        caution: {
          signal: 'NOTICE',
          text: 'The feed pin only. A bulb on the control wire or on any sensor wire can kill the module.',
        },
      },
      { text: 'Meter on volts. Red on battery plus, black on the feed pin.', caution: null },
      {
        text: 'Key on. The bulb must light. Read the volts at once, while it is lit: some relays let go after two seconds.',
        caution: HIGH_VOLTAGE,
      },
      { text: 'Key off. Bulb off. Plug the coil in until it clicks.', caution: null },
    ],
    cautions: [HIGH_VOLTAGE],
    record: 'The volts lost, and whether the bulb was bright.',
    outcomes: [
      { id: 'in', name: 'Half a volt or less lost', good: true },
      { id: 'tooClose', name: 'Too close to call', good: false },
      { id: 'outHigh', name: 'More than half a volt lost, or bulb dark', good: false },
    ],
    table: {
      ignitionCoilSupply: [8, 8, 84],
      keySwitchHarness: [40, 12, 48],
      mainRelayFault: [35, 12, 53],
      ignitionCoilWiring: [78, 6, 16],
    },
    otherwise: [93, 4, 3],
    expected: [
      {
        words: 'At most 0.5 V from battery plus to the coil feed with a 21 W bulb on it.',
        source: PRACTICE,
      },
    ],
    reading: {
      quantity: 'dcVoltage',
      component: 'ignitionCoil1',
      value: 'supplyDrop',
      fallback: { low: null, high: 0.5, unit: 'V', source: PRACTICE },
      good: [{ weight: 1, from: 0.05, to: 0.8 }],
      byFault: {
        ignitionCoilSupply: [
          { weight: 0.12, from: 0.05, to: 0.9 },
          { weight: 0.5, from: 1.1, to: 8 },
          { weight: 0.38, from: 20, to: 26 },
        ],
        keySwitchHarness: [
          { weight: 0.46, from: 0.05, to: 0.9 },
          { weight: 0.44, from: 1.1, to: 8 },
          { weight: 0.1, from: 20, to: 26 },
        ],
        mainRelayFault: [
          { weight: 0.42, from: 0.05, to: 0.9 },
          { weight: 0.43, from: 1.1, to: 8 },
          { weight: 0.15, from: 20, to: 26 },
        ],
        ignitionCoilWiring: [
          { weight: 0.82, from: 0.05, to: 0.9 },
          { weight: 0.12, from: 1.1, to: 8 },
          { weight: 0.06, from: 20, to: 26 },
        ],
      },
    },
    passDoesNotProve:
      'A feed that is good now can fail when it shakes; it says nothing about the coil or the driver.',
    stopWhen: 'A fuse blows when the bulb goes on: stop, the feed is shorted.',
    basis: 'physics',
    basisWords:
      'Volts are lost where resistance is. The shares of bad feeds that show it are guesses.',
    source: GUESS,
  },
]
