import type { Chapter } from './chapter'
import { START_BATTERY_CHECKS } from './checks-start-battery'
import { START_LOOKS } from './checks-start-looks'
import { START_METER_CHECKS } from './checks-start-meter'
import { PRESS_CHECKS } from './checks-start-press'
import { START_SWITCH_CHECKS } from './checks-start-switch'
import { START_FAULTS } from './faults-start'
import { START_ROWS } from './rows-start'
import { START_SETUPS } from './setups-start'
import { START_SHARES } from './shares-start'
import { START_SWAPS } from './swaps-start'
import { START_SYMPTOMS } from './symptoms-start'
import { START_WORDS } from './words-start'

/** Starter, interlocks and dead electrics. */
export const STARTING: Chapter = {
  symptoms: START_SYMPTOMS,
  faults: START_FAULTS,
  shares: START_SHARES,
  checks: [
    ...START_LOOKS,
    ...PRESS_CHECKS,
    ...START_METER_CHECKS,
    ...START_SWITCH_CHECKS,
    ...START_BATTERY_CHECKS,
  ],
  swaps: START_SWAPS,
  setups: START_SETUPS,
  words: START_WORDS,
  rows: START_ROWS,
  swapRows: {
    plugSwap: { hydraulicLock: [60, 38, 2] },
  },
  unseparated: [],
}
