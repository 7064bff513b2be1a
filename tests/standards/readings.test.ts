import { describe, expect, it } from 'vitest'
import {
  COPPER_ALPHA_20,
  copperAt,
  gaugeAreaMm2,
  gaugeDiameterMm,
  wireOhm,
} from '@/lib/diag/copper'
import { between, erfc, phi } from '@/lib/diag/normal'
import { acceptZone, canDecide, judge, neededFor } from '@/lib/diag/reading'
import { fourWireU } from '@/lib/diag/reading-advice'
import { rectSumCdf } from '@/lib/diag/rect-sum'
import { coilInput, coilSpec, specOf } from '../diag/fixtures/readings'

const input = coilInput
const chance = (y: number, u: number, low: number | null, high: number | null): number =>
  between(low === null ? -50 : (low - y) / u, high === null ? 50 : (high - y) / u)

describe('JCGM 106:2012 clause 7 (also OIML G 1-106), conformance', () => {
  it.each([
    ['Zener breakdown, upper limit', -5.47, 0.05, null, -5.4, 0.91924],
    ['oil viscosity, two-sided', 13.6, 1.8, 12.5, 16.3, 0.66263],
  ])('[STD] %s', (_, y, u, low, high, expected) => {
    expect(chance(y, u, low, high)).toBeCloseTo(expected, 4)
  })
  it('[STD] at the edge of a guard band of U the chance is Phi(2) = 0.97725; of 1.645 u it is 0.95', () => {
    expect(phi(2)).toBeCloseTo(0.97725, 5)
    expect(phi(1.6448536269514722)).toBeCloseTo(0.95, 12)
  })
  it('[STD] the normal distribution of Abramowitz and Stegun table 26.1', () => {
    expect(phi(1)).toBeCloseTo(0.8413447460685429, 14)
    expect(phi(3)).toBeCloseTo(0.9986501019683699, 14)
    expect(phi(-5)).toBeCloseTo(2.866515718791939e-7, 18)
    expect(erfc(0.5)).toBeCloseTo(0.4795001221869535, 14)
    expect(erfc(4)).toBeCloseTo(1.541725790028002e-8, 19)
  })
  it.each([
    [1.5, 0.033894853524689274],
    [2, 0.004677734981047266],
    [2.5, 0.000406952017444959],
    [2.9, 0.000041097878099458858],
    [3.5, 7.430983723414128e-7],
  ])('[STD] the tail of erf keeps its digits at %s (forty-digit arithmetic)', (x, want) => {
    expect(Math.abs(erfc(x) / want - 1)).toBeLessThan(1e-14)
  })
})

describe('JCGM 100:2008 4.3.7, a meter data sheet as a standard uncertainty', () => {
  it.each([
    ['1.0 ohm', 'resistance', 1.0, 0.8, 3, 0.1, 0.308, 0.177824],
    ['12.60 V', 'dcVoltage', 12.6, 0.5, 2, 0.01, 0.083, 0.04792],
    ['0.20 V', 'dcVoltage', 0.2, 0.5, 2, 0.001, 0.003, 0.001732],
  ] as const)('[STD] %s', (_, quantity, value, percent, digits, resolution, a, u) => {
    const meterFunction = { percent, digits, resolution }
    const got = judge({
      ...input,
      quantity,
      value,
      meterFunction,
      leadsOhm: { low: 0, high: 0 },
      spec: null,
    })
    expect(got.standardU).toBeCloseTo(u, 6)
    expect(got.budget.reduce((sum, line) => sum + line.halfWidth, 0)).toBeCloseTo(a, 12)
  })
  it('[STD] a display step alone is q / sqrt(12) = 0.288675 q (GUM F.2.2.1)', () => {
    const meterFunction = { percent: 0, digits: 0, resolution: 1 }
    const got = judge({ ...input, quantity: 'pressure', value: 5, meterFunction, spec: null })
    expect(got.standardU).toBeCloseTo(0.288675, 6)
  })
})

describe('CHECKS 2.3, the worked case: 0.5 ohm +-10 %, 0.8 % + 3 of 0.1, leads 0.3 to 0.6, reads 1.0', () => {
  const result = judge({ ...input, value: 1.0 })
  it('[STD] budget: meter 0.308 and leads 0.150, 81 and 19 % of the variance, u 0.1978, U 0.40', () => {
    expect(result.budget.map((b) => b.halfWidth)).toEqual([
      expect.closeTo(0.308, 12),
      expect.closeTo(0.15, 12),
    ])
    expect(result.budget.map((b) => b.standardU)).toEqual([
      expect.closeTo(0.17782, 5),
      expect.closeTo(0.0866, 5),
    ])
    expect(result.budget.map((b) => Math.round(100 * b.share))).toEqual([81, 19])
    expect(result.standardU).toBeCloseTo(0.1978, 4)
    expect(result.expandedU).toBeCloseTo(0.4, 2)
  })
  it('[STD] best estimate 0.55, too close to call', () => {
    expect(result.estimate).toBeCloseTo(0.55, 12)
    expect(result.verdict).toBe('tooClose')
  })
  it('[STD] chance of being within the spec 0.193 (normal) and 0.1623 = 0.10 / 0.616 (exact)', () => {
    expect(result.conformance).toBeCloseTo(0.193, 3)
    expect(result.conformanceExact).toBeCloseTo(0.1 / 0.616, 12)
    expect(result.conformanceExact).toBeCloseTo(0.1623, 4)
  })
  it('[STD] every part from 0.092 to 1.008 ohm can show it', () => {
    expect(result.span.low).toBeCloseTo(0.092, 12)
    expect(result.span.high).toBeCloseTo(1.008, 12)
  })
  it('[STD] nulled, the spec applied to the difference: u 0.180, chance 0.219 and 0.164 (assumption A)', () => {
    const nulled = judge({ ...input, value: 0.5, nulled: true })
    expect(nulled.standardU).toBeCloseTo(0.18, 3)
    expect(nulled.conformance).toBeCloseTo(0.219, 3)
    expect(nulled.conformanceExact).toBeCloseTo(0.164, 3)
  })
  it('[STD] nulled, offset taken away: u 0.0501, chance 0.682 and 0.667 (assumption B)', () => {
    const nulled = judge({ ...input, value: 0.5, nulled: true, nullCancels: true })
    expect(nulled.standardU).toBeCloseTo(0.0501, 4)
    expect(nulled.conformance).toBeCloseTo(0.682, 3)
    // Printed without the gain, which is 0.004 ohm: three even rectangles, 2 / 3 of which lie within one of them.
    expect(Math.abs((nulled.conformanceExact ?? 0) - 0.667)).toBeLessThan(0.001)
    expect(2 * rectSumCdf([0.05, 0.05, 0.05], 0.05) - 1).toBeCloseTo(2 / 3, 12)
    expect(
      judge({ ...input, value: 0.4, nulled: true, nullCancels: true }).conformance,
    ).toBeCloseTo(0.16, 2)
    expect(
      judge({ ...input, value: 0.6, nulled: true, nullCancels: true }).conformance,
    ).toBeCloseTo(0.16, 2)
  })
  it('[STD] 95 % in the middle needs u <= 0.02551 ohm', () => {
    expect(neededFor(coilSpec)).toBeCloseTo(0.02551, 5)
    expect(2 * (neededFor(coilSpec) ?? 0)).toBeCloseTo(0.051, 4)
    expect(canDecide(input)).toMatchObject({
      decides: false,
      standardUNeeded: expect.closeTo(0.02551, 5),
    })
  })
  it('[STD] 95 % at each limit needs u below 0.0304; the zone is empty above', () => {
    expect(acceptZone({ low: 0.45, high: 0.55 }, 0.0303)).not.toBeNull()
    expect(acceptZone({ low: 0.45, high: 0.55 }, 0.0305)).toBeNull()
  })
  it('[STD] 0.01 ohm steps, 0.3 % + 2, null +-0.01: u 0.0143, chance 0.9995, zone 0.4735 to 0.5265', () => {
    const meterFunction = { percent: 0.3, digits: 2, resolution: 0.01 }
    const extra = [{ source: 'Null', halfWidth: 0.01 }]
    const got = judge({ ...input, value: 0.5, nulled: true, meterFunction, extra })
    expect(got.standardU).toBeCloseTo(0.0143, 4)
    expect(got.conformance).toBeCloseTo(0.9995, 4)
    expect(acceptZone({ low: 0.45, high: 0.55 }, got.standardU)).toEqual({
      low: expect.closeTo(0.4735, 4),
      high: expect.closeTo(0.5265, 4),
    })
  })
  it('[STD] four-wire in the field at 1 A: u 0.00456, zone 0.4575 to 0.5425', () => {
    expect(fourWireU(0.5)).toBeCloseTo(0.00456, 5)
    expect(chance(0.5, fourWireU(0.5), 0.45, 0.55)).toBeCloseTo(1, 4)
    expect(acceptZone({ low: 0.45, high: 0.55 }, fourWireU(0.5))).toEqual({
      low: expect.closeTo(0.4575, 4),
      high: expect.closeTo(0.5425, 4),
    })
  })
  it('[STD] nulling does not reach 95 %, four-wire and a swap do; each is said before the panel comes off', () => {
    const ways = Object.fromEntries(canDecide(input).wouldDecide.map((a) => [a.way, a.reaches95]))
    expect(ways).toEqual({ fourWire: true, swap: true, finerRange: true, nullLeads: false })
  })
})

describe('sums of rectangles', () => {
  it('[STD] two equal widths make a triangle, three a parabola (Irwin-Hall)', () => {
    expect(rectSumCdf([1, 1], 1)).toBeCloseTo(0.875, 14)
    expect(rectSumCdf([0.5, 0.5, 0.5], -0.5)).toBeCloseTo(1 / 6, 14)
  })
  it('[STD] 95 % of the worked case lies within 0.188 to 0.912 ohm (CHECKS 2.3, exact)', () => {
    expect(rectSumCdf([0.308, 0.15], 0.912 - 0.55)).toBeCloseTo(0.975, 3)
    expect(rectSumCdf([0.308, 0.15], 0.188 - 0.55)).toBeCloseTo(0.025, 3)
  })
})

describe('conditions (rule R7) on the acceptance figures', () => {
  const battery = specOf({ quantity: 'dcVoltage', unit: 'V', low: 12.4 })
  const volts = {
    ...input,
    quantity: 'dcVoltage' as const,
    value: 12.18,
    meterFunction: { percent: 0.5, digits: 2, resolution: 0.01 },
    spec: battery,
  }
  it('[R7] a meter at -15 C reads 12.18 V to +-0.40: too close to 12.4, chance 0.14, warm the meter', () => {
    const cold = judge({ ...volts, meterTempC: -15 })
    expect(cold.expandedU).toBeCloseTo(0.4, 2)
    expect(cold.verdict).toBe('tooClose')
    expect(cold.conformance).toBeCloseTo(0.14, 2)
    expect(cold.wouldDecide[0]?.way).toBe('warmMeter')
  })
  it('[R7] at 18 C the same figure reads +-0.09 and is out, low', () => {
    const warm = judge({ ...volts, meterTempC: 18 })
    expect(warm.expandedU).toBeCloseTo(0.09, 2)
    expect(warm.verdict).toBe('outLow')
  })
  it('[R7] 27.4 V AC at 3,000 +-150 rpm reads +-1.7: meter 0.66, speed 1.58; out, low against 45 to 60', () => {
    const spec = specOf({ quantity: 'acVoltage', unit: 'V', low: 45, high: 60 })
    const meterFunction = { percent: 1, digits: 3, resolution: 0.1 }
    const extra = [{ source: 'Engine speed', halfWidth: 27.4 * 0.05 }]
    const leg = judge({
      ...input,
      quantity: 'acVoltage',
      value: 27.4,
      meterFunction,
      spec,
      extra,
      meterTempC: 18,
    })
    expect(leg.budget.map((b) => 2 * b.standardU)).toEqual([
      expect.closeTo(0.66, 2),
      expect.closeTo(1.58, 2),
    ])
    expect(leg.expandedU).toBeCloseTo(1.7, 1)
    expect(leg.verdict).toBe('outLow')
  })
})

describe('IEC 60028 copper, ASTM B258 wire', () => {
  it.each([
    [-30, 0.4017],
    [-20, 0.4214],
    [0, 0.4607],
    [40, 0.5393],
    [80, 0.6179],
    [100, 0.6572],
  ])('[STD] a good 0.5 ohm winding of 20 C reads at %i C: %f ohm', (celsius, ohm) => {
    expect(copperAt(0.5, 20, celsius)).toBeCloseTo(ohm, 4)
    expect(copperAt(ohm, celsius, 20)).toBeCloseTo(0.5, 3)
  })
  it('[STD] the coefficient is 0.00393 per kelvin', () => expect(COPPER_ALPHA_20).toBe(0.00393))
  it.each([
    [4, 5.1894, 21.151, 0.2485],
    [6, 4.1154, 13.302, 0.3951],
    [8, 3.2636, 8.366, 0.6282],
    [10, 2.5882, 5.261, 0.9989],
    [12, 2.0525, 3.309, 1.588],
    [14, 1.6277, 2.081, 2.525],
    [16, 1.2908, 1.309, 4.016],
    [20, 0.8118, 0.518, 10.15],
    [22, 0.6438, 0.3255, 16.14],
  ])('[STD] gauge %i: %f mm, %f mm2, %f ohm per 1,000 ft', (gauge, mm, mm2, perThousandFeet) => {
    expect(gaugeDiameterMm(gauge)).toBeCloseTo(mm, 4)
    // 0.05 of 100, or half of the last printed place where that is coarser.
    const half = mm2 < 0.5 ? 0.00005 : 0.0005
    expect(Math.abs(gaugeAreaMm2(gauge) - mm2)).toBeLessThan(Math.max(half, 5e-4 * mm2))
    expect(Math.abs(wireOhm(gaugeAreaMm2(gauge), 304.8) / perThousandFeet - 1)).toBeLessThan(5e-4)
  })
})
