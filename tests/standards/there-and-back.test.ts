import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { binomialP } from '@/lib/diag/binomial-test'
import { readDm1 } from '@/lib/diag/codes'
import { copperAt } from '@/lib/diag/copper'
import { sunHeight } from '@/lib/diag/daylight'
import { coursesBetween, distanceMetres } from '@/lib/diag/distance'
import { parsePlace, printDegrees, printMinutes } from '@/lib/diag/place-text'
import { chanceLeft } from '@/lib/diag/proof-run'
import { fitSteinhart, pt100Ohm, steinhartCelsius } from '@/lib/diag/temperature-sensors'
import { inKeptUnit, unitsOf } from '@/lib/diag/typed-units'
import { checkVin, modelYears } from '@/lib/diag/vin'
import { QUANTITIES, type Quantity } from '@/lib/model/meter-profile'
import { theValue } from './the-value'

describe('vehicle numbers, 49 CFR 565.15', () => {
  const letters = [...'ABCDEFGHJKLMNPRSTUVWXYZ0123456789']
  const body = fc.array(fc.constantFrom(...letters), { minLength: 17, maxLength: 17 })
  const withDigit = (characters: string[]): string => {
    const { expected } = theValue(checkVin(characters.join('')))
    return characters.with(8, expected).join('')
  }
  it('[A8] any number takes the digit it asks for, and case and blanks around it change nothing', () => {
    fc.assert(
      fc.property(body, (characters) => {
        const vin = withDigit(characters)
        expect(theValue(checkVin(vin)).matches).toBe(true)
        expect(checkVin(` ${vin.toLowerCase()} `)).toEqual(checkVin(vin))
      }),
      { seed: 71 },
    )
  })
  it('[A8] one digit mistyped never matches: weights have no factor in common with 11', () => {
    const at = fc.integer({ min: 0, max: 16 }).filter((i) => i !== 8)
    fc.assert(
      fc.property(body, at, fc.integer({ min: 1, max: 9 }), (characters, i, by) => {
        const digits = characters.map((c) => (/\d/.test(c) ? c : '7'))
        const vin = withDigit(digits)
        const wrong = String((Number(vin[i]) + by) % 10)
        expect(theValue(checkVin([...vin].with(i, wrong).join(''))).matches).toBe(false)
      }),
      { seed: 72 },
    )
  })
  it('[STD] a match proves little: about 1 random number in 11 has it', () => {
    let matches = 0
    const numbers = fc.sample(body, { seed: 73, numRuns: 4400 })
    for (const characters of numbers) if (theValue(checkVin(characters.join(''))).matches) matches++
    // The check place takes 33 characters of which 11 can match, each as likely: 1 in 33 of these.
    expect(matches / numbers.length).toBeGreaterThan(1 / 45)
    expect(matches / numbers.length).toBeLessThan(1 / 25)
  })
  it.each([
    ['A', [1980, 2010]],
    ['Y', [2000]],
    ['1', [2001]],
    ['9', [2009]],
    ['K', [1989, 2019]],
    ['T', [1996, 2026]],
    ['U', []],
    ['0', []],
  ])('[STD] year letter %s in 2026: %j (49 CFR 565.15, memory)', (letter, years) => {
    expect(theValue(modelYears(`1M8GDM9AX${letter}P042788`, 2026))).toEqual(years)
  })
  it('[STD] Y is 2030 as well once its models come', () => {
    expect(theValue(modelYears('1M8GDM9AXYP042788', 2029))).toEqual([2000, 2030])
    expect(modelYears('SHORT', 2026)).toMatchObject({ problem: { kind: 'notSeventeen' } })
    for (const year of [Number.NaN, Number.POSITIVE_INFINITY])
      expect(() => modelYears('1M8GDM9AXYP042788', year)).toThrow('figureOutOfRange')
  })
})

describe('places there and back', () => {
  const point = fc.record({
    latitude: fc.double({ min: -90, max: 90, noNaN: true }),
    longitude: fc.double({ min: -180, max: 180, noNaN: true }),
  })
  it('[F1] printed as degrees or as minutes any place is read back within 1.3 m', () => {
    fc.assert(
      fc.property(point, (place) => {
        for (const print of [printDegrees, printMinutes])
          expect(distanceMetres(theValue(parsePlace(print(place))), place)).toBeLessThan(1.32)
      }),
      { seed: 74, numRuns: 400 },
    )
  })
  it('[A8] the way back is as far, and its courses are turned round', () => {
    fc.assert(
      fc.property(point, point, (a, b) => {
        expect(distanceMetres(b, a)).toBeCloseTo(distanceMetres(a, b), 4)
        for (const course of Object.values(coursesBetween(a, b))) {
          expect(course).toBeGreaterThanOrEqual(0)
          expect(course).toBeLessThanOrEqual(360)
        }
      }),
      { seed: 75 },
    )
  })
  it.each([
    [[35.60777, -139.44815], [-11.17491, -69.95921], 111.09874842956, 129.289270889709],
    [[55.52454, 106.05087], [77.03196, 197.18234], 22.020059880983, 109.112041110672],
    [[40.6, -73.8], [51.6, -0.5], 51.198882846, 107.821776736],
    [[0, 0], [0.5, 179.5], 25.671872868, 154.327085465],
    [[0, 0], [0.5, 179.7], 15.556882793, 164.442513891],
    [[-41.32, 174.81], [40.96, -5.5], 161.067669986, 18.825195123],
  ] as [[number, number], [number, number], number, number][])(
    '[STD] %j to %j leaves at %f and comes in at %f degrees (GeographicLib)',
    (from, to, start, end) => {
      const at = ([latitude, longitude]: [number, number]) => ({ latitude, longitude })
      const courses = coursesBetween(at(from), at(to))
      expect(courses.start).toBeCloseTo(start, 8)
      expect(courses.end).toBeCloseTo(end, 8)
    },
  )
  it('[STD] the geodetic manuals’ line for Vincenty: 306 52 05.37, back 127 10 25.07', () => {
    const dms = (d: number, m: number, s: number) => d + m / 60 + s / 3600
    const from = { latitude: -dms(37, 57, 3.7203), longitude: dms(144, 25, 29.5244) }
    const to = { latitude: -dms(37, 39, 10.1561), longitude: dms(143, 55, 35.3839) }
    const courses = coursesBetween(from, to)
    expect(courses.start).toBeCloseTo(dms(306, 52, 5.37), 5)
    expect((courses.end + 180) % 360).toBeCloseTo(dms(127, 10, 25.07), 5)
  })
  it('[STD] a sphere of 6371.0088 km is within 0.56 of 100 for lines of a trail and longer', () => {
    const sphere = (a: typeof PLACE, b: typeof PLACE): number => {
      const rad = Math.PI / 180
      const h =
        Math.sin(((b.latitude - a.latitude) * rad) / 2) ** 2 +
        Math.cos(a.latitude * rad) *
          Math.cos(b.latitude * rad) *
          Math.sin(((b.longitude - a.longitude) * rad) / 2) ** 2
      return 2 * 6371008.8 * Math.asin(Math.sqrt(Math.min(1, h)))
    }
    fc.assert(
      fc.property(point, point, (a, b) => {
        fc.pre(distanceMetres(a, b) > 100)
        expect(Math.abs(sphere(a, b) / distanceMetres(a, b) - 1)).toBeLessThan(0.0057)
      }),
      { seed: 76 },
    )
  })
  it('[S4] the fix of unit 31 lies 35 m from Gate 4, the typed 47.06 N 93.12 W 7.5 km', () => {
    const fix = { latitude: 47.10031, longitude: -93.20007 }
    expect(Math.round(distanceMetres(fix, PLACE))).toBe(35)
    const typed = { latitude: 47.06, longitude: -93.12 }
    expect(distanceMetres(typed, PLACE) / 1000).toBeCloseTo(7.5, 1)
  })
  it('[A1] what is no point breaks an assumption and gives no NaN', () => {
    expect(() => distanceMetres({ latitude: 91, longitude: 0 }, PLACE)).toThrow('notAPoint')
    expect(() => coursesBetween({ latitude: Number.NaN, longitude: 0 }, PLACE)).toThrow('notAPoint')
  })
})
const PLACE = { latitude: 47.1, longitude: -93.2 }

describe('units change nothing', () => {
  const cases = (Object.keys(QUANTITIES) as Quantity[]).flatMap((quantity) =>
    unitsOf(quantity).map((unit) => [quantity, unit] as const),
  )
  it.each(cases)('[A8] %s typed in another unit is the same figure: %j', (_, unit) => {
    fc.assert(
      fc.property(fc.double({ min: -1e4, max: 1e4, noNaN: true }), (kept) => {
        const typed = (kept - unit.offset) / unit.factor
        expect(Math.abs(inKeptUnit(typed, unit) - kept)).toBeLessThan(1e-7)
      }),
      { seed: 77, numRuns: 50 },
    )
  })
})

describe('values of CHECKS that stand alone', () => {
  it('[STD] 682 of 925 against 0.75: two-sided p 0.3824916 (Conover; R exact binomial help, recomputed)', () => {
    expect(theValue(binomialP(682, 925, 0.75))).toBeCloseTo(0.3824916, 7)
    expect(theValue(binomialP(5, 10, 0.5))).toBeCloseTo(1, 12)
    expect(theValue(binomialP(0, 10, 0.5))).toBeCloseTo(2 / 1024, 12)
    expect(theValue(binomialP(3, 7, 0))).toBe(0)
    expect(theValue(binomialP(7, 7, 1))).toBe(1)
    expect(binomialP(11, 10, 0.5)).toMatchObject({ problem: { kind: 'above', field: 'k' } })
    expect(binomialP(1.5, 10, 0.5)).toMatchObject({ problem: { field: 'k' } })
  })
  it('[STD] the 40 C row of the second NTC table is a misprint: 5331 is not on its own curve, 5231 is (CHECKS 2.5 trap)', () => {
    const fit = theValue(
      fitSteinhart([
        [32128, 0],
        [9814, 25],
        [3542, 50],
      ]),
    )
    expect(theValue(steinhartCelsius(fit, 5231))).toBeCloseTo(40, 1)
    expect(theValue(steinhartCelsius(fit, 5331))).toBeLessThan(39.6)
  })
  it('[A1] three resistances whose logarithms sum to nought have no one curve', () => {
    const fit = fitSteinhart([
      [0.5, 0],
      [1, 25],
      [2, 50],
    ])
    expect(fit).toEqual({ ok: false, problem: { kind: 'noCurve' } })
  })
  it('[A1] copper outside its straight line breaks an assumption', () => {
    expect(() => copperAt(1, -234.45, 20)).toThrow('figureOutOfRange')
    expect(() => copperAt(Number.NaN, 20, 20)).toThrow('figureOutOfRange')
  })
  it('[STD] IEC 60751 and not the older coefficients: 138.51 at 100, 84.27 at -40 (CHECKS 2.5 trap: 138.50, 84.21)', () => {
    expect(theValue(pt100Ohm(100))).toBeCloseTo(138.5055, 4)
    expect(theValue(pt100Ohm(-40))).toBeCloseTo(84.27, 2)
  })
  it('[STD] lamps: 10 is an error, 11 not available; flash 10 is kept free (SAE J1939-73)', () => {
    const dm1 = theValue(readDm1([0b10_11_00_01, 0b10_11_00_01, 0xf4, 4, 5, 1, 255, 255]))
    expect(dm1.lamps).toEqual({
      malfunction: { state: 'error', flash: 'reserved' },
      stop: { state: 'notAvailable', flash: 'steady' },
      warning: { state: 'off', flash: 'slow' },
      protect: { state: 'on', flash: 'fast' },
    })
  })
  it('[STD] SPA example 2003-10-17 12:30:30: zenith 50.11162, refraction included (seen), within 0.05 degrees', () => {
    const height = sunHeight(39.742476, -105.1786, Date.parse('2003-10-17T19:30:30Z'))
    expect(Math.abs(height - (90 - 50.11162))).toBeLessThan(0.05)
  })
  it('[S7] what is certain stays certain, however long it is clean', () => {
    expect(chanceLeft(1, 0.05, 1e6)).toBe(1)
    expect(chanceLeft(0, 0.05, 10)).toBe(0)
    expect(chanceLeft(0.3, 0.05, 1e9)).toBe(0)
  })
})
