import type { Chapter } from './chapter'
import { START_FAULTS } from './faults-start'
import { START_SETUPS } from './setups-start'
import { START_WORDS } from './words-start'

/** Starter, interlocks and dead electrics. */
export const STARTING: Chapter = {
  symptoms: [],
  faults: START_FAULTS,
  shares: [],
  checks: [],
  swaps: [],
  setups: START_SETUPS,
  words: START_WORDS,
  rows: {},
  swapRows: {},
  unseparated: [],
}
