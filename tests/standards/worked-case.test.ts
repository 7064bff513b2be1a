import { describe, expect, it } from 'vitest'
import { COPPER_ALPHA_20, copperAt, gaugeAreaMm2, wireOhm } from '@/lib/diag/copper'
import { between } from '@/lib/diag/normal'
import { acceptZone, judge, neededFor } from '@/lib/diag/reading'
import { rectSumCdf } from '@/lib/diag/rect-sum'
import { fourToOneU, inspectionRisks, separableFrom } from '@/lib/diag/two-states'
import { coilInput, coilSpec } from '../diag/fixtures/readings'
import { theValue } from './the-value'

const limits = { low: 0.45, high: 0.55 }
const chance = (y: number, u: number) => between((0.45 - y) / u, (0.55 - y) / u)

describe('CHECKS 2.3, the worked case: what else it says (all recomputed)', () => {
  const result = judge({ ...coilInput, value: 1.0 })
  it('[STD] U is 8 times the half tolerance, ratio 0.126', () => {
    expect(result.expandedU / 0.05).toBeCloseTo(8, 0)
    expect(0.05 / result.expandedU).toBeCloseTo(0.126, 3)
  })
  it('[STD] the display step counted again makes 0.1999, two of 100 more', () => {
    const step = [{ source: 'Display step', halfWidth: 0.05 }]
    const again = judge({ ...coilInput, value: 1.0, extra: step })
    expect(again.standardU).toBeCloseTo(0.1999, 4)
    expect(again.budget.at(-1)?.share).toBeCloseTo(0.02, 2)
    expect(again.budget.at(-1)?.standardU).toBeCloseTo(0.02887, 5)
  })
  it('[STD] read as it stands, leads and all, it would fail a good part: chance 0.005', () => {
    expect(chance(1.0, 0.308 / Math.sqrt(3))).toBeCloseTo(0.005, 3)
  })
  it('[STD] nulled with perfect contact (B0): u 0.0409, chance 0.779 and 0.750', () => {
    const widths = [0.004, 0.05, 0.05]
    const u = Math.sqrt(widths.reduce((sum, a) => sum + a * a, 0) / 3)
    expect(u).toBeCloseTo(0.0409, 4)
    expect(chance(0.5, u)).toBeCloseTo(0.779, 3)
    // Printed without the gain of 0.004 ohm: two even rectangles are a triangle.
    expect(Math.abs(2 * rectSumCdf(widths, 0.05) - 1 - 0.75)).toBeLessThan(0.001)
    expect(2 * rectSumCdf([0.05, 0.05], 0.05) - 1).toBeCloseTo(0.75, 12)
  })
  it('[STD] as one rectangle 95 % asks +-0.0526 exactly, +-0.0442 by the normal rule', () => {
    expect(0.05 / 0.95).toBeCloseTo(0.0526, 4)
    expect(2 * rectSumCdf([0.05 / 0.95], 0.05) - 1).toBeCloseTo(0.95, 12)
    expect((neededFor(coilSpec) ?? 0) * Math.sqrt(3)).toBeCloseTo(0.0442, 4)
  })
  it('[STD] meter and leads may have a^2 + a^2 up to 3 u^2 = 0.00195 ohm^2', () => {
    expect(3 * (neededFor(coilSpec) ?? 0) ** 2).toBeCloseTo(0.00195, 5)
  })
  it('[STD] four to one asks u at most 0.00625 ohm', () => {
    expect(theValue(fourToOneU(0.05))).toBeCloseTo(0.00625, 12)
  })
  it('[STD] four-wire at 0.001 steps, 0.5 % + 5: u 0.0043, chance 1.0000, zone 0.457 to 0.543', () => {
    const meterFunction = { percent: 0.5, digits: 5, resolution: 0.001 }
    const got = judge({ ...coilInput, value: 0.5, meterFunction, leadsOhm: { low: 0, high: 0 } })
    expect(got.standardU).toBeCloseTo(0.0043, 4)
    expect(got.conformance).toBeCloseTo(1, 4)
    expect(acceptZone(limits, got.standardU)).toEqual({
      low: expect.closeTo(0.457, 3),
      high: expect.closeTo(0.543, 3),
    })
  })
  it('[STD] with u 0.198 only 1.15 ohm or more is told from 0.5; with 0.05, 0.335 and 0.665', () => {
    expect(theValue(separableFrom(0.5, result.standardU)).above).toBeCloseTo(1.15, 2)
    const nulled = judge({ ...coilInput, value: 0.5, nulled: true, nullCancels: true })
    const apart = theValue(separableFrom(0.5, nulled.standardU))
    expect(apart.below).toBeCloseTo(0.335, 3)
    expect(apart.above).toBeCloseTo(0.665, 3)
    expect(separableFrom(0.5, -1)).toMatchObject({ problem: { field: 'standardU' } })
  })
})

describe('JCGM 106:2012 clause 9, risks over all parts: N(0, 0.12), u 0.04, +-0.2 (recomputed by quadrature)', () => {
  const at = (accept: number) =>
    theValue(inspectionRisks({ halfTolerance: 0.2, processU: 0.12, meterU: 0.04, accept }))
  it.each([
    [0.2, 0.018942, 0.037208],
    [0.12, 0.00046863, 0.24767],
  ])('[STD] accepted to +-%f: consumer %f, producer %f', (accept, consumer, producer) => {
    expect(at(accept).consumer).toBeCloseTo(consumer, accept === 0.2 ? 6 : 8)
    expect(at(accept).producer).toBeCloseTo(producer, accept === 0.2 ? 6 : 5)
  })
  it('[STD] conforming 0.90442; accepted and refused parts add up', () => {
    const { conforming, consumer, producer } = at(0.2)
    expect(conforming).toBeCloseTo(0.90442, 5)
    // All accepted parts are normal with process and meter together.
    const u = Math.hypot(0.12, 0.04)
    expect(conforming - producer + consumer).toBeCloseTo(between(-0.2 / u, 0.2 / u), 9)
  })
  it('[A1] a meter far finer or coarser than the parts: shares of all parts, and right', () => {
    const risks = (meterU: number, halfTolerance: number, accept: number) =>
      theValue(inspectionRisks({ halfTolerance, processU: 1, meterU, accept }))
    // A perfect meter refuses the good parts between the limits, 2 (Phi(2) - Phi(1)), and accepts no bad one.
    expect(risks(1e-9, 2, 1).producer).toBeCloseTo(2 * 0.135905121983, 9)
    expect(risks(1e-9, 2, 1).consumer).toBe(0)
    // Its acceptance past the limits takes the bad ones to 2: 2 (Phi(2) - Phi(1)) again.
    expect(risks(1e-9, 1, 2).consumer).toBeCloseTo(2 * 0.135905121983, 9)
    // Limits that no part reaches: all conform, and all are refused where nothing is accepted.
    expect(risks(1, 1e9, 0)).toEqual({
      conforming: expect.closeTo(1, 12),
      consumer: 0,
      producer: expect.closeTo(1, 9),
    })
  })
  it('[A1] a process or a meter without spread is named', () => {
    const one = { halfTolerance: 0.2, processU: 0.12, meterU: 0, accept: 0.2 }
    expect(inspectionRisks(one)).toMatchObject({ problem: { kind: 'below', field: 'meterU' } })
  })
})

describe('copper by the kilometre and both ways (ASTM B258, IEC 60028)', () => {
  it.each([
    [4, 0.8152],
    [6, 1.2961],
    [8, 2.0609],
    [10, 3.277],
    [12, 5.2107],
    [14, 8.2853],
    [16, 13.174],
    [20, 33.308],
    [22, 52.962],
  ])('[STD] gauge %i: %f ohm per km (recomputed)', (gauge, ohm) => {
    expect(Math.abs(wireOhm(gaugeAreaMm2(gauge), 1000) / ohm - 1)).toBeLessThan(5e-4)
  })
  it('[STD] R20 = R / (1 + 0.00393 (T - 20)) (IEC 60028; NBS Handbook 100)', () => {
    expect(copperAt(1, 80, 20)).toBeCloseTo(1 / (1 + COPPER_ALPHA_20 * 60), 12)
  })
})
