import type { Chapter } from './chapter'
import { CHARGE_FAULTS } from './faults-charge'
import { COOLING_FAULTS } from './faults-cooling'
import { CHARGE_SETUPS } from './setups-charge'
import { CHARGE_WORDS } from './words-charge'

/** Charging and cooling. */
export const CHARGE: Chapter = {
  symptoms: [],
  faults: [...CHARGE_FAULTS, ...COOLING_FAULTS],
  shares: [],
  checks: [],
  swaps: [],
  setups: CHARGE_SETUPS,
  words: CHARGE_WORDS,
  rows: {},
  swapRows: {},
  unseparated: [],
}
