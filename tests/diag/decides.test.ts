import { describe, expect, it } from 'vitest'
import type { Suspect } from '@/lib/diag/belief'
import { SOMETHING_ELSE } from '@/lib/diag/book-index'
import { effectsOf } from '@/lib/diag/decides'
import type { Outcome } from '@/lib/diag/outlook'

const suspect = (fault: string, chance: number): Suspect => ({
  fault,
  name: fault,
  chance,
  prior: chance,
  ruledOutBy: null,
  why: [],
})
const row = (probability: number, chances: Record<string, number>): Outcome => ({
  outcome: `${probability}`,
  name: '',
  good: false,
  probability,
  chances,
})
const kindsOf = (rows: Outcome[], suspects: Suspect[]) =>
  effectsOf(rows, suspects).map(({ effect }) => [effect?.kind, effect?.suspect.fault])
const two = [suspect('stator', 0.46), suspect('regulator', 0.31)]

describe('what an outcome decides', () => {
  it('[F5] "it is" from 90 of 100 on, and never for something else', () => {
    expect(kindsOf([row(1, { stator: 0.9 })], two)).toEqual([['itIs', 'stator']])
    expect(kindsOf([row(1, { stator: 0.89 })], two)).toEqual([['first', 'stator']])
    const other = [suspect(SOMETHING_ELSE, 0.5)]
    expect(kindsOf([row(1, { [SOMETHING_ELSE]: 0.95 })], other)).toEqual([
      ['first', SOMETHING_ELSE],
    ])
  })

  it('[F5] "all but cleared" under 10 of 100, only for one that stood at 20 or more', () => {
    const leaves = (stator: number) => [row(1, { stator, regulator: 0.4 })]
    expect(kindsOf(leaves(0.099), two)).toEqual([['allButCleared', 'stator']])
    expect(kindsOf(leaves(0.1), two)).toEqual([['first', 'regulator']])
    const low = [suspect('stator', 0.19), suspect('regulator', 0.18)]
    expect(kindsOf(leaves(0.05), low)).toEqual([['first', 'regulator']])
  })

  it('[F5] says the three likeliest in their own order, none under 8 of 100', () => {
    const rows = [row(0.079, {}), row(0.1, {}), row(0.4, {}), row(0.09, {}), row(0.331, {})]
    expect(effectsOf(rows, two).map(({ outcome }) => outcome.probability)).toEqual([
      0.1, 0.4, 0.331,
    ])
    expect(effectsOf([row(0.08, {}), row(0.92, {})], two)).toHaveLength(2)
    expect(effectsOf([row(0.079, {}), row(0.921, {})], two)).toHaveLength(1)
  })

  it('[F5] changes nothing where there is no suspect', () => {
    expect(effectsOf([row(1, {})], [])).toMatchObject([{ effect: null }])
  })
})
