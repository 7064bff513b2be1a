import type { LogEntry } from '@/lib/model/log-entry'
import type { Case } from './case'
import { chancesOf, type Factor, type OutcomeTable } from './factor'
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

/** A sum of products over suspects: weights, each with a multiplier on every suspect's odds. */
export type Multipliers = readonly { weight: number; of: (suspect: number) => number }[]

/** One piece of evidence; with neither factor nor multipliers it says nothing. */
export type Evidence = {
  entryId: string
  about: About
  label: string
  factor: Factor | null
  multipliers: Multipliers | null
}

/** Everything a builder of evidence may look at; `place` is where each fault stands among the suspects. */
export type Sight = {
  c: Case
  suspects: readonly Candidate[]
  place: ReadonlyMap<string, number>
}

/** What a case shows a builder of evidence. */
export const sightOf = (c: Case, suspects: readonly Candidate[]): Sight => ({
  c,
  suspects,
  place: new Map(suspects.map((s, i) => [s.fault, i])),
})

/** A piece of evidence that moves nothing. */
export const nothing = (entry: LogEntry, about: About, label: string): Evidence => ({
  entryId: entry.id,
  about,
  label,
  factor: null,
  multipliers: null,
})

/** A table over the suspects of this case from a book's rows; rows equal to `otherwise` touch nothing. */
export function tableOf(
  place: Sight['place'],
  book: { table: Readonly<Record<string, readonly number[]>>; otherwise: readonly number[] },
): OutcomeTable {
  const otherwise = chancesOf(book.otherwise)
  const rows = new Map<number, readonly number[]>()
  for (const [fault, row] of Object.entries(book.table)) {
    const at = place.get(fault)
    if (at === undefined) continue
    const chances = chancesOf(row)
    if (chances.some((p, k) => p !== otherwise[k])) rows.set(at, chances)
  }
  return { rows, otherwise }
}
