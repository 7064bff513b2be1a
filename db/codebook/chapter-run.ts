import type { Chapter } from './chapter'
import { COMPRESSION_CHECKS, TIMING_CHECKS } from './checks-run-compression'
import { RUN_DASH_CHECKS } from './checks-run-dash'
import { EXHAUST_CHECKS } from './checks-run-exhaust'
import { INJECTOR_DRIP } from './checks-run-injector'
import { RUN_LOOKS } from './checks-run-looks'
import { NO_START_CHECKS } from './checks-run-no-start'
import { RUN_SIGNAL_CHECKS } from './checks-run-signals'
import { RUN_ENGINE_FAULTS } from './faults-run'
import { RUN_SIGNAL_FAULTS } from './faults-run-signals'
import { RUN_ROWS, RUN_SWAP_ROWS } from './rows-run'
import { RUN_SETUPS } from './setups-run'
import { BACKFIRE_SHARES } from './shares-run-backfire'
import { LIMP_SHARES } from './shares-run-limp'
import { NO_START_SHARES } from './shares-run-no-start'
import { ROUGH_SHARES } from './shares-run-rough'
import { RUN_SWAPS } from './swaps-run'
import { RUN_SYMPTOMS } from './symptoms-run'
import { RUN_WORDS } from './words-run'

/** Will not run right: no start, rough, limp mode, backfires. */
export const RUN: Chapter = {
  symptoms: RUN_SYMPTOMS,
  faults: [...RUN_ENGINE_FAULTS, ...RUN_SIGNAL_FAULTS],
  shares: [...NO_START_SHARES, ...ROUGH_SHARES, ...LIMP_SHARES, ...BACKFIRE_SHARES],
  checks: [
    ...RUN_LOOKS,
    ...RUN_DASH_CHECKS,
    ...NO_START_CHECKS,
    INJECTOR_DRIP,
    ...COMPRESSION_CHECKS,
    ...TIMING_CHECKS,
    ...EXHAUST_CHECKS,
    ...RUN_SIGNAL_CHECKS,
  ],
  swaps: RUN_SWAPS,
  setups: RUN_SETUPS,
  words: RUN_WORDS,
  rows: RUN_ROWS,
  swapRows: RUN_SWAP_ROWS,
  unseparated: [],
}
