import type { Chapter } from './chapter'

/** Starter, battery, charging and cooling. */
export const POWER: Chapter = {
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
