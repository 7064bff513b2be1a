import { tellsNothing } from '@/lib/diag/news'
import type { Outcome } from '@/lib/diag/outlook'

export type Mark = {
  outcome: string
  /** `if good`, `if bad`, or the outcome's own name when there are more than two. */
  words: string
  shape: 'ring' | 'cross' | 'diamond' | 'square'
  /** Chance of the suspect after this outcome, 0 to 1. */
  chance: number
}

/** Where each outcome of the check that is up would put a suspect; empty without a check. */
export function marksOf(fault: string, outlook: readonly Outcome[]): Mark[] {
  const two = outlook.length === 2
  return outlook.flatMap((row, i) => {
    const chance = row.chances[fault]
    if (chance === undefined) return []
    return [
      {
        outcome: row.outcome,
        words: two ? twoWords(row) : shortName(row),
        shape: shapeOf(row, i, outlook.length),
        chance,
      },
    ]
  })
}

/** A swap's outcomes are the same three everywhere; their long names stand on the swap itself. */
const SWAP_NAMES: Record<string, string> = {
  noChange: 'No change',
  goneOnce: 'Gone but not back',
  goneAndBack: 'Gone and back',
}

export const shortName = (row: Pick<Outcome, 'outcome' | 'name'>): string =>
  SWAP_NAMES[row.outcome] ?? row.name

const twoWords = (row: Outcome): string => (row.good ? 'if good' : 'if bad')

function shapeOf(row: Outcome, i: number, count: number): Mark['shape'] {
  if (row.good) return 'ring'
  if (i === count - 1 || count === 2) return 'cross'
  return i % 2 === 1 ? 'diamond' : 'square'
}

/** True when no outcome moves the suspect by 3 of 100 from another; without marks nothing is claimed. */
export const saysNothing = (marks: readonly Mark[]): boolean =>
  marks.length > 0 && tellsNothing(marks.map((mark) => mark.chance))
