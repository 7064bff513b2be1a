import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compressionKpa, compressionShare, pressureAt } from '@/lib/diag/atmosphere'
import { rideEnergy } from '@/lib/diag/battery-charge'
import { binomialP } from '@/lib/diag/binomial-test'
import { primaryAmperes, secondsTo } from '@/lib/diag/coil-current'
import {
  atSeaLevel,
  compressionSpread,
  DECOMPRESSOR_PSI,
  leakDown,
  wetTest,
} from '@/lib/diag/compression'
import { pointOfUtm, squareOf } from '@/lib/diag/grid-reference'
import { kaplanMeier } from '@/lib/diag/kaplan-meier'
import { fitPowerLaw } from '@/lib/diag/power-law'
import { pressureHold } from '@/lib/diag/practice-limits'
import { compareRates, rateOf } from '@/lib/diag/rate-comparison'
import { linePull } from '@/lib/diag/rigging'
import { sensorVolts } from '@/lib/diag/sensor-volts'
import { spareStock, stockFigures } from '@/lib/diag/spares'
import { judgeCharging } from '@/lib/diag/start-and-charge'
import { legBalance } from '@/lib/diag/stator'
import {
  fitSteinhart,
  ntcCelsius,
  ntcOhm,
  pt100Ohm,
  steinhartCelsius,
} from '@/lib/diag/temperature-sensors'
import { inspectionRisks } from '@/lib/diag/two-states'
import { fitWeibull } from '@/lib/diag/weibull'
import { pullOf, towOf } from '@/lib/diag/winch-pull'
import { theValue } from './the-value'

describe('compression and leak-down (common practice, CHECKS 2.8)', () => {
  it('[STD] spread to 10 of 100 even, to 15 doubtful, above uneven; psi or kPa', () => {
    const verdict = (a: number, b: number) => theValue(compressionSpread([a, b])).verdict
    expect([verdict(90, 100), verdict(89, 100), verdict(85, 100), verdict(84, 100)]).toEqual([
      'even',
      'doubtful',
      'doubtful',
      'uneven',
    ])
    expect(theValue(compressionSpread([130, 150, 128]))).toMatchObject({ weakest: 3 })
    expect(theValue(compressionSpread([130, 150].map((p) => 6.894757 * p))).spread).toBeCloseTo(
      theValue(compressionSpread([130, 150])).spread,
      12,
    )
    expect(compressionSpread([120])).toMatchObject({ problem: { kind: 'tooFewCylinders' } })
    expect(compressionSpread([120, 0])).toMatchObject({ problem: { field: 'cylinder.2' } })
  })
  it('[STD] a gauge reading at 2,000 m is 0.7846 of sea level; 222.7 psi is 1535 kPa (CHECKS 2.8)', () => {
    expect(theValue(atSeaLevel(0.7846 * 150, 2000))).toBeCloseTo(150, 1)
    expect(theValue(compressionKpa(8.5, 1.3, 0)) / 6.894757).toBeCloseTo(222.7, 1)
    expect(atSeaLevel(100, 12_000)).toMatchObject({ problem: { field: 'geopotentialM' } })
  })
  it('[STD] a starting decompressor takes 40 to 80 psi: then only the spread counts', () => {
    expect(DECOMPRESSOR_PSI).toEqual({ least: 40, most: 80 })
  })
  it('[STD] wet test: a rise of 15 of 100 or more speaks for rings, under 10 for valves or gasket', () => {
    const points = [109, 110, 114, 115].map((wet) => theValue(wetTest(100, wet)).pointsTo)
    expect(points).toEqual(['valvesOrGasket', 'cannotTell', 'cannotTell', 'rings'])
    expect(wetTest(0, 100)).toMatchObject({ problem: { field: 'dry' } })
  })
  it('[STD] leak-down: under 10 good, to 20 worn, above 30 mend; 60 of 80 in aviation (memory)', () => {
    const verdicts = [91, 90, 80, 79, 70, 69].map((kept) => theValue(leakDown(100, kept)).verdict)
    expect(verdicts).toEqual(['good', 'worn', 'worn', 'poor', 'poor', 'mend'])
    expect([60, 59.9].map((kept) => theValue(leakDown(80, kept)).failsAviation)).toEqual([
      false,
      true,
    ])
    expect(leakDown(80, 81)).toMatchObject({ problem: { kind: 'above', field: 'kept' } })
  })
})

describe('[A1] what cannot be is named and never NaN', () => {
  it('[A1] heights, coils and sensors outside their range', () => {
    expect(pressureAt(12_000)).toMatchObject({ problem: { kind: 'above', field: 'geopotentialM' } })
    expect(compressionShare(Number.NaN)).toMatchObject({ problem: { kind: 'notANumber' } })
    expect(primaryAmperes({ ohm: 0, henry: 0.003 }, 12, 0.01)).toMatchObject({
      problem: { field: 'ohm' },
    })
    expect(secondsTo({ ohm: 1, henry: 0.003 }, 0, 1)).toMatchObject({ problem: { field: 'volts' } })
    expect(ntcOhm(10_000, 3974, -300)).toMatchObject({ problem: { field: 'celsius' } })
    expect(ntcCelsius(10_000, 3974, 0)).toMatchObject({ problem: { field: 'ohm' } })
    expect(ntcCelsius(1e9, 100, 0.001)).toMatchObject({ problem: { kind: 'noTemperature' } })
    expect(steinhartCelsius({ a: -1, b: 0, c: 0 }, 100)).toMatchObject({
      problem: { kind: 'noTemperature' },
    })
    expect(
      fitSteinhart([
        [100, 0],
        [100, 10],
        [50, 20],
      ]),
    ).toMatchObject({ problem: { kind: 'sameTwice' } })
    expect(pt100Ohm(900)).toMatchObject({ problem: { field: 'celsius' } })
  })
  it('[A1] any figures at all: a number or a named field', () => {
    const any = fc.oneof(
      fc.double(),
      fc.double({ min: 0, max: 90, noNaN: true }),
      fc.integer({ min: 0, max: 40 }),
      fc.constantFrom(0, -0, -1, 1e308, Number.NaN, -Infinity),
    )
    const numbers = (value: unknown): number[] =>
      typeof value === 'number'
        ? [value]
        : value !== null && typeof value === 'object'
          ? Object.values(value).flatMap(numbers)
          : []
    fc.assert(
      fc.property(any, any, any, (a, b, c) => {
        const answers = [
          compressionKpa(a, b, c),
          primaryAmperes({ ohm: a, henry: b }, c, 0.01),
          ntcCelsius(a, b, c),
          steinhartCelsius({ a, b, c }, 100),
          sensorVolts({ signalVolts: a, supplyVolts: b, supplyU: c }),
          legBalance([
            { figure: a, expandedU: b },
            { figure: c, expandedU: 0 },
          ]),
          compressionSpread([a, b, c]),
          wetTest(a, b),
          leakDown(a, b),
          pressureHold(a, b, c),
          pullOf({ massKg: a, slopeDegrees: b, ground: 'hard', locked: 'none' }, c),
          towOf({ massKg: a, slopeDegrees: b, ground: 'hard', brakesWork: false }, c),
          linePull(a, b, c),
          rideEnergy({
            kind: 'flooded',
            ratedAh: a,
            restVolts: b,
            expandedU: c,
            airTempC: -5,
            drawAmperes: 7,
          }),
          rateOf({ events: a, exposure: b }, c),
          compareRates({ events: a, exposure: b }, { events: 3, exposure: c }),
          stockFigures(a, b),
          spareStock(a, b),
          inspectionRisks({ halfTolerance: a, processU: b, meterU: c, accept: 1 }),
          binomialP(a, 9, b),
          squareOf({ latitude: a, longitude: b }, c),
          pointOfUtm({ zone: a, hemisphere: 'S', eastingMetres: b, northingMetres: c }),
          kaplanMeier([
            { time: a, failed: true },
            { time: b, failed: false },
          ]),
          fitWeibull([
            { time: a, failed: true },
            { time: b, failed: true },
          ]),
          fitPowerLaw([{ failures: [a, b], endsAt: c }]),
          judgeCharging({ volts: a, expandedU: b }, { engineRpm: c, airTempC: 20 }),
        ]
        for (const answer of answers)
          if (answer.ok) expect(numbers(answer.value).some(Number.isNaN)).toBe(false)
          else expect(answer.problem.kind.length).toBeGreaterThan(0)
      }),
      { seed: 63, numRuns: 500 },
    )
  })
})
