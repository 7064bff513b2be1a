// What holds of every reading (docs/spec/diag.md, Readings).
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { judge, type ReadingInput } from '@/lib/diag/reading'
import { CONDITION_KINDS, CONDITION_NAMES, type Condition } from '@/lib/diag/reading-conditions'
import { rectSumCdf } from '@/lib/diag/rect-sum'
import { twinDifference } from '@/lib/diag/twin-difference'
import { inKeptUnit, unitOf } from '@/lib/diag/typed-units'
import { ohms } from './fixtures/entries'
import { coilInput, coilSpec, specOf } from './fixtures/readings'

const value = fc.double({ min: 0, max: 3, noNaN: true })
const coil = (v: number, over: Partial<ReadingInput> = {}) =>
  judge({ ...coilInput, leadsOhm: { low: 0, high: 0 }, value: v, ...over })
const fine = { percent: 0.1, digits: 1, resolution: 0.001 }

describe('[R7] of any reading', () => {
  it('[R7] more uncertainty turns in and out into too close, never the other way', () => {
    fc.assert(
      fc.property(
        value,
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (v, a, b) => {
          const at = (halfWidth: number) =>
            coil(v, { meterFunction: fine, extra: [{ source: 'More', halfWidth }] }).verdict
          const [less, more] = [at(Math.min(a, b)), at(Math.max(a, b))]
          expect([less, 'tooClose']).toContain(more)
        },
      ),
      { seed: 41, numRuns: 400 },
    )
  })
  it('[R7] chances lie within 0 and 1; shares of the budget sum to 1; the verdict and the chance agree', () => {
    fc.assert(
      fc.property(value, fc.double({ min: -30, max: 40, noNaN: true }), (v, meterTempC) => {
        const r = coil(v, { meterTempC })
        for (const p of [r.conformance!, r.conformanceExact!]) {
          expect(p).toBeGreaterThanOrEqual(0)
          expect(p).toBeLessThanOrEqual(1)
        }
        expect(r.budget.reduce((sum, line) => sum + line.share, 0)).toBeCloseTo(1, 12)
        if (r.verdict === 'in') expect(r.conformance).toBeGreaterThan(0.95)
        if (r.verdict === 'outLow' || r.verdict === 'outHigh')
          expect(r.conformance).toBeLessThan(0.025)
      }),
      { seed: 42, numRuns: 400 },
    )
  })
  it('[R7] the unit a figure is typed in changes nothing', () => {
    const spec = specOf({ quantity: 'dcVoltage', unit: 'V', low: 0.1, high: 0.4 })
    const at = (v: number) =>
      judge({ ...coilInput, quantity: 'dcVoltage', value: v, meterFunction: fine, spec })
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 600 }), (millivolts) => {
        const typed = inKeptUnit(millivolts, unitOf('dcVoltage', 'mV'))
        expect(at(typed)).toEqual(at(inKeptUnit(millivolts / 1000, unitOf('dcVoltage', 'V'))))
      }),
      { seed: 43, numRuns: 200 },
    )
  })
  it('[R7] each condition is a line of its own with its half-width', () => {
    const conditions: Condition[] = [
      { kind: 'engineSpeed', asked: 3000, halfWidth: 150 },
      { kind: 'crankingSpeed', asked: 250, halfWidth: 25 },
      { kind: 'batteryVolts', asked: 12, halfWidth: 0.6 },
      { kind: 'altitude', asked: 1500, halfWidth: 300 },
    ]
    const spec = specOf({ quantity: 'acVoltage', unit: 'V', low: 45, high: 60 })
    const r = judge({ ...coilInput, quantity: 'acVoltage', value: 27.4, spec, conditions })
    const width = (kind: Condition['kind']) =>
      r.budget.find((line) => line.source === CONDITION_NAMES[kind])?.halfWidth
    expect(width('engineSpeed')).toBeCloseTo(1.37, 12)
    expect(width('crankingSpeed')).toBeCloseTo(2.74, 12)
    expect(width('batteryVolts')).toBeCloseTo(1.37, 12)
    // US Standard Atmosphere 1976: 101.325 kPa (1 - 0.0065 h / 288.15)^5.255876.
    const air = (h: number) => (1 - (0.0065 * h) / 288.15) ** 5.255876
    expect(width('altitude')).toBeCloseTo(27.4 * (air(1200) / air(1500) - 1), 9)
    expect(conditions.map((c) => c.kind)).toEqual(
      CONDITION_KINDS.filter((kind) => kind !== 'sincePriming'),
    )
  })
  it('[R7] fuel pressure read five minutes late may have lost 1 - 0.8^0.5 of itself, ten minutes late 20 of 100', () => {
    const spec = specOf({ quantity: 'pressure', unit: 'kPa', low: 250, high: 400 })
    const meterFunction = { percent: 1, digits: 0, resolution: 1 }
    const at = (halfWidth: number) =>
      judge({
        ...coilInput,
        quantity: 'pressure',
        value: 265,
        meterFunction,
        spec,
        conditions: [{ kind: 'sincePriming', asked: 0, halfWidth }],
      })
    const width = (halfWidth: number) =>
      at(halfWidth).budget.find((line) => line.source === 'Time since priming')?.halfWidth
    expect(width(10)).toBeCloseTo(265 * 0.2, 9)
    expect(width(5)).toBeCloseTo(265 * (1 - Math.sqrt(0.8)), 9)
    expect([at(0).verdict, at(5).verdict]).toEqual(['in', 'tooClose'])
  })
  it('[S5] 27.4 V AC at 3,000 +-150 per minute reads +-1.7: meter 0.66, speed 1.58; out, low', () => {
    const leg = judge({
      ...coilInput,
      quantity: 'acVoltage',
      value: 27.4,
      meterFunction: { percent: 1, digits: 3, resolution: 0.1 },
      meterTempC: 18,
      spec: specOf({ quantity: 'acVoltage', unit: 'V', low: 45, high: 60 }),
      conditions: [{ kind: 'engineSpeed', asked: 3000, halfWidth: 150 }],
    })
    expect(leg.budget.map((b) => [b.source, Number((2 * b.standardU).toFixed(2))])).toEqual([
      ['Meter accuracy', 0.66],
      ['Engine speed', 1.58],
    ])
    expect(leg.expandedU).toBeCloseTo(1.7, 1)
    expect(leg.verdict).toBe('outLow')
  })
})

describe('[R17] the good twin', () => {
  it('[R17] the difference stands with both uncertainties, and is surer than either with one meter', () => {
    const got = twinDifference(ohms(1.4), ohms(1.0, { subject: 'knownGood' }))
    expect(got.difference).toBeCloseTo(0.4, 12)
    // Meter 0.8 % + 3 steps of 0.1 and leads +-0.15, each a rectangle, k = 2.
    expect(got.suspectU).toBeCloseTo(2 * Math.sqrt((0.3112 ** 2 + 0.15 ** 2) / 3), 12)
    expect(got.goodU).toBeCloseTo(2 * Math.sqrt((0.308 ** 2 + 0.15 ** 2) / 3), 12)
    // Gain on the difference, two half steps and the contact are left.
    expect(got.expandedU).toBeCloseTo(2 * Math.sqrt((0.0032 ** 2 + 3 * 0.05 ** 2) / 3), 12)
    expect(got.agrees).toBe(false)
  })
  it('[R17] turned about it is the same the other way', () => {
    fc.assert(
      fc.property(value, value, (a, b) => {
        const [one, two] = [twinDifference(ohms(a), ohms(b)), twinDifference(ohms(b), ohms(a))]
        expect(one.difference).toBeCloseTo(-two.difference, 12)
        expect(one.expandedU).toBeCloseTo(two.expandedU, 12)
        expect(one.agrees).toBe(two.agrees)
      }),
      { seed: 44, numRuns: 200 },
    )
  })
})

describe('[R7] which set-up reaches 95 %', () => {
  const ways = (over: Partial<ReadingInput>) =>
    judge({ ...coilInput, value: 1, ...over }).wouldDecide.map((a) => [a.way, a.reaches95])
  it('[R7] a cold meter is warmed first where that decides; leads, range and four wires for ohms', () => {
    expect(ways({ meterTempC: -15 }).map(([way]) => way)).toContain('warmMeter')
    expect(ways({}).map(([way]) => way)).toEqual(['fourWire', 'swap', 'finerRange', 'nullLeads'])
  })
  it('[R7] nobody is told to drive 1 A through a sensor', () => {
    const spec = { ...coilSpec, nominal: 500, tolerancePercent: 0.1 }
    const got = ways({ value: 500, spec }).map(([way]) => way)
    expect(got).toContain('finerRange')
    expect(got).not.toContain('fourWire')
  })
})

describe('[STD] sums of rectangles, however unlike', () => {
  it('[STD] rises from 0 to 1, is even about the middle, and narrow widths change nothing', () => {
    const widths = fc.array(fc.constantFrom(1, 0.5, 0.1, 1e-3, 1e-4, 1e-7), {
      minLength: 1,
      maxLength: 7,
    })
    fc.assert(
      fc.property(widths, fc.double({ min: -3, max: 3, noNaN: true }), (list, x) => {
        const p = rectSumCdf(list, x)
        expect(p).toBeGreaterThanOrEqual(0)
        expect(p).toBeLessThanOrEqual(1)
        expect(p + rectSumCdf(list, -x)).toBeCloseTo(1, 9)
        expect(rectSumCdf(list, x + 0.1)).toBeGreaterThanOrEqual(p - 1e-12)
        expect(Math.abs(rectSumCdf([...list, 1e-9], x) - p)).toBeLessThan(1e-2)
      }),
      { seed: 45, numRuns: 400 },
    )
  })
  it('[STD] one wide and six narrow: the wide one decides (plain inclusion and exclusion loses every digit here)', () => {
    const narrow = Array.from({ length: 6 }, () => 1e-4)
    expect(rectSumCdf([1, ...narrow], 0.3)).toBeCloseTo(0.65, 10)
    expect(rectSumCdf([1, ...narrow], -0.9)).toBeCloseTo(0.05, 10)
  })
  it('[STD] eight equal ones: the Irwin-Hall distribution at a quarter, 1 / 8! in the corner', () => {
    const eight = Array.from({ length: 8 }, () => 0.5)
    const hall = (x: number) => {
      let sum = 0
      let choose = 1
      for (let k = 0; k <= Math.floor(x); k++) {
        sum += (k % 2 === 0 ? 1 : -1) * choose * (x - k) ** 8
        choose = (choose * (8 - k)) / (k + 1)
      }
      return sum / 40_320
    }
    for (const x of [0.5, 1, 2, 3, 4]) expect(rectSumCdf(eight, x - 4)).toBeCloseTo(hall(x), 12)
  })
})
