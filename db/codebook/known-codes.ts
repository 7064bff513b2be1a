import type { FaultItem, PcodeItem, SpnItem, WordItem } from '@/lib/model/code-book'

/**
 * Codes as far as the chapters of this book bear them out: a circuit in which no fault of the book sits is left off,
 * and so is what a code tells of a fault that the book does not have. A book of some of the chapters is whole then.
 */
export function knownCodes<T extends SpnItem | PcodeItem>(
  codes: readonly T[],
  {
    words,
    faults,
  }: { words: readonly WordItem[]; faults: readonly Pick<FaultItem, 'id' | 'circuits'>[] },
): T[] {
  const named = new Set(words.flatMap(({ kind, id }) => (kind === 'circuit' ? [id] : [])))
  const seated = new Set(faults.flatMap((f) => f.circuits.map((c) => c.circuit)))
  const here = new Set(faults.map((f) => f.id))
  return codes.map((code) => {
    const { circuit } = code
    const isKnown = circuit !== null && named.has(circuit) && seated.has(circuit)
    return { ...code, circuit: isKnown ? circuit : null, tells: knownTells(code.tells, here) }
  })
}

function knownTells(tells: SpnItem['tells'], here: ReadonlySet<string>): SpnItem['tells'] {
  if (tells === null) return null
  const kept = Object.entries(tells.of100).filter(([fault]) => here.has(fault))
  return kept.length === 0 ? null : { ...tells, of100: Object.fromEntries(kept) }
}
