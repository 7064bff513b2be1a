import type { Chapter } from './chapter'

/** What happened to it: stuck, submerged, rolled; throttle, noise, oil, hand start, fuel smell. */
export const MISHAP: Chapter = {
  symptoms: [],
  faults: [],
  shares: [],
  checks: [],
  swaps: [],
  setups: [],
  words: [],
  rows: {},
  swapRows: {},
  unseparated: [],
}
