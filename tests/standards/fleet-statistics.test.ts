import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { failureTimes, kaplanMeier, type Life, survivalAt } from '@/lib/diag/kaplan-meier'
import { logGamma } from '@/lib/diag/log-gamma'
import { logRank } from '@/lib/diag/log-rank'
import { fitPowerLaw } from '@/lib/diag/power-law'
import { compareRates, raisesAlarm, rateOf } from '@/lib/diag/rate-comparison'
import { fitWeibull } from '@/lib/diag/weibull'
import { theValue } from './the-value'

/** Lives from a text as the papers print them: a plus marks a censored one. */
const lives = (text: string): Life[] =>
  text.split(' ').map((word) => ({ time: Number.parseFloat(word), failed: !word.endsWith('+') }))

const TREATED = lives('6 6 6 6+ 7 9+ 10 10+ 11+ 13 16 17+ 19+ 20+ 22 23 25+ 32+ 32+ 34+ 35+')
const CONTROL = lives('1 1 2 2 3 4 4 5 5 8 8 8 8 11 11 12 12 15 17 22 23')

describe('two rates by the conditional binomial', () => {
  it('[STD] 2 in 17877 against 9 in 16660: p 0.05011, ratio 0.2070942, 0.02177406 to 1.00054910 (R package vignette, seen)', () => {
    const first = { events: 2, exposure: 17_877 }
    const second = { events: 9, exposure: 16_660 }
    const got = theValue(compareRates(first, second))
    expect(got.p).toBeCloseTo(0.0501065, 6)
    expect(got.ratio).toBeCloseTo(0.2070942, 7)
    expect(got.interval.low).toBeCloseTo(0.02177406, 7)
    expect(got.interval.high).toBeCloseTo(1.0005491, 6)
  })
  it('[A2] turned round, p stays and the ratio and its interval are the inverse', () => {
    const some = fc.record({
      a: fc.integer({ min: 1, max: 60 }),
      b: fc.integer({ min: 1, max: 60 }),
      hours: fc.double({ min: 1, max: 1e5, noNaN: true }),
    })
    fc.assert(
      fc.property(some, ({ a, b, hours }) => {
        const one = { events: a, exposure: hours }
        const other = { events: b, exposure: 1234 }
        const there = theValue(compareRates(one, other))
        const back = theValue(compareRates(other, one))
        expect(back.p).toBeCloseTo(there.p, 9)
        expect(back.ratio * there.ratio).toBeCloseTo(1, 9)
        expect(back.interval.low * there.interval.high).toBeCloseTo(1, 6)
        expect(there.interval.low).toBeLessThan(there.ratio)
        expect(there.interval.high).toBeGreaterThan(there.ratio)
      }),
      { seed: 11, numRuns: 60 },
    )
  })
  it('[A2] hours in days change neither p nor the ratio', () => {
    const hours = theValue(
      compareRates({ events: 3, exposure: 2400 }, { events: 8, exposure: 1200 }),
    )
    const days = theValue(compareRates({ events: 3, exposure: 100 }, { events: 8, exposure: 50 }))
    expect(days.p).toBeCloseTo(hours.p, 12)
    expect(days.ratio).toBeCloseTo(hours.ratio, 12)
  })
  it('[R25] says that it cannot say: no hours, no events, half an event, a count under nought', () => {
    const one = { events: 1, exposure: 10 }
    const problem = (events: number, exposure: number) => compareRates({ events, exposure }, one)
    expect(problem(1, 0)).toEqual({ ok: false, problem: { kind: 'noExposure' } })
    expect(problem(0.5, 10)).toMatchObject({ problem: { field: 'first.events' } })
    expect(problem(-1, 10)).toMatchObject({ problem: { kind: 'below', field: 'first.events' } })
    expect(problem(1, Number.NaN)).toMatchObject({ problem: { field: 'first.exposure' } })
    const none = { events: 0, exposure: 10 }
    expect(compareRates(none, none)).toMatchObject({ problem: { kind: 'noEvents' } })
    expect(rateOf({ events: 1, exposure: 0 })).toMatchObject({ problem: { kind: 'noExposure' } })
  })
  it('[A2] no event on the one side leaves the interval open on that side alone', () => {
    const none = { events: 0, exposure: 100 }
    const five = { events: 5, exposure: 100 }
    const open = theValue(compareRates(five, none))
    expect([open.ratio, open.interval.high]).toEqual([
      Number.POSITIVE_INFINITY,
      Number.POSITIVE_INFINITY,
    ])
    expect(open.interval.low).toBeGreaterThan(0)
    expect(theValue(compareRates(none, five))).toMatchObject({ ratio: 0, interval: { low: 0 } })
  })
  it('[A2] 100 events against none over the same hours: p is 2 of 2^100, and not nought', () => {
    const hours = { events: 0, exposure: 50 }
    const got = theValue(compareRates({ events: 100, exposure: 50 }, hours))
    expect(got.p * 2 ** 99).toBeCloseTo(1, 9)
  })
  it('[A1] no rate over less than a millionth of an hour, nor from more events than are counted', () => {
    const one = { events: 1, exposure: 10 }
    expect(rateOf({ events: 1, exposure: Number.MIN_VALUE })).toMatchObject({
      problem: { kind: 'below', field: 'events.exposure', limit: 1e-6 },
    })
    expect(compareRates(one, { events: 20_000, exposure: 10 })).toMatchObject({
      problem: { kind: 'above', field: 'second.events' },
    })
    expect(theValue(compareRates(one, { events: 10_000, exposure: 1e5 })).p).toBeGreaterThan(0)
  })
  it('[R25] an alarm over 20 parts asks p at or below 0.0025', () => {
    expect(raisesAlarm(0.0025, 20)).toEqual({ ok: true, value: true })
    expect(raisesAlarm(0.0026, 20)).toEqual({ ok: true, value: false })
    expect(raisesAlarm(0.01, 0)).toMatchObject({ problem: { field: 'partsWatched' } })
  })
  it('[STD] no failure in 1,000 h: up to 3.6889 per 1,000 h (Garwood 1936)', () => {
    expect(theValue(rateOf({ events: 0, exposure: 1000 })).high).toBeCloseTo(0.0036889, 7)
  })
})

describe('Kaplan-Meier with Greenwood, Freireich 1963 (memory, recomputed)', () => {
  const steps = theValue(kaplanMeier(TREATED))
  it.each([
    [6, 0.8571, 0.0764],
    [7, 0.8067, 0.0869],
    [10, 0.7529, 0.0963],
    [13, 0.6902, 0.1068],
    [16, 0.6275, 0.1141],
    [22, 0.5378, 0.1282],
    [23, 0.4482, 0.1346],
  ])('[STD] at %i weeks %f survive, standard error %f', (time, survival, error) => {
    const step = steps.find((s) => s.time === time)
    expect(step?.survival).toBeCloseTo(survival, 4)
    expect(step?.standardError).toBeCloseTo(error, 4)
  })
  it('[STD] control arm at 10 weeks: 8 of 21 = 0.381, standard error 0.106 (lecture, seen)', () => {
    const control = theValue(kaplanMeier(CONTROL))
    expect(survivalAt(control, 10)).toBeCloseTo(8 / 21, 12)
    expect(control.findLast((s) => s.time <= 10)?.standardError).toBeCloseTo(0.106, 3)
    expect(control.at(-1)).toMatchObject({ survival: 0, standardError: null })
  })
  it('[STD] log-rank of the two: O 9, E 19.2505, V 6.2570, chi-square 16.793 (memory 16.79, recomputed)', () => {
    const got = theValue(logRank(TREATED, CONTROL))
    expect(got.observed).toBe(9)
    expect(got.expected).toBeCloseTo(19.2505, 4)
    expect(got.variance).toBeCloseTo(6.257, 4)
    expect(got.chiSquare).toBeCloseTo(16.793, 3)
    expect(got.p).toBeLessThan(1e-4)
    expect(theValue(logRank(CONTROL, TREATED)).chiSquare).toBeCloseTo(got.chiSquare, 9)
  })
  it('[STD] NIST e-Handbook 8.4.1.3 lives: 0.95, 0.90 down to 0.50', () => {
    const got = theValue(kaplanMeier(NIST_LIVES)).map((s) => s.survival)
    expect(got).toEqual([...Array(10).keys()].map((i) => expect.closeTo(0.95 - 0.05 * i, 12)))
  })
  it('[A1] names what cannot be; all censored is a curve without steps', () => {
    expect(kaplanMeier([])).toMatchObject({ problem: { kind: 'noLives' } })
    expect(kaplanMeier(lives('5 -1'))).toMatchObject({ problem: { field: 'time.2' } })
    expect(kaplanMeier(lives('5 x+'))).toMatchObject({
      problem: { kind: 'notANumber', field: 'time.2' },
    })
    expect(kaplanMeier(lives('5+ 7+'))).toEqual({ ok: true, value: [] })
    expect(logRank(lives('5'), lives('1+'))).toMatchObject({ problem: { kind: 'noComparison' } })
    expect(logRank([], lives('1'))).toMatchObject({ problem: { kind: 'noLives' } })
  })
  it('[A1] ten thousand lives are read at once, and a time that is none is no whole share', () => {
    const many = Array.from({ length: 10_000 }, (_, i) => ({ time: i, failed: true }))
    const curve = theValue(kaplanMeier(many))
    expect(survivalAt(curve, 4999)).toBeCloseTo(0.5, 9)
    expect(() => survivalAt(curve, Number.NaN)).toThrow('figureOutOfRange')
    expect(theValue(logRank(many, many)).chiSquare).toBeCloseTo(0, 9)
  })
  it('[A2] without censoring the curve is the share of lives that are longer', () => {
    const times = fc.array(fc.integer({ min: 1, max: 20 }), { minLength: 1, maxLength: 30 })
    fc.assert(
      fc.property(times, (list) => {
        const all = list.map((time) => ({ time, failed: true }))
        const curve = theValue(kaplanMeier(all))
        for (const { time, survival } of curve)
          expect(survival).toBeCloseTo(list.filter((t) => t > time).length / list.length, 9)
        expect(failureTimes(all)).toHaveLength(curve.length)
      }),
      { seed: 12 },
    )
  })
})

const NIST_LIVES = lives(
  `54 187 216 240 244 335 361 373 375 386 ${Array(10).fill('500+').join(' ')}`,
)

describe('Weibull with censoring, NIST/SEMATECH e-Handbook 8.4.1.3 (seen)', () => {
  const fit = theValue(fitWeibull(NIST_LIVES))
  it('[STD] eta 606.5280, beta 1.7208, -logL 75.135, AIC 154.27', () => {
    expect(Math.abs(fit.scale - 606.528)).toBeLessThan(0.01)
    expect(fit.shape).toBeCloseTo(1.720797, 5)
    expect(fit.minusLogLikelihood).toBeCloseTo(75.135, 3)
    expect(fit.aic).toBeCloseTo(154.2692, 3)
  })
  it('[STD] mean 540.737, standard deviation 323.806, B10 164.02', () => {
    expect(Math.abs(fit.mean - 540.737)).toBeLessThan(0.01)
    expect(Math.abs(fit.standardDeviation - 323.806)).toBeLessThan(0.01)
    expect(fit.b10).toBeCloseTo(164.02, 2)
  })
  it('[A2] hours in minutes scale every time by 60 and leave the shape', () => {
    const minutes = theValue(fitWeibull(NIST_LIVES.map((l) => ({ ...l, time: 60 * l.time }))))
    expect(minutes.shape).toBeCloseTo(fit.shape, 9)
    expect(minutes.scale / fit.scale).toBeCloseTo(60, 9)
    expect(minutes.mean / fit.mean).toBeCloseTo(60, 9)
    expect(minutes.b10 / fit.b10).toBeCloseTo(60, 9)
  })
  it('[A2] no shape or scale beside the fitted ones is likelier', () => {
    const logL = (scale: number, shape: number) =>
      NIST_LIVES.reduce((sum, { time, failed }) => {
        const x = time / scale
        return sum + (failed ? Math.log((shape / scale) * x ** (shape - 1)) : 0) - x ** shape
      }, 0)
    expect(logL(fit.scale, fit.shape)).toBeCloseTo(-fit.minusLogLikelihood, 9)
    for (const [a, b] of [
      [1.01, 1],
      [0.99, 1],
      [1, 1.01],
      [1, 0.99],
    ] as const)
      expect(logL(fit.scale * a, fit.shape * b)).toBeLessThan(-fit.minusLogLikelihood)
  })
  it('[A1] two hundred thousand lives with one early failure overflow nothing', () => {
    const many = [{ time: 10, failed: true }]
    for (let i = 0; i < 200_000; i++) many.push({ time: 1e9, failed: false })
    const got = theValue(fitWeibull(many))
    for (const figure of Object.values(got)) expect(Number.isFinite(figure)).toBe(true)
    // Deviation over mean is sqrt(Gamma(1 + 2/b) / Gamma(1 + 1/b)^2 - 1), whatever the scale.
    const one = theValue(fitWeibull(NIST_LIVES))
    const variance = logGamma(1 + 2 / one.shape) - 2 * logGamma(1 + 1 / one.shape)
    expect((one.standardDeviation / one.mean) ** 2).toBeCloseTo(Math.expm1(variance), 12)
  })
  it('[A1] says why there is no curve', () => {
    expect(fitWeibull([])).toMatchObject({ problem: { kind: 'noLives' } })
    expect(fitWeibull(lives('5+ 7+'))).toMatchObject({ problem: { kind: 'noFailures' } })
    expect(fitWeibull(lives('5 5 5'))).toMatchObject({ problem: { kind: 'noFit' } })
    expect(fitWeibull(lives('5 0'))).toMatchObject({ problem: { kind: 'below', field: 'time.2' } })
  })
  it('[STD] ln Gamma: 1/2 is ln sqrt(pi), 5 is ln 24, 171 is ln 170! (Abramowitz and Stegun 6.1)', () => {
    expect(logGamma(0.5)).toBeCloseTo(Math.log(Math.PI) / 2, 12)
    expect(logGamma(5)).toBeCloseTo(Math.log(24), 12)
    let factorial = 0
    for (let i = 2; i <= 170; i++) factorial += Math.log(i)
    expect(logGamma(171)).toBeCloseTo(factorial, 9)
  })
})

describe('power law of machines that are mended, NIST/SEMATECH e-Handbook 8.4.5.2', () => {
  const failures = [5, 40, 43, 175, 389, 712, 747, 795, 1299, 1478]
  const fit = theValue(fitPowerLaw([{ failures, endsAt: 1500 }]))
  it('[STD] corrected shape: improvement 0.516494, a 0.291300, 310.234 h between failures at the end', () => {
    expect(1 - fit.corrected.shape).toBeCloseTo(0.516494, 6)
    expect(fit.corrected.scale).toBeCloseTo(0.2913, 5)
    expect(fit.corrected.hoursBetweenAtEnd).toBeCloseTo(310.234, 3)
  })
  it('[STD] plain maximum likelihood, the other convention: shape 0.537229, 279.2106 h', () => {
    expect(fit.plain.shape).toBeCloseTo(0.537229, 6)
    expect(fit.plain.hoursBetweenAtEnd).toBeCloseTo(279.2106, 3)
  })
  it('[STD] shape interval from chi-square: 20 degrees at 2.5 and 97.5 of 100 are 9.5908 and 34.1696 (table)', () => {
    expect(fit.shapeInterval.low).toBeCloseTo((fit.plain.shape * 9.5908) / 20, 4)
    expect(fit.shapeInterval.high).toBeCloseTo((fit.plain.shape * 34.1696) / 20, 4)
    expect(fit.trend).toBe('better')
  })
  it('[A2] failures that crowd at the end say worse, evenly spread ones say cannot tell', () => {
    const crowd = [700, 800, 850, 900, 920, 940, 960, 980, 990, 999]
    expect(theValue(fitPowerLaw([{ failures: crowd, endsAt: 1000 }])).trend).toBe('worse')
    const even = [100, 200, 300, 400, 500, 600, 700, 800, 900, 1000]
    expect(theValue(fitPowerLaw([{ failures: even, endsAt: 1050 }])).trend).toBe('cannotTell')
  })
  it('[A2] two alike machines give the shape of one and as many hours between', () => {
    const machine = { failures, endsAt: 1500 }
    const two = theValue(fitPowerLaw([machine, machine]))
    expect(two.plain.shape).toBeCloseTo(fit.plain.shape, 12)
    expect(two.plain.hoursBetweenAtEnd).toBeCloseTo(fit.plain.hoursBetweenAtEnd, 9)
  })
  it('[A1] failures at the very end give a steep curve and no NaN', () => {
    const got = theValue(fitPowerLaw([{ failures: [1499.9999, 1499.99995], endsAt: 1500 }]))
    // Sum of ln(T / t) = 1e-7: shape 2 / 1e-7, and T / (n b) hours between.
    expect(got.plain.shape / 2e7).toBeCloseTo(1, 4)
    expect(got.plain.hoursBetweenAtEnd).toBeCloseTo(1500 / (2 * got.plain.shape), 12)
    expect(got.plain.scale).toBe(0)
  })
  it('[A1] one failure, or one after the end, is refused by name', () => {
    expect(fitPowerLaw([{ failures: [5], endsAt: 10 }])).toMatchObject({
      problem: { kind: 'tooFewFailures' },
    })
    expect(fitPowerLaw([{ failures: [5, 11], endsAt: 10 }])).toMatchObject({
      problem: { kind: 'above', field: 'machine.1.failure.2', limit: 10 },
    })
    expect(fitPowerLaw([])).toMatchObject({ problem: { kind: 'tooFewFailures' } })
  })
})
