import type { Answered } from '../stranded'

/** A dirt bike whose front brake lever feels like rubber because the old hose swells. */
export const SOFT_BRAKE: Answered = {
  // Nearly to the grip is not all the way, and it was soft before it was bled.
  conditions: ['spongy'],
  ends: {
    // Long and soft, and it stays a finger off the grip; pumping does not lift it, but no other outcome is nearer.
    leverHold: 'soft',
    // The front wheel slows and does not lock; the rear holds.
    brakePushTest: 'creeps',
  },
  swaps: {},
  cannot: [],
}
