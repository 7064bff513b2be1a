import type { CheckItem } from '@/lib/model/code-book'
import { KEY_OFF } from './cautions'
import { MAY_CRANK } from './cautions-start'
import { check } from './draft'
import { PRACTICE } from './sources'

const GATE = { battery: ['yes'], electricStart: ['yes'] }
const OHMMETER = ['multimeter', '1 % + 3 digits'] as const

/** The switches that give or refuse the order to start, each by itself. */
export const START_SWITCH_CHECKS: CheckItem[] = [
  check({
    id: 'startButtonMeter',
    name: 'Start button by meter',
    purpose: 'Proves the button and its wire apart from all else.',
    gate: GATE,
    setups: ['frontCoverOff'],
    tools: [OHMMETER],
    minutes: 5,
    steps: [
      ['Key off. Unplug the switch block. Look for green or wet pins.', KEY_OFF],
      'Meter on ohms over the two wires of the button. Spec sheet for the colours.',
      'Press ten times. Read each press. Let go: it must open.',
      'Press and hold. Turn the bars from lock to lock. The reading must not jump.',
      'Plug it in again.',
    ],
    record: 'Ohms pressed and let go, any jump.',
    outcomes: [
      ['clean', 'Closes and opens cleanly each time'],
      ['jumps', 'Some ohms, or jumps'],
      ['dead', 'Does not close, or stays closed'],
    ],
    table: {
      startButtonFault: [8, 32, 60],
      waterInElectrics: [64, 26, 10],
      stopCircuitFault: [84, 12, 4],
    },
    otherwise: [93, 6, 1],
    expected: [
      { words: 'Below half an ohm over the leads when pressed, open when not.', source: PRACTICE },
    ],
    passDoesNotProve: 'The wire from the plug onward is not in this reading.',
    basis: 'physics',
    basisWords: 'Only the button is in the reading. Shares are guesses.',
  }),
  check({
    id: 'interlockMeter',
    name: 'Brake, clutch, neutral and seat switch by meter',
    purpose: 'Finds the one switch that does not close.',
    gate: GATE,
    setups: ['sidePanelOff'],
    tools: [OHMMETER, 'backProbes'],
    minutes: 9,
    steps: [
      ['Wheels or track chocked. Key off. Unplug one switch at a time.', KEY_OFF],
      'Meter on ohms over its two pins.',
      'Work its lever slowly, five times. When does it close: early, at the very end, never?',
      'Shake the wire. The reading must not jump.',
      'Plug it in before you go to the next. No bridge stays in.',
    ],
    cautions: [MAY_CRANK],
    record: 'Each switch: ohms worked and let go, where in the stroke.',
    outcomes: [
      ['right', 'Each closes well within the stroke'],
      ['late', 'One closes late, or jumps'],
      ['dead', 'One never closes'],
    ],
    table: {
      interlockOpen: [9, 27, 64],
      gearPositionBad: [46, 16, 38],
      parkOrRangeNotEngaged: [62, 27, 11],
      parkBrakeSwitchBad: [40, 22, 38],
      waterInElectrics: [66, 22, 12],
    },
    otherwise: [90, 8, 2],
    expected: [
      { words: 'Below half an ohm over the leads when worked, open when not.', source: PRACTICE },
    ],
    passDoesNotProve: 'The wire from the plug to relay or module is not in this reading.',
    basis: 'physics',
    basisWords: 'Only the switch is in the reading. Shares are guesses.',
  }),
]
