import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { SOMETHING_ELSE } from '@/lib/diag/book-index'
import type { Case } from '@/lib/diag/case'
import { candidates, chanceOfTwo, solveC } from '@/lib/diag/priors'
import type { LogBody } from '@/lib/model/log-entry'
import { caseOf, log } from './fixtures/entries'

const chances = (c: Case): Record<string, number> =>
  Object.fromEntries(belief(c).suspects.map((s) => [s.fault, s.chance]))
const of = (...bodies: LogBody[]) => chances(caseOf(log(...bodies)))

describe('[R5] from shares to priors', () => {
  it('[R5] m = 5 gives c of 0.11 to 0.14, m = 10 gives 0.23 to 0.29, for lists as they are elicited', () => {
    const even = (n: number) => Array.from({ length: n }, () => 1 / n)
    for (const shares of [even(4), even(10), [0.4, 0.25, 0.2, 0.1, 0.05]]) {
      expect(solveC(shares, 0.05)).toBeGreaterThan(0.105)
      expect(solveC(shares, 0.05)).toBeLessThan(0.145)
      expect(solveC(shares, 0.1)).toBeGreaterThan(0.215)
      expect(solveC(shares, 0.1)).toBeLessThan(0.295)
      expect(chanceOfTwo(shares, solveC(shares, 0.05))).toBeCloseTo(0.05, 12)
    }
  })
  it('[R5] without evidence two or more are wrong in m of 100, and nothing is rescaled to 100', () => {
    const b = belief(caseOf([]))
    expect(b.chanceOfTwoOrMore).toBeCloseTo(0.05, 10)
    expect(b.suspects.reduce((sum, s) => sum + s.chance, 0)).toBeGreaterThan(1.04)
    expect(b.notices).toEqual([])
  })
  it('[R4] gated faults are not listed, their share leaves the scale, an unknown feature widens', () => {
    expect(Object.keys(of()).sort()).toEqual(['coil', 'driver', 'filter', SOMETHING_ELSE, 'wire'])
    expect(chances(caseOf([], { features: {} })).jets).toBeGreaterThan(0)
    const scaled = candidates(caseOf([]))
    expect(scaled.reduce((sum, s) => sum + s.of100, 0)).toBeCloseTo(100, 10)
    expect(scaled.find((s) => s.fault === 'coil')?.of100).toBeCloseTo((100 * 30) / 85, 10)
    expect(scaled.find((s) => s.fault === SOMETHING_ELSE)?.of100).toBeCloseTo((100 * 10) / 85, 10)
  })
  it('[R5] something else is always a suspect, alone when no symptom is known', () => {
    const b = belief(caseOf([], { symptom: null }))
    expect(b.suspects.map((s) => [s.fault, s.chance])).toEqual([[SOMETHING_ELSE, 1]])
    expect(b.notices).toEqual(['maybeNotInList'])
  })
  it('[R5] the complaint is the condition and moves nothing when it is taken down again', () => {
    expect(of({ kind: 'symptom', symptom: 'stalls', conditions: [], words: null })).toEqual(of())
  })
})
