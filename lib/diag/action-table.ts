import type { CheckItem, SwapItem } from '@/lib/model/code-book'
import { standingFor } from './evidence'
import { swapSlot } from './evidence-swap'
import { type Sight, tableAt, tableOf } from './evidence-table'
import { type Factor, tableFactor } from './factor'
import { type OutcomeTable, outcomeChances, turned } from './outcome-table'
import { swapWeights } from './swap-weights'
import { verdictTable } from './verdict-table'

/** A check or swap as something that may come out: its outcomes, good first, and their chances by state. */
export type ActionTable = {
  outcomes: readonly { id: string; name: string; good: boolean }[]
  /** The suspects that change the chances. */
  scope: readonly number[]
  /** Chances of the outcomes with these suspects present (sum 1). */
  chances: (present: readonly number[]) => number[]
  /** The evidence of each outcome, and the slots of what it would stand in the place of. */
  factors: readonly Factor[]
  replaces: readonly string[]
}

/** Outcomes of a swap in the order of its table. */
export const SWAP_OUTCOMES = [
  { id: 'noChange', name: 'No change with the good part', good: true },
  { id: 'goneOnce', name: 'Gone with the good part, not back with the old one', good: false },
  { id: 'goneAndBack', name: 'Gone, and back again with the old part', good: false },
] as const

/**
 * The table of a check done now: with the meter at hand where it is a reading, else the book's own. Of a fault
 * that was fixed it sees the new part.
 */
export function checkTable(sight: Sight, check: CheckItem): ActionTable {
  const book: OutcomeTable = verdictTable(sight, check) ?? tableOf(sight.place, check)
  const table = tableAt(sight, book, sight.c.entries.length)
  return {
    outcomes: check.outcomes,
    scope: [...table.rows.keys()],
    chances: (present) => outcomeChances(table, present),
    factors: check.outcomes.map((_, seen) =>
      tableFactor(
        table,
        check.outcomes.map((_o, k) => (k === seen ? 1 : 0)),
      ),
    ),
    replaces: standingFor(sight, check.id),
  }
}

/** The table of a swap for what is still to be done of it; null when its steps have told all they can. */
export function swapTable({ c, place }: Sight, swap: SwapItem): ActionTable | null {
  const steps = c.entries.flatMap((e) =>
    e.body.kind === 'swap' && e.body.swapId === swap.id ? [e.body] : [],
  )
  const done = swapWeights(steps) ?? [1, 1, 1]
  if (done.filter((w) => w > 0).length < 2) return null
  const table = turned(tableOf(place, swap))
  return {
    outcomes: SWAP_OUTCOMES,
    scope: [...table.rows.keys()],
    chances: (present) => {
      const all = outcomeChances(table, present).reverse()
      const open = all.map((p, k) => p * (done[k] ?? 0))
      const sum = open.reduce((total, p) => total + p, 0)
      return open.map((p) => p / sum)
    },
    factors: SWAP_OUTCOMES.map((_, seen) =>
      tableFactor(table, done.map((w, k) => (k === seen ? w : 0)).reverse()),
    ),
    replaces: [swapSlot(swap.id)],
  }
}
