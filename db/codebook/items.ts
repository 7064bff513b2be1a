import type { CodeBookItem, FaultItem } from '@/lib/model/code-book'
import type { Assembled } from './chapter'
import type { FaultData } from './fault-data'
import { FEATURE_ITEMS } from './features'
import { FMI_LINE } from './fmi'
import { FMI_UPPER } from './fmi-upper'
import { knownCodes } from './known-codes'
import { PCODE_KINDS } from './pcode-kinds'
import { PCODES } from './pcodes'
import { GUESS } from './sources'
import { SPNS } from './spn'

/** What the chapters make, with the tables of codes. Faults get their shares from the lists of the chapters. */
export function itemsOf({
  words,
  setups,
  symptoms,
  faults,
  shares,
  checks,
  swaps,
}: Assembled): CodeBookItem[] {
  const withShares = (fault: FaultData): FaultItem => ({
    kind: 'fault',
    ...fault,
    shares: shares.flatMap(({ symptom, gate, of100 }) => {
      const share = of100[fault.id] ?? 0
      return share > 0 ? [{ symptom, gate: structuredClone(gate), of100: share }] : []
    }),
    source: GUESS,
  })
  return [
    ...FEATURE_ITEMS,
    ...words,
    ...setups,
    ...symptoms,
    ...faults.map(withShares),
    ...checks,
    ...swaps,
    ...FMI_LINE,
    ...FMI_UPPER,
    ...PCODE_KINDS,
    ...knownCodes(SPNS, { words, faults }),
    ...knownCodes(PCODES, { words, faults }),
  ]
}
