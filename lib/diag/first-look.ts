import type { CheckItem, SymptomItem } from '@/lib/model/code-book'
import type { Features } from '@/lib/model/features'
import type { LogEntry } from '@/lib/model/log-entry'
import type { BookIndex } from './book-index'
import { living } from './case'
import { letsThrough } from './gate'

/** What the book has on the symptoms of a job; those it does not know are left out. */
export const knownSymptoms = (index: BookIndex, ids: readonly string[]): SymptomItem[] =>
  ids.flatMap((id) => index.symptoms.get(id) ?? [])

/** Whether there is no fault to look for: all that is complained of opens the way out at once (rule R4). */
export const opensWayOut = (symptoms: readonly SymptomItem[]): boolean =>
  symptoms.length > 0 && symptoms.every(({ opens }) => opens === 'wayOut')

/** The looks of these complaints that the machine allows and nobody has taken yet, each once, in their order. */
export function looksLeft(
  index: BookIndex,
  of: {
    symptoms: readonly SymptomItem[]
    features: Features
    entries: readonly LogEntry[]
  },
): CheckItem[] {
  const taken = new Set(
    living(of.entries).flatMap(({ body }) => ('checkId' in body ? [body.checkId] : [])),
  )
  return [...new Set(of.symptoms.flatMap(({ firstLook }) => firstLook))]
    .flatMap((id) => index.checks.get(id) ?? [])
    .filter((check) => !taken.has(check.id) && letsThrough(check.gate, of.features))
}
