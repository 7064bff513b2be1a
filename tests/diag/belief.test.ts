import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { belief, logOdds } from '@/lib/diag/belief'
import type { Case } from '@/lib/diag/case'
import type { LogBody } from '@/lib/model/log-entry'
import { caseOf, checked, code, couldNot, log, ohms, swapped } from './fixtures/entries'

const chances = (c: Case): Record<string, number> =>
  Object.fromEntries(belief(c).suspects.map((s) => [s.fault, s.chance]))
const of = (...bodies: LogBody[]) => chances(caseOf(log(...bodies)))

/** Every kind of evidence the log can hold, on the small book. */
const PIECES: LogBody[] = [
  code(1268, 3),
  code(1268, 5, 'stored'),
  code(168, 1),
  checked('plug', 'bad'),
  checked('flow', 'good'),
  checked('spark', 'so'),
  checked('module', 'bad'),
  checked('blank', 'bad'),
  couldNot('flow'),
  ohms(1.0),
  ohms(1.0, { subject: 'knownGood' }),
  { kind: 'symptom', symptom: 'weak', conditions: [], words: null },
  swapped('spareFitted', false),
  swapped('oldRefitted', true),
]

describe('[E1] what evidence does', () => {
  it('[E1] the order in which entries arrive does not matter', () => {
    fc.assert(
      fc.property(fc.shuffledSubarray(PIECES.map((_, i) => i)), (order) => {
        const entries = log(...PIECES)
        const kept = [...order].sort((a, b) => a - b).map((i) => entries[i]!)
        const arrived = order.map((i) => entries[i]!)
        expect(belief(caseOf(arrived))).toEqual(belief(caseOf(kept)))
      }),
      { seed: 3, numRuns: 40 },
    )
  })
  it('[E1] nor does the order in which independent evidence was taken, to 1e-12', () => {
    const some = PIECES.filter((p) => p.kind !== 'swap' && p.kind !== 'couldNot')
    const want = of(...some)
    fc.assert(
      fc.property(fc.shuffledSubarray(some, { minLength: some.length }), (order) => {
        const got = of(...order)
        for (const [f, p] of Object.entries(want))
          expect(Math.abs((got[f] ?? -1) - p)).toBeLessThan(1e-12)
      }),
      { seed: 4, numRuns: 40 },
    )
  })
  it('[E1] every chance lies within 0 and 1, no evidence sets one to nought, and "why" sums to 1e-9', () => {
    fc.assert(
      fc.property(fc.shuffledSubarray(PIECES), (bodies) => {
        const b = belief(caseOf(log(...bodies)))
        for (const s of b.suspects) {
          expect(s.chance).toBeGreaterThan(0)
          expect(s.chance).toBeLessThanOrEqual(1)
          const sum = s.why.reduce((total, w) => total + w.logRatio, 0)
          expect(Math.abs(logOdds(s.chance) - logOdds(s.prior) - sum)).toBeLessThan(1e-9)
          for (const w of s.why) if (w.saysNothing) expect(w.logRatio).toBe(0)
        }
      }),
      { seed: 5, numRuns: 60 },
    )
  })
  it('[E1] a check that reads the same in every state changes nothing, exactly, and says so', () => {
    expect(of(code(1268, 3), checked('blank', 'bad'))).toEqual(of(code(1268, 3)))
    const why = belief(caseOf(log(checked('blank', 'bad')))).suspects[0]?.why
    expect(why?.at(-1)).toMatchObject({ about: 'check', saysNothing: true, logRatio: 0 })
  })
  it('[E1] "could not do" is no evidence', () => {
    expect(of(couldNot('plug'))).toEqual(of())
  })
  it('[E1] the same check again is not new evidence: the latest replaces', () => {
    expect(of(checked('plug', 'bad'), checked('plug', 'bad'))).toEqual(of(checked('plug', 'bad')))
    expect(of(checked('plug', 'bad'), checked('plug', 'good'))).toEqual(of(checked('plug', 'good')))
    expect(of(ohms(1.0), ohms(1.4))).toEqual(of(ohms(1.4)))
  })
  it('[R8] good and bad are understood as the first and last outcome, odd and too close as nothing', () => {
    expect(of(checked('spark', 'bad'))).toEqual(of(checked('spark', 'poor')))
    expect(of(checked('spark', 'good'))).toEqual(of(checked('spark', 'fine')))
    expect(of(checked('spark', 'odd'))).toEqual(of())
  })
  it('[R8] a correction takes an entry out; a corrected correction puts it back; a replacement stays', () => {
    const correction = (of_: number) => ({
      body: { kind: 'correction', reason: 'slip' } as LogBody,
      supersedes: of_,
    })
    const bad = checked('plug', 'bad')
    expect(chances(caseOf(log(bad, correction(0))))).toEqual(of())
    expect(chances(caseOf(log(bad, correction(0), correction(1))))).toEqual(of(bad))
    expect(chances(caseOf(log(bad, { body: checked('plug', 'good'), supersedes: 0 })))).toEqual(
      of(checked('plug', 'good')),
    )
  })
  it('[E1] what is ruled out stands last and names the entry that did it', () => {
    const b = belief(
      caseOf(
        log(
          code(1268, 3),
          checked('spark', 'poor'),
          checked('flow', 'good'),
          swapped('spareFitted', false),
          swapped('oldRefitted', true),
        ),
      ),
    )
    const out = b.suspects.filter((s) => s.ruledOutBy !== null)
    expect(out.map((s) => s.fault)).toContain('filter')
    expect(b.suspects.slice(-out.length)).toEqual(out)
    expect(b.suspects[0]?.fault).toBe('coil')
  })
  it('[R5] notices: more than one likely, and maybe not in the list', () => {
    const two = belief(caseOf(log(code(1268, 3), checked('flow', 'bad'), checked('plug', 'bad'))))
    expect(two.chanceOfTwoOrMore).toBeGreaterThan(0.25)
    expect(two.notices).toContain('moreThanOneLikely')
    const other = belief(
      caseOf(
        log(
          checked('flow', 'good'),
          checked('spark', 'fine'),
          checked('plug', 'good'),
          checked('module', 'good'),
        ),
      ),
    )
    expect(other.chanceOnlySomethingElse).toBeGreaterThan(0.25)
    expect(other.notices).toEqual(['maybeNotInList'])
  })
})
