/**
 * A piece of evidence as a function of which suspects are present. Outcome tables become noisy-max factors
 * (Henrion 1989; Diez 1993), which are noisy-OR for two outcomes: with C_k(S) = P(outcome at most k | S), one
 * present fault gives its own row exactly, and several that push away from the good outcome multiply,
 * C_k(S) = C_k(none) prod over f in S of q_k(f), q_k(f) the least of C_j(f) / C_j(none) over j from k on: so the
 * q rise with k and C_k stays a distribution. A fault whose row is better than `otherwise` all along cannot mend
 * what another breaks: it counts only while none but such are present, and then the one nearest to `otherwise`.
 */
/** Chances per outcome (sum 1) for each suspect that changes them, and with none of those present. */
export type OutcomeTable = {
  rows: ReadonlyMap<number, readonly number[]>
  otherwise: readonly number[]
}

/** No single outcome may set a suspect to nought: every row is mixed with this much of an even one. */
export const TABLE_FLOOR = 0.001

/** A book row "of 100" as chances with the floor mixed in; a row without a number above 0 says nothing: it is even. */
export function chancesOf(row: readonly number[]): number[] {
  const held = row.map((x) => (x > 0 && Number.isFinite(x) ? x : 0))
  const sum = held.reduce((total, x) => total + x, 0)
  if (!(sum > 0)) return row.map(() => 1 / row.length)
  const floor = Math.min(TABLE_FLOOR, 0.1 / row.length)
  return held.map((x) => (x / sum) * (1 - floor * row.length) + floor)
}

/** How a fault's row stands to `otherwise`: what it does alone, and beside others. */
export type Push = {
  row: readonly number[]
  /** Better than `otherwise` or level with it at every outcome: it cannot mend what another breaks. */
  isBetter: boolean
  /** Beside others: q by outcome, rising, 1 at the last; `otherwise` alone where the row is better. */
  beside: readonly number[]
  /** How far the row lies from `otherwise` toward the good outcome. */
  far: number
}

/** Rounding of a sum of a row's chances; a smaller difference is none. */
export const EVEN = 1e-12

/** The push of each row of a table, by suspect. */
export function pushesOf({ rows, otherwise }: OutcomeTable): Map<number, Push> {
  const base = running(otherwise)
  return new Map([...rows].map(([f, row]) => [f, pushOf(row, base)]))
}

/** P(each outcome | these present), outcomes in the table's order from good to plain bad. */
export function outcomeChances(table: OutcomeTable, present: readonly number[]): number[] {
  const pushes = pushesOf({ ...table, rows: pick(table.rows, present) })
  const all = [...pushes.values()]
  const worse = all.filter((p) => !p.isBetter)
  const [only] = worse
  if (worse.length === 1 && only !== undefined) return [...only.row]
  if (worse.length === 0) {
    const nearest = all.reduce<Push | null>((a, b) => (a !== null && a.far <= b.far ? a : b), null)
    return [...(nearest?.row ?? table.otherwise)]
  }
  const upTo = running(table.otherwise).map((c, k) =>
    worse.reduce((product, p) => product * (p.beside[k] ?? 1), c),
  )
  return upTo.map((c, k) => Math.max(0, c - (upTo[k - 1] ?? 0)))
}

/** The table with its outcomes turned about: for swaps, where "no change" outranks "gone and back". */
export function turned(table: OutcomeTable): OutcomeTable {
  const rows = new Map([...table.rows].map(([f, row]) => [f, [...row].reverse()]))
  return { rows, otherwise: [...table.otherwise].reverse() }
}

/** Chances of at most each outcome, the last exactly 1. */
export function running(row: readonly number[]): number[] {
  let sum = 0
  return row.map((p, k) => {
    sum += p
    return k === row.length - 1 ? 1 : Math.min(1, sum)
  })
}

function pushOf(row: readonly number[], base: readonly number[]): Push {
  const upTo = running(row)
  const beside = upTo.map(() => 1)
  let least = 1
  for (let k = upTo.length - 2; k >= 0; k--) {
    const [own, none] = [upTo[k] ?? 1, base[k] ?? 1]
    least = Math.min(least, none > 0 ? own / none : 1)
    beside[k] = least
  }
  const apart = upTo.map((own, k) => own - (base[k] ?? 1))
  return {
    row,
    isBetter: apart.every((d) => d >= -EVEN),
    beside,
    far: apart.reduce((sum, d) => sum + d, 0),
  }
}

function pick<T>(rows: ReadonlyMap<number, T>, present: readonly number[]): Map<number, T> {
  const kept = new Map<number, T>()
  for (const f of present) {
    const row = rows.get(f)
    if (row !== undefined) kept.set(f, row)
  }
  return kept
}
