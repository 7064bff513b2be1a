import type { Chapter } from './chapter'

/** Will not run right: no start, rough, limp mode, backfires. */
export const RUN: Chapter = {
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
