import type { Chapter } from './chapter'
import { AIR_CHECKS } from './checks-air'
import { BATTERY_CHECKS } from './checks-battery'
import { CARBURETTOR_CHECKS } from './checks-carburettor'
import { COIL_CHECKS } from './checks-coil'
import { COIL_DRIVE_CHECKS } from './checks-coil-drive'
import { CRANK_CHECKS } from './checks-crank'
import { ELECTRICS_CHECKS } from './checks-electrics'
import { ENGINE_CHECKS } from './checks-engine'
import { INJECTOR_CHECKS } from './checks-injector'
import { MIXTURE_CHECKS } from './checks-mixture'
import { PRESSURE_CHECKS } from './checks-pressure'
import { PUMP_CHECKS } from './checks-pump'
import { SPARK_CHECKS } from './checks-spark'
import { STOP_CHECKS } from './checks-stops'
import { TANK_CHECKS } from './checks-tank'
import { AIR_FAULTS } from './faults-air'
import { CARBURETTOR_FAULTS } from './faults-carburettor'
import { ENGINE_FAULTS } from './faults-engine'
import { FUEL_FAULTS } from './faults-fuel'
import { IGNITION_FAULTS } from './faults-ignition'
import { POWER_FAULTS } from './faults-power'
import { SIGNAL_FAULTS } from './faults-signal'
import { SETUPS } from './setups'
import { DIES_SHARES } from './shares-dies'
import { SWAPS } from './swaps'
import { DIES_SYMPTOMS } from './symptoms-dies'
import { WORDS } from './words'

/** The first chapter: starts, then dies. It holds most of what an engine needs to run. */
export const DIES: Chapter = {
  symptoms: DIES_SYMPTOMS,
  faults: [
    ...FUEL_FAULTS,
    ...CARBURETTOR_FAULTS,
    ...IGNITION_FAULTS,
    ...SIGNAL_FAULTS,
    ...POWER_FAULTS,
    ...AIR_FAULTS,
    ...ENGINE_FAULTS,
  ],
  shares: DIES_SHARES,
  checks: [
    ...TANK_CHECKS,
    ...PUMP_CHECKS,
    ...PRESSURE_CHECKS,
    ...INJECTOR_CHECKS,
    ...CARBURETTOR_CHECKS,
    ...COIL_CHECKS,
    ...COIL_DRIVE_CHECKS,
    ...SPARK_CHECKS,
    ...CRANK_CHECKS,
    ...STOP_CHECKS,
    ...BATTERY_CHECKS,
    ...ELECTRICS_CHECKS,
    ...AIR_CHECKS,
    ...MIXTURE_CHECKS,
    ...ENGINE_CHECKS,
  ],
  swaps: SWAPS,
  setups: SETUPS,
  words: WORDS,
  rows: {},
  swapRows: {},
  unseparated: [],
}
