import type { SwapItem } from '@/lib/model/code-book'
import { BATTERY_GAS } from './cautions'
import { BRIDGE_BURNS, JUMP_RULES, MAY_CRANK, NO_SECOND_CRANK } from './cautions-start'
import { GUESS } from './sources'

const step = (text: string) => ({ text, caution: null })
const pressed = (text: string) => ({ text, caution: MAY_CRANK })

/** Swaps with a known-good part, in the order fit, refit, fit; figures as in the first swaps. */
export const START_SWAPS: SwapItem[] = [
  {
    kind: 'swap',
    id: 'starterRelaySwap',
    name: 'Swap the starter relay',
    fault: 'starterRelayFault',
    part: 'starterRelayUnit',
    gate: { battery: ['yes'], electricStart: ['yes'] },
    minutes: 15,
    setups: ['seatOff'],
    guideSafe: false,
    cautions: [NO_SECOND_CRANK, BATTERY_GAS, BRIDGE_BURNS, MAY_CRANK],
    steps: [
      pressed('Press start with the old relay. Make sure the fault is there now.'),
      step('Key off. Minus cable off the battery. Photo of the relay and its wires.'),
      step('Fit the good relay, same kind and pins. Nuts snug. Minus cable on last.'),
      pressed('Neutral, brake held. Press start five times. Record: cranks or not, each time.'),
      step('Minus off. Old relay in again, nuts as snug. Minus on.'),
      pressed('Press start five times. Record: fault back or still gone.'),
      step('Minus off. Good relay in for keeps. Minus on, boots over the nuts.'),
    ],
    table: {
      starterRelayFault: [6, 12, 82],
      batteryTerminalLoose: [40, 56, 4],
      startButtonFault: [78, 20, 2],
      interlockOpen: [84, 14, 2],
      waterInElectrics: [66, 28, 6],
      starterMotorWorn: [80, 18, 2],
      groundPoor: [70, 28, 2],
      mainFuseOpen: [80, 18, 2],
    },
    otherwise: [90, 9, 1],
    basis: 'physics',
    basisWords:
      'A fault that goes with the relay and comes back with the old one is in it. Nuts and plugs made tight on the way cure others once.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'batterySwap',
    name: 'Swap the battery for a charged good one',
    fault: 'batteryFailed',
    part: 'battery12V',
    gate: { battery: ['yes'] },
    minutes: 14,
    setups: ['seatOff'],
    guideSafe: false,
    cautions: [BATTERY_GAS, JUMP_RULES, BRIDGE_BURNS, NO_SECOND_CRANK],
    steps: [
      step('Charge the old one first if you can: an empty battery is not a failed one.'),
      pressed('Key on, press start two seconds with the old one. Make sure the fault is there.'),
      step('Key off. Minus off first, then plus. Clean posts and clamps bright.'),
      step('Good one of the same kind, posts the same way round. Plus first, minus last.'),
      pressed('Neutral, brake held. Key on, press start. Record: fault there or gone.'),
      step('Key off. Charged old one in again the same way. Record: fault back or still gone.'),
      step('Good one in for keeps, strap on. Then check that it is charged while running.'),
    ],
    table: {
      batteryFailed: [3, 5, 92],
      batteryLow: [5, 51, 44],
      parasiticDrain: [5, 66, 29],
      batteryTerminalLoose: [22, 74, 4],
      groundPoor: [70, 26, 4],
      starterMotorWorn: [76, 16, 8],
      waterInElectrics: [84, 13, 3],
    },
    otherwise: [93, 6, 1],
    basis: 'physics',
    basisWords:
      'With the old one charged before it goes back, only a worn one fails again. Clamps made bright cure others once.',
    source: GUESS,
  },
]
