import type { BookChange, ChangedKind } from '@/lib/diag/book-changes'

const KIND_WORDS: Record<ChangedKind, string> = {
  symptoms: 'Complaints',
  faults: 'Faults',
  checks: 'Checks',
  swaps: 'Swaps',
}
/** So many names are said, the others are counted (a choice). */
const MOST_NAMES = 4

/** One line for each kind in which something changed: "Checks: new Hot restart; changed Coil, Fuse and 2 more." */
export const bookChangeLines = (changes: readonly BookChange[]): string[] =>
  changes.map(({ kind, added, changed, gone }) => {
    const parts = [
      ['new', added],
      ['changed', changed],
      ['gone', gone],
    ] as const
    const said = parts.filter(([, names]) => names.length > 0)
    return `${KIND_WORDS[kind]}: ${said.map(([how, names]) => `${how} ${namesIn(names)}`).join('; ')}.`
  })

function namesIn(names: readonly string[]): string {
  const shown = names.slice(0, MOST_NAMES).join(', ')
  const more = names.length - MOST_NAMES
  return more > 0 ? `${shown} and ${more} more` : shown
}
