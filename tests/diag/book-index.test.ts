import { describe, expect, it } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { indexBook, swapsFor } from '@/lib/diag/book-index'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
const check = index.checks.get('coilPrimaryResistance')
if (check === undefined) throw new Error('the code book has no coilPrimaryResistance')

describe('the swaps of a check', () => {
  it('[F4] are those of the faults it tells apart, by table or by reading', () => {
    expect(swapsFor(index, check).map((swap) => swap.id)).toContain('coilSwap')
    const byTable = { ...check, reading: null, table: { ignitionCoilPart: [] } }
    expect(swapsFor(index, byTable).map((swap) => swap.fault)).toEqual(['ignitionCoilPart'])
  })

  it('[F4] are none where the check tells none of their faults apart', () => {
    expect(swapsFor(index, { ...check, reading: null, table: {} })).toEqual([])
  })
})
