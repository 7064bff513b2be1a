import { describe, expect, it } from 'vitest'
import {
  binomialCdf,
  clopperPearson,
  poissonCdf,
  poissonInterval,
} from '@/lib/diag/exact-intervals'
import {
  boundAfterClean,
  chanceLeft,
  chanceOfAtMost,
  cleanMinutesFor,
  cleanStartsFor,
  minutesFor,
  proofBound,
  rateBound,
  ruleOfThree,
  upperBound,
} from '@/lib/diag/proof-run'

describe('exact Poisson intervals (Garwood 1936)', () => {
  it.each([
    [0, 0, 3.6889, 0, 2.9957],
    [1, 0.0253, 5.5716, 0.0513, 4.7439],
    [2, 0.2422, 7.2247, 0.3554, 6.2958],
    [3, 0.6187, 8.7673, 0.8177, 7.7537],
    [5, 1.6235, 11.6683, 1.9701, 10.513],
    [6, 2.2019, 13.0595, 2.613, 11.8424],
    [7, 2.8144, 14.4227, 3.2853, 13.1481],
    [8, 3.4538, 15.7632, 3.9808, 14.4346],
    [9, 4.1154, 17.0848, 4.6952, 15.7052],
    [10, 4.7954, 18.3904, 5.4254, 16.9622],
    [20, 12.2165, 30.8884, 13.2547, 29.062],
    [100, 81.364, 121.6268, 84.1393, 118.0793],
  ])('[STD] %i events: 95 %% %f to %f, 90 %% %f to %f', (n, low95, high95, low90, high90) => {
    const at95 = poissonInterval(n, 0.95)
    const at90 = poissonInterval(n, 0.9)
    expect([at95.low, at95.high, at90.low, at90.high]).toEqual(
      [low95, high95, low90, high90].map((x) => expect.closeTo(x, 4)),
    )
  })
})

describe('exact binomial intervals (Clopper and Pearson 1934)', () => {
  it.each([
    [682, 925, 0.7076683, 0.7654066, 7],
    [0, 10, 0, 0.3085, 4],
    [1, 10, 0.00253, 0.44502, 5],
    [5, 10, 0.18709, 0.81291, 5],
    [10, 10, 0.6915, 1, 4],
    [0, 30, 0, 0.1157, 4],
  ])('[STD] %i of %i: %f to %f (Conover; recomputed)', (k, n, low, high, digits) => {
    const got = clopperPearson(k, n)
    expect([got.low, got.high]).toEqual([expect.closeTo(low, digits), expect.closeTo(high, digits)])
  })
  it('[A1] 1 of a thousand million is Garwood’s 5.5716 and 0.0253 over it, all but one its mirror', () => {
    const n = 1e9
    const { low, high } = clopperPearson(1, n)
    expect([n * low, n * high]).toEqual([expect.closeTo(0.0253, 4), expect.closeTo(5.5716, 4)])
    const most = clopperPearson(n - 1, n)
    expect([n * (1 - most.high), n * (1 - most.low)]).toEqual([
      expect.closeTo(0.0253, 4),
      expect.closeTo(5.5716, 4),
    ])
  })
})

describe('counts that cannot be', () => {
  it('[A1] break an assumption and give no NaN', () => {
    for (const bad of [
      () => poissonInterval(Number.NaN),
      () => poissonInterval(-1),
      () => poissonInterval(2.5),
      () => poissonInterval(1e9),
      () => clopperPearson(1.5, 2),
      () => clopperPearson(5e8, 1e9),
      () => poissonCdf(1, Number.NaN),
      () => poissonCdf(Number.POSITIVE_INFINITY, 1),
      () => binomialCdf(1, 2, 1.1),
      () => binomialCdf(Number.NaN, 2, 0.5),
      () => boundAfterClean(-1),
      () => boundAfterClean(Number.NaN),
      () => upperBound(1, Number.POSITIVE_INFINITY),
      () => ruleOfThree(Number.NaN),
      () => cleanStartsFor(Number.NaN),
      () => cleanStartsFor(0.1, 1),
      () => proofBound({ starts: Number.NaN, faults: 0 }),
      () => chanceLeft(1.1, 0.05, 30),
      () => chanceLeft(0.3, -1, 30),
      () => chanceLeft(0.3, 0.05, Number.POSITIVE_INFINITY),
      () => minutesFor(0.3, 0.05, Number.NaN),
      () => poissonInterval(3, 1),
      () => clopperPearson(3, 2),
      () => clopperPearson(0, 0),
      () => clopperPearson(1, 2, Number.NaN),
    ])
      expect(bad).toThrow('figureOutOfRange')
  })
})

describe('proof runs', () => {
  it('[F7] 12 clean restarts leave up to 22 of 100; the 3/n rule says 25', () => {
    expect(boundAfterClean(12)).toBeCloseTo(0.2209, 4)
    expect(ruleOfThree(12)).toBe(0.25)
  })
  it('[F7] five clean restarts leave up to 45 of 100; under 10 of 100 asks 29', () => {
    expect(boundAfterClean(5)).toBeCloseTo(0.45, 2)
    expect(cleanStartsFor(0.1)).toBe(29)
    expect(boundAfterClean(29)).toBeLessThan(0.1)
    expect(boundAfterClean(28)).toBeGreaterThan(0.1)
  })
  it('[F7] the bound is the exact one: at it, this few faults have chance 1 - confidence', () => {
    for (const [k, n] of [
      [0, 12],
      [1, 12],
      [3, 20],
    ] as const)
      expect(chanceOfAtMost(k, n, upperBound(k, n))).toBeCloseTo(0.05, 9)
    expect(upperBound(3, 3)).toBe(1)
    expect(boundAfterClean(0)).toBe(1)
    expect(ruleOfThree(2)).toBe(1)
  })
  it('[S7] chance 0.30 at 0.05 per hot minute: 30 clean minutes leave 0.087, 0.05 asks 42', () => {
    expect(chanceLeft(0.3, 0.05, 30)).toBeCloseTo(0.087, 3)
    expect(minutesFor(0.3, 0.05, 0.05)).toBe(42)
    expect(chanceLeft(0.3, 0.05, 42)).toBeLessThanOrEqual(0.05)
    expect(chanceLeft(0.3, 0.05, 41)).toBeGreaterThan(0.05)
    expect(minutesFor(0.04, 0.05, 0.05)).toBe(0)
  })
  // 1 - 0.05^(1/n) of Clopper and Pearson: 28 starts 0.1015, 29 starts 0.0981.
  it('[F7] counts down to the clean starts that bring it under 10 of 100', () => {
    const more = (starts: number, faults = 0) => proofBound({ starts, faults }).more
    expect([more(0), more(12), more(28), more(29), more(40)]).toEqual([29, 17, 1, 0, 0])
    expect(more(12, 1)).toBeNull()
  })
  it('[F7] bounds nothing without a start, and has no rule of three once the fault came', () => {
    expect(proofBound({ starts: 0, faults: 0 })).toMatchObject({ exact: null, ruleOfThree: null })
    expect(proofBound({ starts: 12, faults: 0 }).exact).toBeCloseTo(0.2209, 4)
    expect(proofBound({ starts: 12, faults: 0 }).ruleOfThree).toBe(0.25)
    const seen = proofBound({ starts: 12, faults: 1 })
    expect(seen).toMatchObject({ exact: upperBound(1, 12), ruleOfThree: null })
  })
  it('[A1] huge counts keep their digits and end soon: 1 fault is 4.7439 over the starts (Garwood, 90 %)', () => {
    expect(1e9 * upperBound(1, 1e9)).toBeCloseTo(4.7439, 4)
    expect(1e12 * boundAfterClean(1e12)).toBeCloseTo(2.9957, 4)
    // Beta(50001, 50000) at 95 of 100 is 0.502606; the counts are divided to the safe side.
    const half = upperBound(50_000, 100_000)
    expect(half).toBeGreaterThan(0.502606)
    expect(half).toBeLessThan(0.51)
    expect(upperBound(Number.MAX_SAFE_INTEGER, Number.MAX_SAFE_INTEGER)).toBe(1)
    expect(upperBound(7, 3)).toBe(1)
  })
  it('[STD] by the minute: 2.9957 over clean minutes, 4.7439 once it came (Garwood 1936, 90 %)', () => {
    expect(60 * rateBound(0, 60)).toBeCloseTo(2.9957, 4)
    expect(60 * rateBound(1, 60)).toBeCloseTo(4.7439, 4)
    expect(rateBound(0, 0)).toBe(Number.POSITIVE_INFINITY)
    // 2.9957 / 0.05 = 59.9: the 60th minute brings it under 0.05 a minute.
    expect(cleanMinutesFor(0.05)).toBe(60)
    expect(rateBound(0, 60)).toBeLessThan(0.05)
    expect(rateBound(0, 59)).toBeGreaterThan(0.05)
    expect(cleanMinutesFor(0)).toBe(Number.POSITIVE_INFINITY)
    // The more sure, the longer: 99 of 100 ask ln 100 / 0.05.
    expect(cleanMinutesFor(0.05, 0.99)).toBe(Math.ceil(Math.log(100) / 0.05))
    expect([cleanStartsFor(0.1, 0.9), cleanStartsFor(0.1, 0.99)]).toEqual([22, 44])
    expect(() => rateBound(0, Number.NaN)).toThrow('figureOutOfRange')
    expect(() => cleanMinutesFor(-1)).toThrow('figureOutOfRange')
  })
  it('[F7] a share of nought asks starts without end, of one none; no rate and no target nothing that helps', () => {
    expect([cleanStartsFor(0), cleanStartsFor(1)]).toEqual([Number.POSITIVE_INFINITY, 0])
    // 1 - 0.95^(1/n): with a share of 0.95 wanted, one clean start is enough, and its bound is met exactly.
    expect(cleanStartsFor(0.95)).toBe(1)
    expect(minutesFor(0.3, 0, 0.05)).toBe(Number.POSITIVE_INFINITY)
    expect(minutesFor(0.3, 0.05, 0)).toBe(Number.POSITIVE_INFINITY)
    expect(minutesFor(1, 0.05, 0.5)).toBe(Number.POSITIVE_INFINITY)
  })
})
