import type { CheckItem, SetupItem, SwapItem, SymptomItem, WordItem } from '@/lib/model/code-book'
import type { Gate } from '@/lib/model/features'
import type { FaultData } from './fault-data'
import type { Unseparated } from './unseparated'

/**
 * One elicited list (rule R5): of 100 calls with this complaint on this kind of machine, how many each fault is
 * behind. With `somethingElse` they make 100. The lists of one symptom do not overlap in their gates.
 */
export type ShareList = {
  symptom: string
  gate: Gate
  somethingElse: number
  of100: Readonly<Record<string, number>>
}

type Triple = [number, number, number]

/**
 * A chapter of the book: complaints that belong together with the faults, checks and swaps first written for them.
 * What stands in an earlier chapter is not written again: its lists name those faults, `rows` and `swapRows` add
 * this chapter's faults to the tables of earlier checks and swaps.
 */
export type Chapter = {
  symptoms: readonly SymptomItem[]
  faults: readonly FaultData[]
  shares: readonly ShareList[]
  checks: readonly CheckItem[]
  swaps: readonly SwapItem[]
  setups: readonly SetupItem[]
  words: readonly WordItem[]
  /** By check and fault: of 100, one figure per outcome of that check. */
  rows: Readonly<Record<string, Readonly<Record<string, readonly number[]>>>>
  swapRows: Readonly<Record<string, Readonly<Record<string, Triple>>>>
  /** Pairs of this chapter's lists that no action tells apart, each with its reason (rule CB11). */
  unseparated: readonly Unseparated[]
}

/** What several chapters make together, by kind. */
export type Assembled = {
  symptoms: SymptomItem[]
  faults: FaultData[]
  checks: CheckItem[]
  swaps: SwapItem[]
  setups: SetupItem[]
  words: WordItem[]
  shares: ShareList[]
  unseparated: Unseparated[]
}

/**
 * The chapters put together: every check and swap with the rows that later chapters give it. Throws where a list of
 * shares does not make 100, and where rows are given to a check or swap that no chapter has.
 */
export function assemble(chapters: readonly Chapter[]): Assembled {
  const all = <T>(of: (chapter: Chapter) => readonly T[]): T[] =>
    chapters.flatMap((c) => [...of(c)])
  const [checks, swaps] = [all((c) => c.checks), all((c) => c.swaps)]
  mustFind(
    checks,
    all((c) => Object.keys(c.rows)),
  )
  mustFind(
    swaps,
    all((c) => Object.keys(c.swapRows)),
  )
  const shares = all((c) => c.shares)
  shares.forEach(mustMake100)
  const rowsFor = (id: string) => chapters.flatMap((c) => Object.entries(c.rows[id] ?? {}))
  const swapRowsFor = (id: string) => chapters.flatMap((c) => Object.entries(c.swapRows[id] ?? {}))
  return {
    symptoms: all((c) => c.symptoms),
    faults: all((c) => c.faults),
    checks: checks.map((check) => ({
      ...check,
      table: { ...check.table, ...mutable(rowsFor(check.id)) },
    })),
    swaps: swaps.map((swap) => ({
      ...swap,
      table: { ...swap.table, ...Object.fromEntries(swapRowsFor(swap.id)) },
    })),
    setups: all((c) => c.setups),
    words: all((c) => c.words),
    shares,
    unseparated: all((c) => c.unseparated),
  }
}

const mutable = (rows: readonly (readonly [string, readonly number[]])[]) =>
  Object.fromEntries(rows.map(([fault, row]) => [fault, [...row]]))

function mustFind(actions: readonly { id: string }[], named: readonly string[]): void {
  const lost = named.filter((id) => !actions.some((action) => action.id === id))
  if (lost.length > 0) throw new Error(`rows for what no chapter has: ${lost.join(', ')}`)
}

function mustMake100({ symptom, gate, somethingElse, of100 }: ShareList): void {
  const sum = Object.values(of100).reduce((total, share) => total + share, somethingElse)
  if (Math.abs(sum - 100) > 1e-9)
    throw new Error(`${symptom} ${JSON.stringify(gate)} makes ${sum} of 100`)
}
