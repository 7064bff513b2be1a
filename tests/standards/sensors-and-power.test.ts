import { describe, expect, it } from 'vitest'
import { compressionKpa, compressionShare, geopotentialOf, pressureAt } from '@/lib/diag/atmosphere'
import {
  type BatteryKind,
  chargeAt,
  chargeOf,
  coldFactor,
  FULL_VOLTS,
  freezeWarning,
  rideEnergy,
  rideVerdict,
} from '@/lib/diag/battery-charge'
import { primaryAmperes, secondsTo, storedJoules } from '@/lib/diag/coil-current'
import {
  fitSteinhart,
  ntcCelsius,
  ntcOhm,
  pt100Celsius,
  pt100Ohm,
  steinhartCelsius,
} from '@/lib/diag/temperature-sensors'
import { checkVin } from '@/lib/diag/vin'
import { theValue } from './the-value'

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
    expect(Math.floor(theValue(ntcOhm(10_000, 3974, celsius)) + 1e-6)).toBe(ohm)
    expect(theValue(ntcCelsius(10_000, 3974, theValue(ntcOhm(10_000, 3974, celsius))))).toBeCloseTo(
      celsius,
      9,
    )
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
    expect(theValue(steinhartCelsius(seen, ohm))).toBeCloseTo(celsius, 8)
  })
  it('[STD] fit through 0, 25 and 50 C of a 10 kohm table gives its 10, 20 and 30 C rows (instrument manual, seen)', () => {
    const fit = theValue(
      fitSteinhart([
        [32128, 0],
        [9814, 25],
        [3542, 50],
      ]),
    )
    expect(fit.a).toBeCloseTo(1.10415912e-3, 9)
    expect(fit.b).toBeCloseTo(2.38917947e-4, 10)
    expect(fit.c).toBeCloseTo(6.93162653e-8, 12)
    expect(theValue(steinhartCelsius(fit, 19549))).toBeCloseTo(10.0, 3)
    expect(theValue(steinhartCelsius(fit, 12262))).toBeCloseTo(19.999, 3)
    expect(theValue(steinhartCelsius(fit, 7908))).toBeCloseTo(29.998, 3)
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
    expect(Math.abs(theValue(pt100Ohm(celsius)) - ohm)).toBeLessThan(0.005)
    expect(theValue(pt100Celsius(theValue(pt100Ohm(celsius))))).toBeCloseTo(celsius, 9)
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
    expect(Math.abs(theValue(pressureAt(height)) - pascals)).toBeLessThan(1)
  })
  it.each([
    [1000, 89876],
    [2000, 79501],
    [3000, 70121],
    [5000, 54048],
  ])('[STD] %i m geometric is %i Pa (memory, recomputed)', (height, pascals) => {
    expect(Math.abs(theValue(pressureAt(theValue(geopotentialOf(height)))) - pascals)).toBeLessThan(
      1,
    )
  })
  it.each([
    [0, 14.696],
    [1000, 14.175],
    [3000, 13.173],
    [5000, 12.23],
    [8000, 10.914],
    [10000, 10.108],
  ])('[STD] %i ft is %f psi (engineering table, seen)', (feet, psi) => {
    expect(Math.abs(theValue(pressureAt(feet * 0.3048)) / 6894.757 - psi)).toBeLessThan(0.003)
  })
  it('[STD] a compression gauge reads 0.887, 0.7846 and 0.6919 of sea level at 1, 2 and 3 km', () => {
    expect([1000, 2000, 3000].map((m) => theValue(compressionShare(m)))).toEqual(
      [0.887, 0.7846, 0.6919].map((x) => expect.closeTo(x, 4)),
    )
  })
  it.each([
    [0, 1535],
    [1000, 1362],
    [2000, 1205],
    [3000, 1062],
  ])('[STD] ratio 8.5, n 1.3 at %i m: %i kPa (CHECKS 2.8)', (height, kpa) => {
    expect(Math.abs(theValue(compressionKpa(8.5, 1.3, height)) - kpa)).toBeLessThan(1)
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
    expect(theValue(chargeAt(volts))).toEqual({
      charge: expect.closeTo(charge, 9),
      gravity: expect.closeTo(gravity, 9),
    })
  })
  it('[STD] half way between rows is half way between charges', () => {
    expect(theValue(chargeAt((12.24 + 12.45) / 2)).charge).toBeCloseTo(0.625, 9)
  })
  it('[R10] no volts are no full battery', () => {
    expect(chargeAt(Number.NaN)).toMatchObject({ ok: false, problem: { field: 'restVolts' } })
    expect(rideEnergy(ride({ restVolts: Number.NaN }))).toMatchObject({ ok: false })
  })
  it('[STD] a meter of 1 % (120 mV) tells charge no better than +-15 of 100 (source note on the table)', () => {
    const read = { restVolts: 12.35, expandedU: 0.12, kind: 'flooded' as const }
    const { low, high } = theValue(chargeOf(read))
    expect((high - low) / 2).toBeGreaterThan(0.14)
  })
  it('[STD] AGM full 12.8 to 12.9 V, lithium-iron-phosphate 13.2 to 13.4 V: their volts tell no charge (practice)', () => {
    expect(FULL_VOLTS.agm).toMatchObject({ low: 12.8, high: 12.9 })
    expect(FULL_VOLTS.lithiumIronPhosphate).toMatchObject({ low: 13.2, high: 13.4 })
    for (const kind of ['agm', 'lithiumIronPhosphate'] as const)
      expect(chargeOf({ restVolts: 13, expandedU: 0.1, kind })).toMatchObject({
        problem: { kind: 'kindTellsNothing' },
      })
  })
  it('[STD] it can freeze: at or below 0 C under 12.06 V, from memory -7 C', () => {
    expect(theValue(freezeWarning(12.05, 0))?.signal).toBe('DANGER')
    expect(theValue(freezeWarning(12.06, 0))).toBeNull()
    expect(theValue(freezeWarning(11, 0.1))).toBeNull()
  })
  it('[R10] cold factor 1 at 25 C, 0.65 at -15 C, never under 0.5', () => {
    expect([25, -15, -60, 40].map((t) => theValue(coldFactor(t)))).toEqual([
      1,
      expect.closeTo(0.65, 9),
      0.5,
      1,
    ])
  })
  it('[S5] 20 Ah at -15 C feeding 7 A: 12.24 V gives 3.9 Ah and 33 min, 12.45 V 7.15 Ah and 61 min, 11.86 V nothing', () => {
    expect(theValue(rideEnergy(ride({ restVolts: 12.24 })))).toMatchObject({
      ampereHours: expect.closeTo(3.9, 6),
      minutes: expect.closeTo(33.4, 1),
      empty: false,
    })
    expect(theValue(rideEnergy(ride({ restVolts: 12.45 })))).toMatchObject({
      ampereHours: expect.closeTo(7.15, 6),
      minutes: expect.closeTo(61.3, 1),
    })
    expect(theValue(rideEnergy(ride({ restVolts: 11.86 })))).toMatchObject({
      minutes: 0,
      empty: true,
    })
  })
  it('[S5] 25 min of riding want 37: refused as empty, as 18 min short, and enough by the low end of +-0.09 V', () => {
    const at = (restVolts: number) => theValue(rideVerdict(ride({ restVolts }), 25))
    expect(at(11.86)).toMatchObject({ verdict: 'empty', wantedMinutes: 37 })
    expect(at(12.24)).toMatchObject({ verdict: 'short', shortMinutes: 18 })
    expect(Math.floor(at(12.24).minutesAtLowEnd)).toBe(19)
    expect(at(12.45)).toMatchObject({ verdict: 'enough', shortMinutes: 0 })
    expect(Math.floor(at(12.45).minutesAtLowEnd)).toBe(49)
  })
  it('[R10] short by less than a minute is a minute short', () => {
    const energy = theValue(rideEnergy(ride({ restVolts: 12.45 })))
    const exactly = energy.minutesAtLowEnd / 1.5
    expect(theValue(rideVerdict(ride({ restVolts: 12.45 }), exactly + 0.01))).toMatchObject({
      verdict: 'short',
      shortMinutes: 1,
    })
    expect(theValue(rideVerdict(ride({ restVolts: 12.45 }), exactly - 0.01)).verdict).toBe('enough')
  })
  it('[R10] no ride is reckoned from the volts of a kind that tells no charge by them', () => {
    for (const kind of ['agm', 'lithiumIronPhosphate'] as const) {
      const problem = { ok: false, problem: { kind: 'kindTellsNothing' } }
      expect(rideEnergy(ride({ kind, restVolts: 13.2 }))).toEqual(problem)
      expect(rideVerdict(ride({ kind, restVolts: 13.2 }), 25)).toEqual(problem)
    }
  })
  it('[A1] a draw of nought and a battery of nought are named', () => {
    expect(rideEnergy(ride({ drawAmperes: 0 }))).toMatchObject({
      problem: { field: 'drawAmperes' },
    })
    expect(rideEnergy(ride({ ratedAh: -1 }))).toMatchObject({ problem: { field: 'ratedAh' } })
    expect(rideEnergy(ride({ airTempC: 90 }))).toMatchObject({ problem: { field: 'airTempC' } })
  })
})

const ride = (over: Partial<Parameters<typeof rideEnergy>[0]>) => ({
  kind: 'flooded' as BatteryKind,
  ratedAh: 20,
  restVolts: 12.45,
  expandedU: 0.09,
  airTempC: -15,
  drawAmperes: 7,
  ...over,
})

describe('ignition coil current (L I^2 / 2, V/R (1 - e^(-tR/L)); recomputed)', () => {
  it.each([
    [0.005, 6, 0.09],
    [0.003, 7, 0.0735],
    [0.008, 6.5, 0.169],
  ])('[STD] %f H at %f A stores %f J', (henry, amperes, joules) => {
    expect(theValue(storedJoules(henry, amperes))).toBeCloseTo(joules, 6)
  })
  it.each([
    [14, 0.001, 4.2985],
    [14, 0.002, 7.9371],
    [14, 0.003, 11.0171],
    [9, 0.002, 5.1024],
  ])('[STD] %f V for %f s drive %f A through 0.5 ohm and 3 mH', (volts, seconds, amperes) => {
    expect(theValue(primaryAmperes({ ohm: 0.5, henry: 0.003 }, volts, seconds))).toBeCloseTo(
      amperes,
      4,
    )
  })
  it('[STD] 6 A take 1.447 ms at 14 V and 2.433 ms at 9 V: why a weak battery gives a weak spark', () => {
    expect(1000 * theValue(secondsTo({ ohm: 0.5, henry: 0.003 }, 14, 6))).toBeCloseTo(1.447, 3)
    expect(1000 * theValue(secondsTo({ ohm: 0.5, henry: 0.003 }, 9, 6))).toBeCloseTo(2.433, 3)
    expect(theValue(secondsTo({ ohm: 2, henry: 0.003 }, 9, 6))).toBe(Number.POSITIVE_INFINITY)
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
