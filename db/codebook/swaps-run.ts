import type { Caution, SwapItem } from '@/lib/model/code-book'
import { FUEL_PRESSURE, HIGH_VOLTAGE, HOT_ENGINE, KEY_OFF, VAPOUR } from './cautions'
import { GUESS } from './sources'

const STARTS: Caution = {
  signal: 'WARNING',
  text: 'The engine may start. Neutral proved by pushing, brake on, nobody in front.',
}
const step = (text: string, caution: Caution | null = null): SwapItem['steps'][number] => ({
  text,
  caution,
})

/** Swaps in the order fit, refit, fit; the good part may come from the next cylinder. Figures as in swaps.ts. */
export const RUN_SWAPS: SwapItem[] = [
  {
    kind: 'swap',
    id: 'injectorSwap',
    name: 'Swap the injector, or two of them across',
    fault: 'injectorBlocked',
    part: 'injector',
    gate: { fuelling: ['injection'] },
    minutes: 35,
    setups: ['tankCoverOff', 'railRelieved', 'injectorOut'],
    guideSafe: false,
    cautions: [FUEL_PRESSURE, VAPOUR, HOT_ENGINE, STARTS],
    steps: [
      step('Start it with the injector as it is. Note which cylinder is weak.'),
      step('Key off. Let the pressure off. Lift the injector with its seals.', FUEL_PRESSURE),
      step('Fit the good one, or the one of the next cylinder. New or whole seals, a drop of oil.'),
      step('Key on three times. Look for leaks. Wipe dry.', VAPOUR),
      step('Start it. Record: fault there, gone, or moved to the other cylinder.', STARTS),
      step('Put them back as they were. Start it. Record: back or still gone.', STARTS),
      step('Fit the good one for keeps. Look for leaks once more.', VAPOUR),
    ],
    table: {
      injectorBlocked: [10, 14, 76],
      injectorLeaking: [14, 20, 66],
      injectorCircuit: [58, 24, 18],
      fuelFilterBlocked: [88, 11, 1],
      cylinderFlooded: [60, 39, 1],
    },
    otherwise: [90, 9, 1],
    basis: 'commonPractice',
    basisWords:
      'A fault that goes with the injector and comes back with it is in the injector. Figures are guesses.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'plugSwapAcross',
    name: 'Swap the plugs of two cylinders',
    fault: 'sparkPlugBad',
    part: 'sparkPlug',
    gate: { cylinders: ['two', 'more'] },
    minutes: 10,
    setups: [],
    guideSafe: false,
    cautions: [HOT_ENGINE, HIGH_VOLTAGE, STARTS],
    steps: [
      step('Note which cylinder is weak: the cold pipe or the wet plug.'),
      step('Key off. Pull both caps by the body. Blow the dirt away. Plugs out.', HOT_ENGINE),
      step('Each plug goes into the other cylinder. By hand first, then snug. Caps home.'),
      step('Start it. Record: is the same cylinder weak, or the other one now?', STARTS),
      step('Put them back. Start it. Record: weak again where it was?', STARTS),
      step('Fit a good plug in place of the bad one.'),
    ],
    table: {
      sparkPlugBad: [9, 15, 76],
      cylinderFlooded: [40, 56, 4],
      coilOutputLeaks: [72, 24, 4],
      ignitionCoilPart: [86, 12, 2],
      lowCompression: [88, 11, 1],
    },
    otherwise: [87, 12, 1],
    basis: 'physics',
    basisWords:
      'A miss that moves with the plug is the plug. How often a miss wanders by itself is a guess.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'crankSensorSwap',
    name: 'Swap the crank position sensor',
    fault: 'crankSensorPart',
    part: 'crankSensorUnit',
    gate: {},
    minutes: 30,
    setups: ['sidePanelOff', 'crankPlugOff'],
    guideSafe: false,
    cautions: [HOT_ENGINE, KEY_OFF, STARTS],
    steps: [
      step('Try to start it with the old sensor, in the heat or cold that brings the fault.'),
      step('Key off. Unplug it. Note the gap and the way of the cable.', KEY_OFF),
      step('Fit the good sensor with the same gap. Clean iron dust off first.', HOT_ENGINE),
      step('Plug it in. Start it. Record: fault there or gone.', STARTS),
      step('Key off. Fit the old one. Start it. Record: back or still gone.', STARTS),
      step('Key off. Fit the good one for keeps, cable clear of the exhaust.'),
    ],
    table: {
      crankSensorPart: [7, 9, 84],
      crankSensorWiring: [48, 46, 6],
      triggerWheelSlipped: [84, 14, 2],
      camSensorBad: [91, 8, 1],
    },
    otherwise: [90, 9, 1],
    basis: 'commonPractice',
    basisWords:
      'Fitting it cleans plug, tip and gap as well, so gone once is not proof. Figures are guesses.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'camSensorSwap',
    name: 'Swap the cam position sensor',
    fault: 'camSensorBad',
    part: 'camSensorUnit',
    gate: { fuelling: ['injection'], strokes: ['four'] },
    minutes: 18,
    setups: ['sidePanelOff'],
    guideSafe: false,
    cautions: [HOT_ENGINE, KEY_OFF, STARTS],
    steps: [
      step('Try to start it with the old sensor. Make sure the fault is there now.', STARTS),
      step('Key off. Unplug it, turn its screw out, pull it straight.', KEY_OFF),
      step('Fit the good one with a whole ring. Plug it in.', HOT_ENGINE),
      step('Start it. Record: fault there or gone.', STARTS),
      step('Key off. Fit the old one. Start it. Record: back or still gone.', STARTS),
      step('Key off. Fit the good one for keeps.'),
    ],
    table: {
      camSensorBad: [14, 22, 64],
      camTimingSlipped: [95, 4, 1],
      sensorSupplyDown: [74, 18, 8],
      crankSensorPart: [91, 8, 1],
    },
    otherwise: [92, 7, 1],
    basis: 'commonPractice',
    basisWords:
      'Three of ten bad cam signals sit in plug or cable, which the swap cures once. Figures are guesses.',
    source: GUESS,
  },
]
