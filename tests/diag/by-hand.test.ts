import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { indexBook } from '@/lib/diag/book-index'
import { planModel } from '@/lib/diag/plan-model'
import { caseOf, MEANS } from '../bench/codebook/drive'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: [...BOOK_ITEMS] })
const told = { kind: 'sideBySide', fuelling: 'injection', battery: 'yes', strokes: 'four' } as const
const c = caseOf({ index, told, symptom: 'limpMode', bodies: [] })
const EMPTY = { id: '', personId: '', parts: [], tools: [], meterIds: [] }
const repairOf = (bag: typeof MEANS.bag) =>
  planModel(c, { ...MEANS, bag }).model.faults.find((f) => f.id === 'groundPoor')?.repair

test('[R5] a ground that is cleaned and tightened needs no strap from the bag, and is then less sure', () => {
  const [withAll, byHand] = [repairOf(null), repairOf(EMPTY)]
  expect(withAll?.needsPart).toBe('groundStrap')
  expect(byHand).not.toBeNull()
  expect(byHand).not.toHaveProperty('needsPart')
  expect(byHand?.success ?? 1).toBeLessThan(withAll?.success ?? 0)
})

test('[R5] a repair that needs its part stays out of the plan without it', () => {
  const { leftOut } = planModel(c, { ...MEANS, bag: EMPTY })
  expect(leftOut.some((one) => one.kind === 'repair' && / in the bag\.$/.test(one.reason))).toBe(
    true,
  )
})
