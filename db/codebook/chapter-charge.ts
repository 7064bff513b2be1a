import type { Chapter } from './chapter'
import { CHARGE_CHECKS } from './checks-charge'
import { CHARGE_LOOKS } from './checks-charge-looks'
import { CHARGE_PART_CHECKS } from './checks-charge-parts'
import { COOLING_LOOKS } from './checks-cooling'
import { COOLANT_CHECKS } from './checks-cooling-deep'
import { COOLING_FAN_CHECKS } from './checks-cooling-fan'
import { CHARGE_FAULTS } from './faults-charge'
import { COOLING_FAULTS } from './faults-cooling'
import { CHARGE_ROWS, CHARGE_SWAP_ROWS } from './rows-charge'
import { CHARGE_SETUPS } from './setups-charge'
import { CHARGE_SHARES } from './shares-charge'
import { CHARGE_SWAPS } from './swaps-charge'
import { CHARGE_SYMPTOMS } from './symptoms-charge'
import { HEAT_SYMPTOMS } from './symptoms-charge-heat'
import { CHARGE_WORDS } from './words-charge'

/** Charging and cooling. */
export const CHARGE: Chapter = {
  symptoms: [...CHARGE_SYMPTOMS, ...HEAT_SYMPTOMS],
  faults: [...CHARGE_FAULTS, ...COOLING_FAULTS],
  shares: CHARGE_SHARES,
  checks: [
    ...CHARGE_LOOKS,
    ...CHARGE_CHECKS,
    ...CHARGE_PART_CHECKS,
    ...COOLING_LOOKS,
    ...COOLANT_CHECKS,
    ...COOLING_FAN_CHECKS,
  ],
  swaps: CHARGE_SWAPS,
  setups: CHARGE_SETUPS,
  words: CHARGE_WORDS,
  rows: CHARGE_ROWS,
  swapRows: CHARGE_SWAP_ROWS,
  unseparated: [],
}
