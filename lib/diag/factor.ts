/**
 * A piece of evidence as a function of which suspects are present. Outcome tables become noisy-max factors
 * (Henrion 1989; Diez 1993), which are noisy-OR for two outcomes: with C_k(S) = P(outcome at most k | S),
 * one present fault gives its own row exactly, several that all push away from the good outcome multiply:
 * C_k(S) = C_k(none) prod over f in S of C_k(f) / C_k(none). A fault whose row is better than `otherwise`
 * cannot mend what another breaks: it counts only while no present fault is worse, and then the one nearest
 * to `otherwise` speaks. A running maximum keeps C_k a distribution.
 */

/** `at` gives the likelihood of what was seen for the present suspects among `scope` (any order, no others). */
export type Factor = { scope: readonly number[]; at: (present: readonly number[]) => number }

/** Chances per outcome (sum 1) for each suspect that changes them, and with none of those present. */
export type OutcomeTable = {
  rows: ReadonlyMap<number, readonly number[]>
  otherwise: readonly number[]
}

/** No single outcome may set a suspect to nought: every row is mixed with this much of an even one. */
export const TABLE_FLOOR = 0.001

/** A book row "of 100" as chances with the floor mixed in. */
export function chancesOf(row: readonly number[]): number[] {
  const sum = row.reduce((total, x) => total + x, 0)
  return row.map((x) => (x / sum) * (1 - TABLE_FLOOR * row.length) + TABLE_FLOOR)
}

/** P(each outcome | these present), outcomes in the table's order from good to plain bad. */
export function outcomeChances(table: OutcomeTable, present: readonly number[]): number[] {
  const rows = present.map((f) => table.rows.get(f)).filter((row) => row !== undefined)
  if (rows.length === 0) return [...table.otherwise]
  if (rows.length === 1) return [...(rows[0] ?? [])]
  const last = table.otherwise.length - 1
  const chances: number[] = []
  let before = 0
  const running = { base: 0, rows: rows.map(() => 0) }
  for (let k = 0; k <= last; k++) {
    running.base += table.otherwise[k] ?? 0
    running.rows = running.rows.map((sum, i) => sum + (rows[i]?.[k] ?? 0))
    const upTo = k === last ? 1 : Math.min(1, Math.max(before, joined(running)))
    chances.push(upTo - before)
    before = upTo
  }
  return chances
}

/** Evidence on a table: weights over its outcomes, [0, 1, 0] for a plain one, anything for virtual evidence. */
export function tableFactor(table: OutcomeTable, weights: readonly number[]): Factor {
  const scope = [...table.rows.keys()]
  return {
    scope,
    at: (present) =>
      outcomeChances(table, present).reduce((sum, p, k) => sum + p * (weights[k] ?? 0), 0),
  }
}

/** The table with its outcomes turned about: for swaps, where "no change" outranks "gone and back". */
export function turned(table: OutcomeTable): OutcomeTable {
  const rows = new Map([...table.rows].map(([f, row]) => [f, [...row].reverse()]))
  return { rows, otherwise: [...table.otherwise].reverse() }
}

/** Whether the evidence is the same under every set of its suspects: then it says nothing. */
export function saysNothing(factor: Factor): boolean {
  const base = factor.at([])
  return factor.scope.every((f) => factor.at([f]) === base)
}

function joined({ base, rows }: { base: number; rows: readonly number[] }): number {
  const worse = rows.filter((row) => row < base)
  if (worse.length === 0) return Math.min(...rows)
  return worse.reduce((product, row) => (product * row) / base, base)
}
