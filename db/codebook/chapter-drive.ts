import type { Chapter } from './chapter'
import { BRAKE_LOOKS } from './checks-brakes'
import { BRAKE_CHECKS } from './checks-brakes-deep'
import { BRAKE_MORE_CHECKS } from './checks-brakes-more'
import { BELT_CHECKS } from './checks-drive-belt'
import { CHAIN_CHECKS } from './checks-drive-chain'
import { LINE_CHECKS } from './checks-drive-line'
import { GEAR_LOOKS } from './checks-gear-looks'
import { GEAR_CHECKS } from './checks-gears'
import { STEERING_CHECKS } from './checks-steering'
import { STEERING_MORE_CHECKS } from './checks-steering-more'
import { TRACK_CHECKS } from './checks-track'
import { TRACK_MORE_CHECKS } from './checks-track-more'
import { WHEEL_CHECKS } from './checks-wheels'
import { BELT_FAULTS } from './faults-drive-belt'
import { BRAKE_FAULTS } from './faults-drive-brakes'
import { GEAR_FAULTS } from './faults-drive-gears'
import { STEERING_FAULTS } from './faults-drive-steering'
import { TRACK_FAULTS } from './faults-drive-track'
import { TYRE_FAULTS } from './faults-drive-tyres'
import { DRIVE_ROWS } from './rows-drive'
import { DRIVE_SETUPS } from './setups-drive'
import { DRIVE_SHARES } from './shares-drive'
import { CHASSIS_SHARES } from './shares-drive-chassis'
import { DRIVE_SWAPS } from './swaps-drive'
import { DRIVE_SYMPTOMS } from './symptoms-drive'
import { BRAKE_AND_TYRE_SYMPTOMS } from './symptoms-drive-brakes'
import { SHIFT_SYMPTOMS } from './symptoms-drive-shift'
import { STEERING_SYMPTOMS } from './symptoms-drive-steering'
import { TRACK_SYMPTOMS } from './symptoms-drive-track'
import { DRIVE_WORDS } from './words-drive'

/** Drive, gears, brakes, steering, wheels and track. */
export const DRIVE: Chapter = {
  symptoms: [
    ...DRIVE_SYMPTOMS,
    ...SHIFT_SYMPTOMS,
    ...BRAKE_AND_TYRE_SYMPTOMS,
    ...STEERING_SYMPTOMS,
    ...TRACK_SYMPTOMS,
  ],
  faults: [
    ...BELT_FAULTS,
    ...GEAR_FAULTS,
    ...BRAKE_FAULTS,
    ...STEERING_FAULTS,
    ...TYRE_FAULTS,
    ...TRACK_FAULTS,
  ],
  shares: [...DRIVE_SHARES, ...CHASSIS_SHARES],
  checks: [
    ...BELT_CHECKS,
    ...CHAIN_CHECKS,
    ...LINE_CHECKS,
    ...GEAR_LOOKS,
    ...GEAR_CHECKS,
    ...BRAKE_LOOKS,
    ...BRAKE_CHECKS,
    ...BRAKE_MORE_CHECKS,
    ...STEERING_CHECKS,
    ...STEERING_MORE_CHECKS,
    ...WHEEL_CHECKS,
    ...TRACK_CHECKS,
    ...TRACK_MORE_CHECKS,
  ],
  swaps: DRIVE_SWAPS,
  setups: DRIVE_SETUPS,
  words: DRIVE_WORDS,
  rows: DRIVE_ROWS,
  swapRows: {},
  unseparated: [],
}
