import { expect, test } from 'vitest'
import { indexBook } from '@/lib/diag/book-index'
import { knownSymptoms, looksLeft, opensWayOut } from '@/lib/diag/first-look'
import type { CodeBookItem } from '@/lib/model/code-book'
import { checked, couldNot, log } from './fixtures/entries'
import { SMALL_ITEMS } from './fixtures/small-book'

const CHECKS = SMALL_ITEMS.flatMap((item) => (item.kind === 'check' ? [item.id] : [])).slice(0, 2)
const [first = '', second = ''] = CHECKS

/** The small book where one complaint begins with two looks, and another is no fault. */
const index = indexBook({
  version: 1,
  hash: '',
  publishedAt: '',
  items: SMALL_ITEMS.map((item): CodeBookItem => {
    if (item.id === 'stalls' && item.kind === 'symptom') return { ...item, firstLook: CHECKS }
    if (item.id === 'weak' && item.kind === 'symptom') return { ...item, opens: 'wayOut' }
    return item.id === second && item.kind === 'check' ? { ...item, gate: { kind: ['atv'] } } : item
  }),
})
const stalls = knownSymptoms(index, ['stalls'])
const weak = knownSymptoms(index, ['weak'])
const left = (entries: ReturnType<typeof log>, features = {}) =>
  looksLeft(index, { symptoms: stalls, features, entries }).map(({ id }) => id)

test('[F1] a complaint begins with its looks, in their order', () => {
  expect(left([])).toEqual([first, second])
})

test('[F1] a look that was taken, or could not be, leaves the list; one taken back returns', () => {
  expect(left(log(checked(first, 'good')))).toEqual([second])
  expect(left(log(couldNot(first)))).toEqual([second])
  const back = log(checked(first, 'good'), {
    body: { kind: 'correction', reason: 'wrong machine' },
    supersedes: 0,
  })
  expect(left(back)).toEqual([first, second])
})

test('[R4] a look the machine does not allow is not offered', () => {
  expect(left([], { kind: 'snowmobile' })).toEqual([first])
})

test('[R4] a complaint that is no fault opens the way out, unless another one is a fault', () => {
  expect(opensWayOut(weak)).toBe(true)
  expect(opensWayOut([...weak, ...stalls])).toBe(false)
  expect(opensWayOut([])).toBe(false)
  expect(opensWayOut(knownSymptoms(index, ['not in the book']))).toBe(false)
})
