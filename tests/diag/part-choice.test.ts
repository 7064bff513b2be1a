import { describe, expect, it } from 'vitest'
import { condemnedBy } from '@/lib/diag/condemned-by'
import { adviceFor, adviceRecord, advisePart, breakEven } from '@/lib/diag/part-choice'

describe('genuine or aftermarket part, from the spec sheet', () => {
  const coil = {
    part: 'ignitionCoil',
    genuineNumber: 'TM-4501-041',
    genuineMinor: 13_500,
    aftermarketNumber: 'AX-7741',
    aftermarketMinor: 2500,
    genuineFailsOf100: 2,
    aftermarketFailsOf100: 12,
    source: 'the demo shop (invented)',
  }

  it('[A1] figures that cannot be give no advice, and never one that is no number', () => {
    for (const wrong of [
      { genuineFailsOf100: 102 },
      { genuineFailsOf100: -1 },
      { aftermarketFailsOf100: 101 },
      { aftermarketMinor: -2500 },
    ])
      expect(adviceFor({ ...coil, ...wrong }, 30_000)).toBeNull()
    expect(adviceFor(coil, -1)).toBeNull()
    const figures = { genuineMinor: 1, aftermarketMinor: 1, recoveryMinor: 1, genuineFails: 0 }
    expect(() => breakEven({ ...figures, genuineFails: Number.NaN })).toThrow('figureOutOfRange')
    expect(() => advisePart({ ...figures, aftermarketFails: 2 })).toThrow('figureOutOfRange')
  })

  // By hand: 2 of 100 + (135 - 25) / 300 = 38.67 of 100; 135 + 0.02 x 300 = 141 and 25 + 0.12 x 300 = 61.
  it('[F8] goes with the request as it was shown, in shares', () => {
    const record = adviceRecord(adviceFor(coil, 30_000))
    expect(record).toEqual({
      genuineMinor: 13_500,
      aftermarketMinor: 2500,
      recoveryMinor: 30_000,
      genuineFails: 0.02,
      aftermarketFails: 0.12,
      breakEven: expect.closeTo(0.38667, 5),
      advised: 'aftermarket',
    })
    expect(adviceRecord(null)).toBeNull()
  })

  it('[F8] the advice turns at the break-even', () => {
    const at = (aftermarketFailsOf100: number) =>
      adviceFor({ ...coil, aftermarketFailsOf100 }, 30_000)?.advice.advised
    expect([at(38), at(39)]).toEqual(['aftermarket', 'genuine'])
  })

  it('[F8] without a figure there is a break-even and no advice, without a choice neither', () => {
    const advised = adviceFor({ ...coil, aftermarketFailsOf100: null }, 30_000)
    expect(advised?.advice).toMatchObject({ advised: 'noFigure', expectedAftermarketMinor: null })
    expect(advised?.advice.breakEven).toBeCloseTo(0.38667, 5)
    expect(adviceFor({ ...coil, aftermarketMinor: null }, 30_000)).toBeNull()
    expect(adviceFor(coil, null)).toBeNull()
    expect(adviceFor(null, 30_000)).toBeNull()
  })
})

describe('what a part line is asked for', () => {
  it('[R14] a line names the entry that spoke most for the fault', () => {
    const why = (
      entryId: string,
      about: 'swap' | 'reading' | 'code' | 'check',
      logRatio: number,
    ) => ({
      entryId,
      about,
      logRatio,
      label: '',
      saysNothing: false,
    })
    const of = (...list: ReturnType<typeof why>[]) => condemnedBy({ why: list })
    expect(of(why('a', 'swap', 2), why('b', 'reading', 0.3), why('c', 'code', 5))).toBe('a')
    expect(of(why('a', 'check', -2))).toBeNull()
    expect(of(why('a', 'check', 0.11))).toBe('a')
    expect(of(why('a', 'check', 0.1))).toBeNull()
  })
})
