import type { BookIndex } from '@/lib/diag/book-index'
import { explainCode } from '@/lib/diag/code-words'
import type { BookNames } from './tell-entry'

/** The names of one code book version; without a book every id stands for itself. */
export function bookNames(index: BookIndex | null): BookNames {
  return {
    symptom: (id) => index?.symptoms.get(id)?.name ?? id,
    check: (id) => index?.checks.get(id)?.name ?? id,
    outcome(checkId, outcome) {
      const found = index?.checks.get(checkId)?.outcomes.find(({ id }) => id === outcome)
      return { name: found?.name ?? outcome, good: found?.good ?? null }
    },
    swap: (id) => index?.swaps.get(id)?.name ?? id,
    fault: (id) => index?.faults.get(id)?.name ?? id,
    code(seen) {
      if (!index) return null
      const words = explainCode(index, seen)
      if (words.unknown) return 'Not in the code book: kept as shown.'
      const said = [words.circuitName, words.failure?.name].filter(Boolean).join(': ')
      return `${said.slice(0, 1).toUpperCase()}${said.slice(1)}.`
    },
  }
}
