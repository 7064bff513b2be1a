import { describe, expect, it } from 'vitest'
import { compressionKpa, compressionShare, geopotentialOf, pressureAt } from '@/lib/diag/atmosphere'
import { chargeAt, coldFactor, gravityAt, rideMinutes } from '@/lib/diag/battery'
import { primaryAmperes, secondsTo, storedJoules } from '@/lib/diag/coil-current'
import {
  fitSteinhart,
  ntcCelsius,
  ntcOhm,
  pt100Ohm,
  steinhartCelsius,
} from '@/lib/diag/temperature-sensors'
import { checkVin } from '@/lib/diag/vin'

describe('NTC by beta: table of an RTOS device-tree file, R25 10,000, B 3974, truncated ohms (seen)', () => {
  it.each([
    [-25, 146676],
    [-15, 78875],
    [5, 26075],
    [15, 15881],
    [25, 10000],
    [35, 6488],
    [45, 4326],
    [65, 2066],
    [75, 1474],
    [85, 1072],
    [105, 596],
    [115, 454],
    [125, 351],
  ])('[STD] %i C is %i ohm', (celsius, ohm) => {
    expect(Math.floor(ntcOhm(10_000, 3974, celsius) + 1e-6)).toBe(ohm)
    expect(ntcCelsius(10_000, 3974, ntcOhm(10_000, 3974, celsius))).toBeCloseTo(celsius, 9)
  })
})

describe('Steinhart-Hart (1968)', () => {
  const seen = { a: 1.4e-3, b: 2.37e-4, c: 9.9e-8 }
  it.each([
    [17000.007274, -10],
    [10030.217595, 0],
    [6110.382219, 10],
    [3833.327593, 20],
    [2470.600113, 30],
  ])('[STD] %f ohm is %i C (coefficients seen in code)', (ohm, celsius) => {
    expect(steinhartCelsius(seen, ohm)).toBeCloseTo(celsius, 7)
  })
  it('[STD] fit through 0, 25 and 50 C of a 10 kohm table gives its 10, 20 and 30 C rows (instrument manual, seen)', () => {
    const fit = fitSteinhart([
      [32128, 0],
      [9814, 25],
      [3542, 50],
    ])
    expect(fit.a).toBeCloseTo(1.10415912e-3, 9)
    expect(fit.b).toBeCloseTo(2.38917947e-4, 10)
    expect(fit.c).toBeCloseTo(6.93162653e-8, 12)
    expect(steinhartCelsius(fit, 19549)).toBeCloseTo(10.0, 2)
    expect(steinhartCelsius(fit, 12262)).toBeCloseTo(19.999, 2)
    expect(steinhartCelsius(fit, 7908)).toBeCloseTo(29.998, 2)
  })
})

describe('Pt100, IEC 60751 (three tables, seen)', () => {
  it.each([
    [-200, 18.52],
    [-100, 60.26],
    [-50, 80.31],
    [-20, 92.16],
    [0, 100.0],
    [20, 107.79],
    [50, 119.4],
    [80, 130.9],
    [100, 138.51],
    [150, 157.33],
    [200, 175.86],
    [400, 247.09],
    [600, 313.71],
  ])('[STD] %i C is %f ohm', (celsius, ohm) => {
    expect(Math.abs(pt100Ohm(celsius) - ohm)).toBeLessThan(0.00501)
  })
})

describe('US Standard Atmosphere 1976 / ISO 2533', () => {
  it.each([
    [0, 101325.0],
    [500, 95460.8],
    [1000, 89874.6],
    [1500, 84556.0],
    [2000, 79495.2],
    [3000, 70108.5],
    [4000, 61640.2],
    [5000, 54019.9],
    [11000, 22632.1],
  ])('[STD] %i m geopotential is %f Pa', (height, pascals) => {
    expect(Math.abs(pressureAt(height) - pascals)).toBeLessThan(1)
  })
  it.each([
    [1000, 89876],
    [2000, 79501],
    [3000, 70121],
    [5000, 54048],
  ])('[STD] %i m geometric is %i Pa (memory, recomputed)', (height, pascals) => {
    expect(Math.abs(pressureAt(geopotentialOf(height)) - pascals)).toBeLessThan(1)
  })
  it.each([
    [0, 14.696],
    [1000, 14.175],
    [3000, 13.173],
    [5000, 12.23],
    [8000, 10.914],
    [10000, 10.108],
  ])('[STD] %i ft is %f psi (engineering table, seen)', (feet, psi) => {
    expect(Math.abs(pressureAt(feet * 0.3048) / 6894.757 - psi)).toBeLessThan(0.003)
  })
  it('[STD] a compression gauge reads 0.887, 0.7846 and 0.6919 of sea level at 1, 2 and 3 km', () => {
    expect([1000, 2000, 3000].map(compressionShare)).toEqual(
      [0.887, 0.7846, 0.6919].map((x) => expect.closeTo(x, 3)),
    )
  })
  it.each([
    [0, 1535],
    [1000, 1362],
    [2000, 1205],
    [3000, 1062],
  ])('[STD] ratio 8.5, n 1.3 at %i m: %i kPa (CHECKS 2.8)', (height, kpa) => {
    expect(Math.abs(compressionKpa(8.5, 1.3, height) - kpa)).toBeLessThan(1)
  })
})

describe('battery at rest (table credited to the battery makers, seen)', () => {
  it.each([
    [12.65, 1, 1.265],
    [12.45, 0.75, 1.225],
    [12.24, 0.5, 1.19],
    [12.06, 0.25, 1.155],
    [11.89, 0, 1.12],
    [13.2, 1, 1.265],
    [11.0, 0, 1.12],
  ])('[STD] %f V is charge %f, gravity %f', (volts, charge, gravity) => {
    expect(chargeAt(volts)).toBeCloseTo(charge, 9)
    expect(gravityAt(volts)).toBeCloseTo(gravity, 9)
  })
  it('[STD] half way between rows is half way between charges', () => {
    expect(chargeAt((12.24 + 12.45) / 2)).toBeCloseTo(0.625, 9)
  })
  it('[R10] no volts are no full battery', () => {
    expect(chargeAt(Number.NaN)).toBeNaN()
    const none = { ratedAh: 20, restVolts: Number.NaN, airTempC: 20, drawAmperes: 7 }
    expect(rideMinutes(none).minutes).toBeNaN()
  })
  it('[R10] cold factor 1 at 25 C, 0.65 at -15 C, never under 0.5', () => {
    expect([25, -15, -60, 40].map(coldFactor)).toEqual([1, expect.closeTo(0.65, 9), 0.5, 1])
  })
  it('[R10] 20 Ah at -15 C feeding 7 A: 12.24 V gives 3.9 Ah and 33 min, 12.45 V 7.15 Ah and 61 min, 11.86 V nothing', () => {
    const ride = (restVolts: number) =>
      rideMinutes({ ratedAh: 20, restVolts, airTempC: -15, drawAmperes: 7 })
    expect(ride(12.24)).toEqual({
      ampereHours: expect.closeTo(3.9, 6),
      minutes: expect.closeTo(33.4, 1),
    })
    expect(ride(12.45)).toEqual({
      ampereHours: expect.closeTo(7.15, 6),
      minutes: expect.closeTo(61.3, 1),
    })
    expect(ride(11.86).minutes).toBe(0)
  })
  it('[R10] at the low end of +-0.09 V they give 19 and 49 min', () => {
    const ride = (restVolts: number) =>
      rideMinutes({ ratedAh: 20, restVolts, airTempC: -15, drawAmperes: 7 }).minutes
    expect(Math.floor(ride(12.24 - 0.09))).toBe(19)
    expect(Math.round(ride(12.45 - 0.09))).toBe(49)
  })
})

describe('ignition coil current (L I^2 / 2, V/R (1 - e^(-tR/L)); recomputed)', () => {
  it.each([
    [0.005, 6, 0.09],
    [0.003, 7, 0.0735],
    [0.008, 6.5, 0.169],
  ])('[STD] %f H at %f A stores %f J', (henry, amperes, joules) => {
    expect(storedJoules(henry, amperes)).toBeCloseTo(joules, 6)
  })
  it.each([
    [14, 0.001, 4.2985],
    [14, 0.002, 7.9371],
    [14, 0.003, 11.0171],
    [9, 0.002, 5.1024],
  ])('[STD] %f V for %f s drive %f A through 0.5 ohm and 3 mH', (volts, seconds, amperes) => {
    expect(primaryAmperes({ ohm: 0.5, henry: 0.003 }, volts, seconds)).toBeCloseTo(amperes, 3)
  })
  it('[STD] 6 A take 1.447 ms at 14 V and 2.433 ms at 9 V: why a weak battery gives a weak spark', () => {
    expect(1000 * secondsTo({ ohm: 0.5, henry: 0.003 }, 14, 6)).toBeCloseTo(1.447, 3)
    expect(1000 * secondsTo({ ohm: 0.5, henry: 0.003 }, 9, 6)).toBeCloseTo(2.433, 3)
    expect(secondsTo({ ohm: 2, henry: 0.003 }, 9, 6)).toBe(Number.POSITIVE_INFINITY)
  })
})

describe('vehicle number check digit, 49 CFR 565.15', () => {
  it.each([
    ['1M8GDM9AXKP042788', 351, 'X', true],
    ['1G4AH59H45G118341', 411, '4', true],
    ['11111111111111111', 89, '1', true],
    ['1M8GDM9A1KP042788', 351, 'X', false],
  ])('[STD] %s: sum %i, digit %s', (vin, sum, expected, matches) => {
    expect(checkVin(vin)).toEqual({ ok: true, value: { sum, expected, matches } })
  })
  it('[STD] I, O, Q and other lengths are named, not guessed', () => {
    expect(checkVin('1M8GDM9AXKP04278O')).toMatchObject({
      problem: { kind: 'badCharacter', character: 'O', at: 17 },
    })
    expect(checkVin('SN-4471')).toMatchObject({ problem: { kind: 'notSeventeen', length: 7 } })
  })
})
