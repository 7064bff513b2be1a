import type { Answered } from '../stranded'

/** An ATV that died in a ford with its air box full of water, hardly any of it in the cylinder and none in the oil. */
export const DROWNED: Answered = {
  // About a minute is not minutes.
  conditions: ['ranWhenIn', 'crankedSince'],
  ends: {
    waterlineLook: 'above',
    // Two litres in the box, a sodden filter, beads in the boot behind it.
    boxDrainLook: 'water',
    airFilterLook: 'blocked',
    throatLook: 'dirty',
    // A damp film, a fine mist and drops on the plug; nothing that runs.
    plugsOutWater: 'damp',
    plugRead: 'wet',
    plugWetOrDry: 'soaked',
    // Spark, compression and a dried plug are there, but it breathes through a wet filter.
    primeDrops: 'coughs',
    // One small bead in the bowl and no more after it; the tank is clear.
    fuelSample: 'doubtful',
    // Water, not petrol or oil: a cupful out of the pipe.
    tailpipeColour: 'wet',
    // Wet outside from the ford, no tracks; it does not run to be misted.
    leadCapLook: 'doubtful',
    // Tight, yet wet like all that was under.
    postsFeel: 'dirty',
    // Damp, and after a warm-up it does not slip.
    beltLook: 'worn',
  },
  swaps: {},
  // It does not start until it has been emptied and dried, and then it runs by itself.
  cannot: ['littleThrottle'],
}
