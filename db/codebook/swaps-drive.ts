import type { SwapItem } from '@/lib/model/code-book'
import {
  BEAD_JUMPS,
  HOT_BRAKE,
  HOT_DRIVE,
  KEY_OFF_PLUG,
  KEY_OUT,
  NO_BRAKES,
  ON_STAND,
} from './cautions-drive'
import { FOUR_WHEELS, RIDDEN, WITH_NEUTRAL } from './gates-drive'
import { GUESS } from './sources'

const plain = (...texts: string[]): SwapItem['steps'] =>
  texts.map((text) => ({ text, caution: null }))

/** Swaps with a known-good part in the order fit, refit, fit; figures are guesses. */
export const DRIVE_SWAPS: SwapItem[] = [
  {
    kind: 'swap',
    id: 'beltSwap',
    name: 'Swap in the spare belt',
    fault: 'beltSlips',
    part: 'driveBelt',
    gate: { drive: ['belt'] },
    minutes: 22,
    setups: ['beltCoverOff'],
    guideSafe: false,
    cautions: [
      KEY_OUT,
      HOT_DRIVE,
      {
        signal: 'WARNING',
        text: 'It can jump forward when it takes up. Cover on, neutral or brake on at the start, nobody in front.',
      },
    ],
    steps: plain(
      'Ride a few metres with the old belt, if it still pulls. Make sure it slips now.',
      'Key out. Cover off when it is cool. Open the driven clutch and lift the belt off.',
      'Wipe both clutch faces dry. Fit the spare in its direction of run. Cover on.',
      'Ride the same few metres. Record: slips or pulls.',
      'Key out. Fit the old belt again, if it is whole. Ride. Record: slips again or not.',
      'Key out. Fit the good belt for keeps, cover on. Ride gently for ten minutes.',
    ),
    table: {
      beltSlips: [8, 14, 78],
      beltBroken: [10, 84, 6],
      clutchDrivenStuck: [60, 32, 8],
      clutchDriveStuck: [68, 26, 6],
      parkBrakeDragging: [84, 13, 3],
      handClutchSlips: [90, 9, 1],
    },
    otherwise: [86, 12, 2],
    basis: 'commonPractice',
    basisWords:
      'A fault that comes back with the old belt is in the belt. Wiping the clutches helps by itself, so gone once is not proof.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'wheelSwap',
    name: 'Swap the wheel with the other side',
    fault: 'rimBent',
    part: 'wheelRim',
    gate: FOUR_WHEELS,
    minutes: 25,
    setups: ['endRaised'],
    guideSafe: false,
    cautions: [ON_STAND, BEAD_JUMPS],
    steps: plain(
      'Note the fault: which side loses air, wobbles or pulls.',
      'That end up on stands, rest chocked. Take both wheels off.',
      'Fit them on the other sides if they are alike. Nuts crosswise, to the spec sheet.',
      'Ride a short way at walking pace. Record: has the fault moved with the wheel?',
      'Swap them back and ride again. Record: is it back on the old side?',
      'Check every nut once more.',
    ),
    table: {
      rimBent: [5, 5, 90],
      tyrePunctured: [10, 5, 85],
      tyreBeadOff: [14, 20, 66],
      valveLeaking: [12, 8, 80],
      tyreTorn: [16, 4, 80],
      wheelLoose: [48, 46, 6],
      wheelBearingWorn: [88, 10, 2],
    },
    otherwise: [91, 8, 1],
    basis: 'physics',
    basisWords:
      'A fault that moves with the wheel sits in wheel or tyre, not in hub or steering. Tightening the nuts cures a loose wheel by itself.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'gearSwitchSwap',
    name: 'Swap the gear position sensor',
    fault: 'gearPositionBad',
    part: 'gearSwitch',
    gate: WITH_NEUTRAL,
    minutes: 20,
    setups: ['sidePanelOff'],
    guideSafe: false,
    cautions: [
      KEY_OFF_PLUG,
      {
        signal: 'WARNING',
        text: 'The engine may start in gear while the sensor is off. Neutral proved by pushing, brake on, hands off the starter.',
      },
    ],
    steps: plain(
      'Key on. Make sure that the display is wrong now. Key off.',
      'Unplug the sensor. Look at the pins. Fit the known-good one to the same mark.',
      'Key on. Go through every place. Record: right or wrong.',
      'Key off. Fit the old one to the same mark. Key on. Record: wrong again or not.',
      'Key off. Fit the good one for keeps.',
    ),
    table: {
      gearPositionBad: [6, 16, 78],
      shiftLinkageOff: [82, 15, 3],
      parkOrRangeNotEngaged: [84, 14, 2],
      keySwitchHarness: [70, 28, 2],
    },
    otherwise: [88, 11, 1],
    basis: 'commonPractice',
    basisWords:
      'A fault that comes back with the old sensor was in it. Setting it anew and wiping the plug also cure some.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'padSwap',
    name: 'Swap in good brake pads',
    fault: 'brakePadsOiled',
    part: 'padSet',
    gate: RIDDEN,
    minutes: 35,
    setups: ['caliperOff'],
    guideSafe: false,
    cautions: [HOT_BRAKE, NO_BRAKES],
    steps: plain(
      'Push the machine against the brake. Make sure that it does not bite now.',
      'Chock it. Let it cool. Pads out. Look at lining and backs.',
      'Clean the disc with brake cleaner, wipe it dry. Fit the good pads.',
      'Pump until the lever is firm. Push against the brake. Record: bites or not.',
      'Old pads back only if they are thick and not on the steel. Push again. Record.',
      'Fit the good pads for keeps and pump the lever firm. Try them at walking pace.',
    ),
    table: {
      brakePadsOiled: [10, 24, 66],
      brakePadsGone: [8, 80, 12],
      brakeIced: [34, 64, 2],
      caliperSeized: [72, 24, 4],
      brakeAirBoiled: [86, 13, 1],
      masterPassing: [92, 7, 1],
    },
    otherwise: [84, 14, 2],
    basis: 'commonPractice',
    basisWords:
      'Oil soaked into the old pads comes back with them. A cleaned disc helps by itself, so gone once is not proof.',
    source: GUESS,
  },
]
