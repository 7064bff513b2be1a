import type { CodeBookItem, FaultItem } from '@/lib/model/code-book'
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
import type { FaultData } from './fault-data'
import { AIR_FAULTS } from './faults-air'
import { CARBURETTOR_FAULTS } from './faults-carburettor'
import { ENGINE_FAULTS } from './faults-engine'
import { FUEL_FAULTS } from './faults-fuel'
import { IGNITION_FAULTS } from './faults-ignition'
import { POWER_FAULTS } from './faults-power'
import { SIGNAL_FAULTS } from './faults-signal'
import { FEATURE_ITEMS } from './features'
import { FMI_LINE } from './fmi'
import { FMI_UPPER } from './fmi-upper'
import { PCODE_KINDS } from './pcode-kinds'
import { PCODES } from './pcodes'
import { SETUPS } from './setups'
import { SHARE_GROUPS, SHARE_ROWS } from './shares'
import { GUESS } from './sources'
import { SPNS } from './spn'
import { SWAPS } from './swaps'
import { SYMPTOMS } from './symptoms'
import { WORDS } from './words'

const FAULTS: FaultData[] = [
  ...FUEL_FAULTS,
  ...CARBURETTOR_FAULTS,
  ...IGNITION_FAULTS,
  ...SIGNAL_FAULTS,
  ...POWER_FAULTS,
  ...AIR_FAULTS,
  ...ENGINE_FAULTS,
]

/** The whole code book, in the order it is published. Faults get their shares from `shares.ts`. */
export const BOOK_ITEMS: CodeBookItem[] = [
  ...FEATURE_ITEMS,
  ...WORDS,
  ...SETUPS,
  ...SYMPTOMS,
  ...FAULTS.map(withShares),
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
  ...SWAPS,
  ...FMI_LINE,
  ...FMI_UPPER,
  ...PCODE_KINDS,
  ...SPNS,
  ...PCODES,
]

function withShares(fault: FaultData): FaultItem {
  const row = SHARE_ROWS.find(([id]) => id === fault.id)
  const groups = Object.values(SHARE_GROUPS)
  const shares = groups.flatMap(({ symptom, gate }, column) => {
    const of100 = row?.slice(1)[column]
    return typeof of100 === 'number' && of100 > 0 ? [{ symptom, gate: copyGate(gate), of100 }] : []
  })
  return { kind: 'fault', ...fault, shares, source: GUESS }
}

function copyGate(gate: Record<string, readonly string[]>): Record<string, string[]> {
  return Object.fromEntries(Object.entries(gate).map(([name, values]) => [name, [...values]]))
}
