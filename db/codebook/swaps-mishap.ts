import type { SwapItem } from '@/lib/model/code-book'
import { HOT_ENGINE } from './cautions'
import { KICKS_BACK, OIL_STOP, STOP_SWITCH_FIRST, WOUND_SPRING } from './cautions-mishap'
import { GUESS } from './sources'

const step = (text: string) => ({ text, caution: null })

/** Swaps with a known-good part, in the order fit, refit, fit; figures as in the first swaps. */
export const MISHAP_SWAPS: SwapItem[] = [
  {
    kind: 'swap',
    id: 'throttleCableSwap',
    name: 'Swap the throttle cable',
    fault: 'throttleCableSticks',
    part: 'throttleCable',
    gate: { electronicThrottle: ['no'] },
    minutes: 45,
    setups: ['tankCoverOff', 'throttleHousingOpen'],
    guideSafe: false,
    cautions: [STOP_SWITCH_FIRST, HOT_ENGINE],
    steps: [
      step('Engine off. Snap the throttle with the old cable. Make sure it sticks now.'),
      step('Note how the old cable runs. Take a photo.'),
      step('Lay the good cable beside it and hook it up at both ends. Set the slack.'),
      step('Snap it ten times, bars both ways. Record: sticks or free.'),
      step('Hook the old one up again. Record: sticks again or still free.'),
      step('Fit the good cable for keeps, on the old path, and set the slack.'),
    ],
    table: {
      throttleCableSticks: [5, 9, 86],
      throttleCableTight: [38, 50, 12],
      throttleIced: [48, 46, 6],
      gripBinds: [78, 19, 3],
      slideStuck: [90, 9, 1],
      throttleSpringBroken: [94, 5, 1],
    },
    otherwise: [88, 11, 1],
    basis: 'physics',
    basisWords:
      'A fault that goes and comes back with the cable is in the cable. Routing and thawing while one works cure others once.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'oilSwitchSwap',
    name: 'Swap the oil pressure switch',
    fault: 'oilLampFault',
    part: 'oilSwitch',
    gate: { strokes: ['four'], battery: ['yes'] },
    minutes: 18,
    setups: ['sidePanelOff'],
    guideSafe: false,
    cautions: [OIL_STOP, HOT_ENGINE],
    steps: [
      step(
        'Oil level right, and pressure proved by gauge. Without that proof, no swap by running.',
      ),
      step('Key off. Unplug the old switch. Turn it out, rag under it.'),
      step('Fit the good switch with its seal. Plug it in.'),
      {
        text: 'Start it for ten seconds at most. Record: lamp out or not. Lamp on: stop at once.',
        caution: {
          signal: 'WARNING',
          text: 'Neutral, brake on, nobody in front. Open air only: exhaust gas kills.',
        },
      },
      step('Key off. Old switch in again. Start it for ten seconds. Record: lamp back or not.'),
      step('Key off. Good switch in for keeps. Look for oil at it.'),
    ],
    table: {
      oilLampFault: [24, 18, 58],
      waterInElectrics: [64, 33, 3],
      oilPumpFailed: [96, 3, 1],
      oilLow: [93, 6, 1],
    },
    otherwise: [90, 9, 1],
    basis: 'commonPractice',
    basisWords:
      'A lamp that goes and comes back with the switch is the switch. A broken wire, one in four, is not cured by it.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'recoilSwap',
    name: 'Swap the whole recoil with a like machine',
    fault: 'recoilPawlsStuck',
    part: 'recoilUnit',
    gate: { handStart: ['recoil'] },
    minutes: 25,
    setups: ['recoilOff'],
    guideSafe: false,
    cautions: [KICKS_BACK, WOUND_SPRING],
    steps: [
      step('Key off, stop switch to stop. Pull the old one slowly. Make sure the fault is there.'),
      step('Take the recoil off both machines, bolts kept apart.'),
      step('Fit the good one. Pull slowly ten times. Record: bites and goes back, or not.'),
      step('Fit the old one again. Record: fault back or gone.'),
      step('Fit the good one for keeps, or use it for one start and give it back.'),
    ],
    table: {
      recoilPawlsStuck: [8, 10, 82],
      recoilSpringBroken: [4, 18, 78],
      recoilRopeBroken: [3, 19, 78],
      recoilIced: [14, 56, 30],
      recoilCupLoose: [54, 22, 24],
      engineSeized: [98, 1, 1],
      hydraulicLock: [93, 5, 2],
      decompressorBad: [93, 6, 1],
    },
    otherwise: [92, 7, 1],
    basis: 'physics',
    basisWords:
      'What goes with the recoil is in the recoil; what stays is the cup or the engine. Figures are guesses.',
    source: GUESS,
  },
]
