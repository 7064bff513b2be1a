import type { LogEntry } from '@/lib/model/log-entry'
import type { Case } from './case'
import { type EvidenceLog, evidenceLog, fixesBefore } from './evidence-log'
import type { Factor } from './factor'
import { chancesOf, type OutcomeTable } from './outcome-table'
import type { Candidate } from './priors'

/** What a piece of evidence is about, in the words of the job log. */
export type About =
  | 'share'
  | 'code'
  | 'check'
  | 'reading'
  | 'swap'
  | 'proofRun'
  | 'symptom'
  | 'repair'

/** One piece of evidence; without a factor it says nothing. */
export type Evidence = {
  entryId: string
  about: About
  label: string
  factor: Factor | null
  /** The factor stands in the place of an earlier one of the same slot: the steps of one swap say one thing. */
  slot: string
  /** It would speak, but is more than can be counted. */
  isLeftOut: boolean
}

/** Everything a builder of evidence may look at; `place` is where each fault stands among the suspects. */
export type Sight = {
  c: Case
  suspects: readonly Candidate[]
  place: ReadonlyMap<string, number>
  log: EvidenceLog
}

/** What a case shows a builder of evidence. */
export const sightOf = (c: Case, suspects: readonly Candidate[]): Sight => ({
  c,
  suspects,
  place: new Map(suspects.map((s, i) => [s.fault, i])),
  log: evidenceLog(c),
})

/** A piece of evidence that moves nothing. */
export const nothing = (entry: LogEntry, about: About, label: string): Evidence => ({
  entryId: entry.id,
  about,
  label,
  factor: null,
  slot: entry.id,
  isLeftOut: false,
})

/** A piece that does not count, and why. */
export const leftOut = (piece: Evidence, why: string): Evidence => ({
  ...piece,
  label: `${piece.label} (not counted: ${why})`,
  factor: null,
  isLeftOut: true,
})

/** A table over the suspects of this case from a book's rows; rows equal to `otherwise`, or of another length, touch nothing. */
export function tableOf(
  place: Sight['place'],
  book: { table: Readonly<Record<string, readonly number[]>>; otherwise: readonly number[] },
): OutcomeTable {
  const otherwise = chancesOf(book.otherwise)
  const rows = new Map<number, readonly number[]>()
  for (const [fault, row] of Object.entries(book.table)) {
    const at = place.get(fault)
    if (at === undefined || row.length !== otherwise.length) continue
    const chances = chancesOf(row)
    if (chances.some((p, k) => p !== otherwise[k])) rows.set(at, chances)
  }
  return { rows, otherwise }
}

/**
 * The chance (0 to 1) that a fault, rightly repaired, is gone; by hand, where that can be done, as the log does not
 * tell whether the part was fitted. 0.9 where the book has no repair (guess).
 */
export function successOf({ index }: Case, fault: string): number {
  const repair = index.faults.get(fault)?.repair
  return (repair?.withoutPartOf100 ?? repair?.successOf100 ?? 90) / 100
}

/**
 * The chance that a fault which was the cause is still there at a place in the log: 1 before it was fixed, then
 * what its repair leaves. What is seen after a fix speaks of the new part, not of the old one.
 */
export const stillThere = (
  { c, log }: Pick<Sight, 'c' | 'log'>,
  fault: string,
  at: number,
): number => (fixesBefore(log, fault, at) > 0 ? 1 - successOf(c, fault) : 1)

/** A table as it holds at a place in the log: rows of fixed faults are mixed with `otherwise`. */
export function tableAt(sight: Sight, table: OutcomeTable, at: number): OutcomeTable {
  const rows = new Map<number, readonly number[]>()
  for (const [f, row] of table.rows) {
    const there = stillThere(sight, sight.suspects[f]?.fault ?? '', at)
    const mixed = row.map((p, k) => there * p + (1 - there) * (table.otherwise[k] ?? 0))
    rows.set(f, there === 1 ? row : mixed)
  }
  return { rows, otherwise: table.otherwise }
}
