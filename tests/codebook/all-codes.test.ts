import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { PCODES } from '@/db/codebook/pcodes'
import { SPNS } from '@/db/codebook/spn'

test('[CB3] the whole book bears out every circuit and every story that its codes name', () => {
  const kept = BOOK_ITEMS.filter((item) => item.kind === 'spn' || item.kind === 'pcode')
  expect(kept).toEqual([...SPNS, ...PCODES])
})
