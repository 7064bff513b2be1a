import type { Chapter } from './chapter'
import { HAND_START_CHECKS } from './checks-hand-start'
import { LEAK_CHECKS } from './checks-leaks'
import { CYLINDER_CHECKS } from './checks-mishap-cylinder'
import { ROLL_CHECKS } from './checks-mishap-roll'
import { WATER_CHECKS } from './checks-mishap-water'
import { NOISE_CHECKS } from './checks-noise'
import { NOISE_INSIDE_CHECKS } from './checks-noise-inside'
import { OIL_CHECKS } from './checks-oil'
import { OIL_FEED_CHECKS } from './checks-oil-feed'
import { THROTTLE_CHECKS } from './checks-throttle'
import { HAND_START_FAULTS } from './faults-hand-start'
import { ROLL_FAULTS } from './faults-mishap-roll'
import { WATER_FAULTS } from './faults-mishap-water'
import { NOISE_FAULTS } from './faults-noise'
import { OIL_FAULTS } from './faults-oil'
import { THROTTLE_FAULTS } from './faults-throttle'
import { MISHAP_ROWS } from './rows-mishap'
import { MISHAP_SETUPS } from './setups-mishap'
import { MISHAP_SHARES } from './shares-mishap'
import { MISHAP_SWAPS } from './swaps-mishap'
import { MISHAP_SYMPTOMS } from './symptoms-mishap'
import { MISHAP_WORDS } from './words-mishap'

/** What happened to it: stuck, submerged, rolled; throttle, noise, oil, hand start, fuel smell. */
export const MISHAP: Chapter = {
  symptoms: MISHAP_SYMPTOMS,
  faults: [
    ...WATER_FAULTS,
    ...ROLL_FAULTS,
    ...THROTTLE_FAULTS,
    ...NOISE_FAULTS,
    ...OIL_FAULTS,
    ...HAND_START_FAULTS,
  ],
  shares: MISHAP_SHARES,
  checks: [
    ...WATER_CHECKS,
    ...CYLINDER_CHECKS,
    ...ROLL_CHECKS,
    ...THROTTLE_CHECKS,
    ...NOISE_CHECKS,
    ...NOISE_INSIDE_CHECKS,
    ...OIL_CHECKS,
    ...OIL_FEED_CHECKS,
    ...HAND_START_CHECKS,
    ...LEAK_CHECKS,
  ],
  swaps: MISHAP_SWAPS,
  setups: MISHAP_SETUPS,
  words: MISHAP_WORDS,
  rows: MISHAP_ROWS,
  swapRows: {
    plugSwap: {
      waterInCrankcase: [62, 37, 1],
      waterInIntake: [72, 27, 1],
      cylinderFlooded: [58, 41, 1],
      oilInAirbox: [66, 33, 1],
    },
  },
  unseparated: [],
}
