import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { chanceOfStranding, strandingBound } from '@/lib/diag/chance-of-stranding'
import { boundAfterClean, chanceLeft } from '@/lib/diag/proof-run'
import { theValue } from './the-value'

describe('stranding again on the way out', () => {
  it('[S7] 0.087 left after 30 clean minutes at 0.05 a minute: 25 minutes out strand with 0.062', () => {
    const left = { chance: chanceLeft(0.3, 0.05, 30), ratePerMinute: 0.05 }
    // 0.0873 x (1 - e^-1.25) = 0.0873 x 0.7135, exponential table.
    expect(theValue(chanceOfStranding([left], 25))).toBeCloseTo(0.0873 * 0.7135, 4)
  })
  it('[F6] a run of the same length would have shown it just as often: the two make up the whole chance', () => {
    // Still there and unseen is what a clean run leaves: p e^(-rt), the rest of p has shown.
    const [chance, ratePerMinute, minutes] = [0.3, 0.02, 40]
    const shown = theValue(chanceOfStranding([{ chance, ratePerMinute }], minutes))
    const unseen = (1 - shown) * chanceLeft(chance, ratePerMinute, minutes)
    expect(shown + unseen).toBeCloseTo(chance, 12)
  })
  it('[F6] none left strand never, a sure one that always shows surely, an hour at rest not at all', () => {
    const sure = { chance: 1, ratePerMinute: 1e6 }
    expect(theValue(chanceOfStranding([], 60))).toBe(0)
    expect(theValue(chanceOfStranding([sure], 60))).toBe(1)
    expect(theValue(chanceOfStranding([sure], 0))).toBe(0)
  })
  it('[F6] several are the plain product of what each lets through', () => {
    const one = fc.record({
      chance: fc.double({ min: 0, max: 1, noNaN: true }),
      ratePerMinute: fc.double({ min: 0, max: 2, noNaN: true }),
    })
    fc.assert(
      fc.property(fc.array(one, { maxLength: 6 }), fc.integer({ min: 0, max: 600 }), (all, t) => {
        const through = all.reduce(
          (p, { chance, ratePerMinute }) =>
            p * (1 - chance + chance * Math.exp(-ratePerMinute * t)),
          1,
        )
        const got = theValue(chanceOfStranding(all, t))
        expect(got).toBeCloseTo(1 - through, 12)
        expect(got).toBeGreaterThanOrEqual(0)
        expect(got).toBeLessThanOrEqual(1)
      }),
      { seed: 81 },
    )
    const small = { chance: 1e-12, ratePerMinute: 1e-6 }
    expect(theValue(chanceOfStranding([small], 10)) / 1e-17).toBeCloseTo(1, 4)
  })
  it('[F6] 29 clean starts bound one start at 0.098 and three at 0.266 (Clopper and Pearson)', () => {
    const share = boundAfterClean(29)
    expect(theValue(strandingBound(share, 1))).toBeCloseTo(0.0981, 4)
    // (1 - share)^29 is 0.05, so that three starts pass with 0.05^(3/29).
    expect(theValue(strandingBound(share, 3))).toBeCloseTo(1 - 0.05 ** (3 / 29), 12)
    expect([0, 1].map((s) => theValue(strandingBound(s, 2)))).toEqual([0, 1])
    expect(theValue(strandingBound(1, 0))).toBe(0)
  })
  it('[A1] names what cannot be', () => {
    const of = (chance: number, ratePerMinute: number, t = 10) =>
      chanceOfStranding(
        [
          { chance: 0.1, ratePerMinute: 0.1 },
          { chance, ratePerMinute },
        ],
        t,
      )
    expect(of(1.1, 0)).toMatchObject({ problem: { kind: 'above', field: 'chance.2' } })
    expect(of(0.1, -1)).toMatchObject({ problem: { kind: 'below', field: 'ratePerMinute.2' } })
    expect(of(0.1, 0.1, Number.NaN)).toMatchObject({ problem: { field: 'rideMinutes' } })
    expect(strandingBound(0.1, 1.5)).toMatchObject({ problem: { field: 'starts' } })
    expect(strandingBound(Number.NaN, 1)).toMatchObject({ problem: { field: 'share' } })
  })
})
