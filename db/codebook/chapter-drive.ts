import type { Chapter } from './chapter'

/** Drive, gears, brakes, steering, wheels and track. */
export const DRIVE: Chapter = {
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
