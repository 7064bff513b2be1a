import { describe, expect, it } from 'vitest'
import { tellsNothing, weighsNothing } from '@/lib/diag/news'

describe('what counts as news', () => {
  it('[F4] chances within 3 of 100 of each other tell nothing', () => {
    expect(tellsNothing([0.1, 0.125, 0.129])).toBe(true)
    expect(tellsNothing([0.1, 0.131])).toBe(false)
    expect([tellsNothing([]), tellsNothing([0.4])]).toEqual([true, true])
  })

  it('[F5] evidence weighs nothing by its own word, or under 0.005 in either direction', () => {
    const of = (logRatio: number, saysNothing = false) => weighsNothing({ logRatio, saysNothing })
    expect([of(0.0049), of(-0.0049), of(2, true)]).toEqual([true, true, true])
    expect([of(0.005), of(-0.005)]).toEqual([false, false])
  })
})
