import type { Answered } from '../stranded'

/** A dirt bike that rattles at idle: the tensioner stuck half way and left the cam chain slack. */
export const RATTLES: Answered = {
  // Loudest after the start is not only in starting; a rattle, not a tick.
  conditions: ['rattleIdle'],
  ends: {
    listenRod: 'top',
    // Twelve millimetres up and down, less than half a tooth of lag.
    timingMarks: 'slack',
    tensionerLook: 'slack',
    // It idles well by itself, so with a little throttle it runs as well.
    littleThrottle: 'runs',
  },
  swaps: {},
  // It starts, so no drops of fuel; without a battery no lamp lights with the engine off.
  cannot: ['primeDrops', 'gearLampSweep'],
}
