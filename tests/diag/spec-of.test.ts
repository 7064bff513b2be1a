import { describe, expect, it } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { indexBook } from '@/lib/diag/book-index'
import { specOf } from '@/lib/diag/spec-of'

const { checks } = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
const check = (id: string) => {
  const found = checks.get(id)
  if (found === undefined) throw new Error(`the code book has no ${id}`)
  return found
}
const sheet = DEMO_MODELS[0]?.specSheet ?? null

describe('the figure that judges a check', () => {
  it('[R18] is the one of the spec sheet where it has one', () => {
    const judged = specOf(check('coilPrimaryResistance'), sheet)
    expect(judged).toMatchObject({ from: 'sheet', component: { id: 'ignitionCoil1' } })
    expect(judged.value).toMatchObject({ id: 'primaryResistance', nominal: 0.5 })
  })

  it('[R18] is common practice where the sheet has none, and said to be', () => {
    const judged = specOf(check('batteryRest'), null)
    expect(judged).toMatchObject({ from: 'practice', component: null, value: { nominal: null } })
    expect(judged.value?.source).not.toBe('')
  })

  it('[R18] is none where neither has one, and for a check without a reading', () => {
    const none = { value: null, from: 'none' }
    expect(specOf(check('coilPrimaryResistance'), null)).toEqual({ ...none, component: null })
    const bare = { ...check('batteryRest'), reading: null }
    expect(specOf(bare, sheet)).toEqual({ ...none, component: null })
  })
})
