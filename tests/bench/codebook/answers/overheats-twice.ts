import type { Answered } from '../stranded'

/** A side-by-side that overheats: radiator packed with mud from behind, and the fan wire broken in its plug. */
export const OVERHEATS_TWICE: Answered = {
  conditions: ['hotWhenSlow', 'afterMudOrGrass', 'fanSilent'],
  ends: {
    // Nearly open from the front; seen from behind, two thirds of the fins let no light through.
    radiatorFaceLook: 'packed',
    // The relay works, but the wire is broken where it enters the plug: nothing reaches fan or bulb.
    fanAtKeyOn: 'silent',
    fanPlugBulb: 'dark',
    // The fan plug was under and is full of mud.
    pinsWetLook: 'wet',
    // One code, for too hot; it names no wire, yet it is neither old nor of something else.
    storedCodes: 'oneCircuit',
    // It idles well by itself, so with a little throttle it runs as well.
    littleThrottle: 'runs',
  },
  after: {
    // Fins clean, fan still dead: hot again on the same climb, only later.
    radiatorPacked: {
      fanAtKeyOn: 'silent',
      fanPlugBulb: 'dark',
      pinsWetLook: 'wet',
      storedCodes: 'oneCircuit',
      littleThrottle: 'runs',
    },
    // Wire mended and plug cleaned, fins still packed: the fan roars and it is hot all the same.
    fanCircuitFault: {
      radiatorFaceLook: 'packed',
      storedCodes: 'oneCircuit',
      littleThrottle: 'runs',
    },
  },
  swaps: {},
  // Meant for an engine that does not start, and this one starts.
  cannot: ['primeDrops'],
}
