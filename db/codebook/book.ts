import type { CodeBookItem, FaultItem } from '@/lib/model/code-book'
import { COIL_CHECKS } from './checks-coil'
import type { FaultData } from './fault-data'
import { IGNITION_FAULTS } from './faults-ignition'
import { FEATURE_ITEMS } from './features'
import { FAILURES } from './fmi'
import { PCODES } from './pcodes'
import { SETUPS } from './setups'
import { SHARE_GROUPS, SHARE_ROWS } from './shares'
import { GUESS } from './sources'
import { SPNS } from './spn'
import { SWAPS } from './swaps'
import { SYMPTOMS } from './symptoms'
import { WORDS } from './words'

const FAULTS: FaultData[] = [...IGNITION_FAULTS]

/** The whole code book, in the order it is published. Faults get their shares from `shares.ts`. */
export const BOOK_ITEMS: CodeBookItem[] = [
  ...FEATURE_ITEMS,
  ...WORDS,
  ...SETUPS,
  ...SYMPTOMS,
  ...FAULTS.map(withShares),
  ...COIL_CHECKS,
  ...SWAPS,
  ...FAILURES,
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
