import type { BookImported, BookVersionRow, Finding } from '@/lib/model/book-desk'
import { counted } from '../../field/words'

/** Kinds a person counts, in the order of a sentence. */
const KINDS = [
  ['symptom', 'complaint'],
  ['fault', 'fault'],
  ['check', 'check'],
  ['swap', 'swap'],
  ['spn', 'SPN'],
  ['pcode', 'P-code'],
] as const

/** "23 complaints, 130 faults, 131 checks". */
export const countWords = (counts: BookVersionRow['counts']): string =>
  KINDS.flatMap(([kind, word]) => {
    const count = counts[kind] ?? 0
    return count === 0 ? [] : [counted(count, word)]
  }).join(', ')

/** So many names are said of each list (a choice). */
const MOST = 8

/** What changed since another version, a line for each way. */
export function sinceLines(since: NonNullable<BookVersionRow['since']>): string[] {
  const lists = [
    ['New', since.added],
    ['Changed', since.changed],
    ['Gone', since.gone],
  ] as const
  const lines = lists.filter(([, names]) => names.length > 0)
  if (lines.length === 0) return [`The same as version ${since.version}.`]
  return lines.map(([how, names]) => {
    const more = names.length - MOST
    const shown = names.slice(0, MOST).join(', ')
    return `${how} since version ${since.version} (${names.length}): ${shown}${more > 0 ? ` and ${more} more` : ''}.`
  })
}

/** A finding with its place in the file, if it came from one. */
export function findingLine({ id, words, place }: Finding): string {
  const where = place ? `${place.file}, line ${place.line}, column ${place.column}: ` : ''
  return `${where}${id}: ${words}`
}

/** What is wrong with a file that was taken in, a line each. */
export const problemLines = ({ problems }: BookImported): string[] =>
  problems.map(
    ({ file, line, column, words }) => `${file}, line ${line}, column ${column}: ${words}`,
  )
