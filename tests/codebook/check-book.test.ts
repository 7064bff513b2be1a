import { expect, test } from 'vitest'
import { BOOK_ITEMS, UNSEPARATED } from '@/db/codebook/book'
import { BOOK_PROBLEMS } from '@/db/codebook/book-problem'
import { checkBook } from '@/db/codebook/check-book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { LIST_BREAKS } from './breaks-lists'
import { RECORD_BREAKS } from './breaks-records'
import { WORD_BREAKS } from './breaks-words'
import { copyBook } from './broken-book'

const BREAKS = [...RECORD_BREAKS, ...LIST_BREAKS, ...WORD_BREAKS]

test.each(BREAKS)('[%s] is found as %s', (_, kind, at, breakIt) => {
  const book = copyBook()
  breakIt(book)
  const found = checkBook(book.items, book.models).filter((p) => p.kind === kind)
  expect(found.map((p) => p.id).join(' ')).toMatch(at)
})

test('[CB1] every kind of finding has a book that makes it', () => {
  const broken = new Set(BREAKS.map(([, kind]) => kind))
  expect(BOOK_PROBLEMS.filter((kind) => !broken.has(kind))).toEqual([])
})

test('[CB11] a pair left together needs a reason, and a reason needs such a pair', () => {
  const stale = [{ faults: ['ignitionCoilPart', 'fuelStale'] as const, reason: 'none' }]
  expect(checkBook(BOOK_ITEMS, DEMO_MODELS, stale)).toContainEqual(
    expect.objectContaining({ kind: 'inseparable', id: 'fuelStale and ignitionCoilPart' }),
  )
})

test('[CB1] the book that is published makes no finding', () => {
  expect(checkBook(BOOK_ITEMS, DEMO_MODELS, UNSEPARATED)).toEqual([])
})
