import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { indexBook } from '@/lib/diag/book-index'
import { ANSWERED_CASES } from '../bench/codebook/cases'
import { SOMETHING_ELSE_TRUE } from '../bench/codebook/stranded'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: [...BOOK_ITEMS] })

test.each(ANSWERED_CASES)('$stranded.name: all that is told of it is in the book', (of) => {
  const { stranded, answered } = of
  const symptom = index.symptoms.get(stranded.symptom)
  const unknown = [
    ...stranded.faults.filter((f) => f !== SOMETHING_ELSE_TRUE && !index.faults.has(f)),
    ...answered.conditions.filter((id) => !symptom?.conditions.some((c) => c.id === id)),
    ...[answered.ends, ...Object.values(answered.after ?? {})].flatMap((ends) =>
      Object.entries(ends).flatMap(([check, end]) =>
        index.checks.get(check)?.outcomes.some((o) => o.id === end) ? [] : [`${check} ${end}`],
      ),
    ),
    ...Object.keys(answered.swaps).filter((id) => !index.swaps.has(id)),
    ...answered.cannot.filter((id) => !index.checks.has(id)),
  ]
  expect(unknown).toEqual([])
})
