import type { Machine } from './machine'
import { type OutcomeTable, outcomeChances } from './outcome-table'
import { tableMachine } from './table-machine'

/** A piece of evidence as a function of which suspects are present. */
export type Factor = {
  scope: readonly number[]
  /** The likelihood of what was seen for the present ones among `scope` (any order, no others). */
  at: (present: readonly number[]) => number
  /** The same function suspect by suspect, for the exact sums of joint.ts. */
  machine: Machine
}

/** Evidence on a table: weights over its outcomes, [0, 1, 0] for a plain one, anything for virtual evidence. */
export function tableFactor(table: OutcomeTable, weights: readonly number[]): Factor {
  return {
    scope: [...table.rows.keys()],
    at: (present) =>
      outcomeChances(table, present).reduce((sum, p, k) => sum + p * (weights[k] ?? 0), 0),
    machine: tableMachine(table, weights),
  }
}

/**
 * Whether the evidence is the same under every set of up to two of its suspects: then it says nothing. One at a time
 * would not do: an outcome between two others may be as likely under each as under none, but not under both.
 */
export function saysNothing({ scope, at }: Factor): boolean {
  const base = at([])
  return scope.every(
    (f, i) => at([f]) === base && scope.slice(0, i).every((g) => at([g, f]) === base),
  )
}
