import type { ShareList } from './chapter'
import {
  BELT,
  CHAIN,
  FOUR_WHEELS,
  GEARED,
  RIDDEN,
  SLED,
  WHEELED,
  WITH_NEUTRAL,
} from './gates-drive'

/**
 * Shares of 100 per complaint and group of machines; with "something else" they make 100. Guesses of people who
 * do the work, no count behind them: the shop's own closed jobs replace them (rule R5, 20 pseudo-jobs).
 */
export const NO_DRIVE_SHARES: ShareList[] = [
  {
    symptom: 'noDrive',
    gate: { ...WHEELED, ...BELT },
    somethingElse: 7,
    of100: {
      beltBroken: 27,
      beltSlips: 16,
      axleOrJointBroken: 11,
      clutchDriveStuck: 9,
      parkOrRangeNotEngaged: 6,
      clutchDrivenStuck: 5,
      fourWheelFault: 4,
      fourWheelWiring: 3,
      gearboxBroken: 3,
      shiftLinkageOff: 3,
      parkBrakeDragging: 2,
      wheelLoose: 2,
      parkBrakeSwitchBad: 1,
      caliperSeized: 1,
    },
  },
  {
    symptom: 'noDrive',
    gate: { ...SLED, ...BELT },
    somethingElse: 8,
    of100: {
      beltBroken: 33,
      beltSlips: 17,
      clutchDriveStuck: 9,
      chainCaseFailed: 7,
      trackFrozen: 6,
      clutchDrivenStuck: 5,
      driveBearingFailed: 3,
      parkBrakeDragging: 3,
      trackOffIdlers: 2,
      trackTorn: 2,
      shiftLinkageOff: 2,
      slidesMelted: 1,
      caliperSeized: 1,
      parkBrakeSwitchBad: 1,
    },
  },
  {
    symptom: 'noDrive',
    gate: { ...WHEELED, ...CHAIN },
    somethingElse: 9,
    of100: {
      chainOffOrBroken: 38,
      handClutchSlips: 20,
      sprocketLoose: 9,
      gearboxBroken: 6,
      shiftLinkageOff: 4,
      axleOrJointBroken: 3,
      shiftForkBent: 3,
      shiftReturnBroken: 2,
      caliperSeized: 2,
      wheelBearingWorn: 2,
      parkBrakeDragging: 2,
    },
  },
  {
    symptom: 'noDrive',
    gate: { ...FOUR_WHEELS, drive: ['shaft'] },
    somethingElse: 9,
    of100: {
      axleOrJointBroken: 22,
      handClutchSlips: 19,
      gearboxBroken: 9,
      parkOrRangeNotEngaged: 8,
      shiftLinkageOff: 8,
      fourWheelFault: 7,
      fourWheelWiring: 5,
      shiftForkBent: 4,
      parkBrakeDragging: 3,
      wheelLoose: 3,
      shiftReturnBroken: 2,
      caliperSeized: 1,
    },
  },
]

export const SHIFT_SHARES: ShareList[] = [
  {
    symptom: 'willNotShift',
    gate: { ...RIDDEN, ...BELT, ...WITH_NEUTRAL },
    somethingElse: 8,
    of100: {
      shiftLinkageOff: 26,
      parkOrRangeNotEngaged: 12,
      idleTooHigh: 10,
      clutchDriveStuck: 10,
      shiftFrozen: 9,
      gearPositionBad: 8,
      shiftForkBent: 8,
      gearboxBroken: 6,
      beltSlips: 3,
    },
  },
  {
    symptom: 'willNotShift',
    gate: { ...WHEELED, ...GEARED, ...WITH_NEUTRAL },
    somethingElse: 11,
    of100: {
      clutchDrags: 28,
      shiftLinkageOff: 18,
      shiftForkBent: 11,
      shiftReturnBroken: 11,
      gearboxBroken: 8,
      gearPositionBad: 5,
      parkOrRangeNotEngaged: 5,
      shiftFrozen: 3,
    },
  },
]

export const DRIVE_SHARES: ShareList[] = [...NO_DRIVE_SHARES, ...SHIFT_SHARES]
