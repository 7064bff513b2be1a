import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { distanceMetres } from '@/lib/diag/distance'
import { placeOfSquare, pointOfUtm, squareOf, utmOf } from '@/lib/diag/grid-reference'
import {
  parseGrid,
  parseShort,
  parseUtm,
  printMgrs,
  printShort,
  printUsng,
  printUtm,
} from '@/lib/diag/grid-text'
import { theValue } from './the-value'

const at = (latitude: number, longitude: number) => ({ latitude, longitude })

/** Latitude, longitude, zone and half, easting, northing, MGRS to a metre, where it was read. */
const ROWS: [number, number, string, number, number, string, string][] = [
  [33.3, 44.4, '38N', 444140.545, 3684706.356, '38SMB4414084706', 'GeoConvert'],
  [48.24949, 16.4145, '33N', 605004.394, 5344997.7, '33UXP0500444997', 'mgrs package test, seen'],
  [0, 0, '31N', 166021.443, 0, '31NAA6602100000', 'mgrs package test, seen'],
  [0.00001, 0, '31N', 166021.443, 1.107, '31NAA6602100001', 'mgrs package test, seen'],
  [38.8895, -77.0353, '18N', 323478.063, 4306483.242, '18SUJ2347806483', 'GeoConvert'],
  [60, 3, '32N', 165640.332, 6666593.572, '32VJM6564066593', 'GeoConvert, coast exception'],
  [78, 8.9, '31N', 636716.846, 8665261.55, '31XFG3671665261', 'GeoConvert, island exception'],
  [78, 9.1, '33N', 363283.154, 8665261.55, '33XUG6328365261', 'GeoConvert, island exception'],
]

describe('UTM, MGRS and USNG on WGS 84', () => {
  it.each(ROWS)('[STD] %f, %f is %s %f %f, %s (%s)', (lat, lon, zone, east, north, mgrs) => {
    const utm = theValue(utmOf(at(lat, lon)))
    expect(`${utm.zone}${utm.hemisphere}`).toBe(zone)
    expect(Math.abs(utm.eastingMetres - east)).toBeLessThan(0.00051)
    expect(Math.abs(utm.northingMetres - north)).toBeLessThan(0.00051)
    expect(printMgrs(theValue(squareOf(at(lat, lon), 5)))).toBe(mgrs)
    const back = theValue(pointOfUtm(utm))
    expect(back.latitude).toBeCloseTo(lat, 10)
    expect(back.longitude).toBeCloseTo(lon, 10)
  })
  it('[STD] USNG 18S UJ 23478 06483, short form UJ 234 064: digits are cut, not rounded (GeoConvert)', () => {
    const point = at(38.8895, -77.0353)
    expect(printUsng(theValue(squareOf(point, 5)))).toBe('18S UJ 23478 06483')
    expect(printShort(theValue(squareOf(point, 3)))).toBe('UJ 234 064')
    // 23478 would round to 2348: the trap.
    expect(printMgrs(theValue(squareOf(point, 4)))).toBe('18SUJ23470648')
    expect(theValue(parseShort('uj 234 064', at(38.9, -77.1)))).toEqual(
      theValue(squareOf(point, 3)),
    )
  })
  it('[STD] 38SMB4488 has its centre at 33.33424 N 44.40363 E (GeoConvert)', () => {
    const { centre, sizeMetres } = theValue(placeOfSquare(theValue(parseGrid('38SMB4488'))))
    expect(centre.latitude).toBeCloseTo(33.33424, 5)
    expect(centre.longitude).toBeCloseTo(44.40363, 5)
    expect(sizeMetres).toBe(1000)
  })
  it('[A7] a 100 km square at a zone edge says that it is cut; its neighbour keeps its own points (library trap)', () => {
    const west = theValue(squareOf(at(38.8895, -72.0001), 0))
    const east = theValue(squareOf(at(38.8895, -71.9999), 0))
    expect([west.zone, east.zone]).toEqual([18, 19])
    expect(theValue(placeOfSquare(west)).cut).toBe(true)
    expect(theValue(placeOfSquare(theValue(parseGrid('38SMB44140847')))).cut).toBe(false)
  })
  it.each([
    ['38SMB448', 'notGrid'],
    ['38SMB441408470612', 'notGrid'],
    ['61SMB4488', 'noSuchSquare'],
    ['38SIB4488', 'notGrid'],
    ['38SAB4488', 'noSuchSquare'],
    ['38TMB4488', 'noSuchSquare'],
    ['32XMB4488', 'noSuchSquare'],
    ['34XMB4488', 'noSuchSquare'],
    // Zone 2 lies at the date line: its band X has no squares on the far side of the globe.
    ['2XKG5050', 'noSuchSquare'],
    // Only its lower edge, the equator, is in band M: its ground is 31NAA.
    ['31MAA5000', 'noSuchSquare'],
    ['', 'notGrid'],
  ])('[A7] %s is refused: %s', (text, kind) => {
    expect(parseGrid(text)).toMatchObject({ ok: false, problem: { kind } })
  })
  it('[A7] poles and impossible degrees are refused by name', () => {
    expect(utmOf(at(84.5, 0))).toMatchObject({ problem: { kind: 'polar' } })
    expect(utmOf(at(-80.1, 0))).toMatchObject({ problem: { kind: 'polar' } })
    expect(utmOf(at(91, 0))).toMatchObject({ problem: { kind: 'above', field: 'latitude' } })
    expect(utmOf(at(0, Number.NaN))).toMatchObject({ problem: { field: 'longitude' } })
    expect(squareOf(at(0, 0), 6)).toMatchObject({ problem: { field: 'digits' } })
    expect(squareOf(at(0, 0), 2.5)).toMatchObject({ problem: { field: 'digits' } })
    expect(
      pointOfUtm({ zone: 61, hemisphere: 'N', eastingMetres: 5e5, northingMetres: 0 }),
    ).toMatchObject({
      problem: { field: 'zone' },
    })
    expect(theValue(utmOf(at(10, 180))).zone).toBe(1)
    // The last millimetre before 80 S, cut off.
    const edge = theValue(utmOf(at(-79.9999999925, 0)))
    const cut = { ...edge, northingMetres: Math.floor(1000 * edge.northingMetres) / 1000 }
    expect(theValue(pointOfUtm(cut)).latitude).toBeCloseTo(-80, 7)
    const far = {
      zone: 31,
      hemisphere: 'N',
      eastingMetres: 5e5,
      northingMetres: 9_390_000,
    } as const
    expect(pointOfUtm(far)).toMatchObject({ problem: { kind: 'polar' } })
  })
  it('[A7] 38S 444140 3684706 reads two ways and neither is taken; with N or another band it reads one', () => {
    const two = parseUtm('38S 444140 3684706')
    expect(two).toMatchObject({ ok: false, problem: { kind: 'twoWays' } })
    expect(theValue(parseUtm('38N 444140.545, 3684706.356')).latitude).toBeCloseTo(33.3, 6)
    expect(theValue(parseUtm('38S 444140 8684706')).latitude).toBeLessThan(0)
    // 30 degrees south is band J (32 to 24 S); under another letter a letter or a digit is wrong.
    expect(theValue(parseUtm('38J 444140 6684706')).latitude).toBeCloseTo(-29.97, 2)
    expect(parseUtm('38H 444140 6684706')).toMatchObject({ problem: { kind: 'noSuchSquare' } })
    expect(parseUtm('38T 444140 3684706')).toMatchObject({ problem: { kind: 'noSuchSquare' } })
    expect(parseUtm('38N 444140')).toMatchObject({ problem: { kind: 'notGrid' } })
  })
})

const points = fc.record({
  latitude: fc.double({ min: -80, max: 84, noNaN: true }),
  longitude: fc.double({ min: -180, max: 180, maxExcluded: true, noNaN: true }),
})

describe('grid references there and back', () => {
  it('[A7] any place prints as a square that is read back and holds it', () => {
    fc.assert(
      fc.property(points, fc.integer({ min: 0, max: 5 }), (point, digits) => {
        const square = theValue(squareOf(point, digits))
        for (const text of [printMgrs(square), printUsng(square).toLowerCase()])
          expect(theValue(parseGrid(text))).toEqual(square)
        const place = theValue(placeOfSquare(square))
        const utm = theValue(utmOf(point))
        const far = distanceMetres(place.centre, point)
        expect(far).toBeLessThanOrEqual(place.sizeMetres * Math.SQRT1_2 * 1.004 + 0.01)
        if (!place.cut) expect(theValue(squareOf(place.centre, digits))).toEqual(square)
        expect(utm.band).toBe(square.band)
      }),
      { seed: 21, numRuns: 1500 },
    )
  })
  it('[A7] along every edge of bands and zones, and over the date line, what is printed is read back', () => {
    const corner = fc.record({
      band: fc.integer({ min: 0, max: 19 }),
      zone: fc.constantFrom(1, 2, 17, 31, 32, 33, 59, 60),
      alongBand: fc.boolean(),
      share: fc.double({ min: 0.001, max: 0.999, noNaN: true }),
      beside: fc.constantFrom(1e-7, 1e-5, 1e-3, 0.1),
    })
    fc.assert(
      fc.property(corner, fc.integer({ min: 0, max: 5 }), (c, digits) => {
        const [south, west] = [8 * c.band - 80, 6 * c.zone - 186]
        const point = c.alongBand
          ? at(south + c.beside, west + 6 * c.share)
          : at(south + 8 * c.share, west + c.beside)
        const square = theValue(squareOf(point, digits))
        expect(theValue(parseGrid(printMgrs(square)))).toEqual(square)
        const { centre, sizeMetres } = theValue(placeOfSquare(square))
        expect(distanceMetres(centre, point)).toBeLessThan(sizeMetres)
      }),
      { seed: 24, numRuns: 1500 },
    )
  })
  it('[A7] the short form near the place is the same ground', () => {
    const near = fc.record({
      latitude: fc.double({ min: -70, max: 70, noNaN: true }),
      longitude: fc.double({ min: -179.9, max: 179.9, noNaN: true }),
    })
    fc.assert(
      fc.property(near, (point) => {
        const square = theValue(squareOf(point, 4))
        const seen = { ...point, latitude: point.latitude + 0.2 }
        const read = theValue(placeOfSquare(theValue(parseShort(printShort(square), seen))))
        expect(distanceMetres(read.centre, theValue(placeOfSquare(square)).centre)).toBeLessThan(
          0.01,
        )
      }),
      { seed: 22, numRuns: 300 },
    )
  })
  it('[A7] UTM to a millimetre is the same place within two millimetres', () => {
    fc.assert(
      fc.property(points, (point) => {
        const utm = theValue(utmOf(point))
        const text = printUtm(utm, 3)
        const back = parseUtm(text)
        const found = back.ok
          ? [back.value]
          : 'north' in back.problem
            ? [back.problem.north, back.problem.south]
            : []
        const nearest = Math.min(...found.map((one) => distanceMetres(one, point)))
        expect(nearest).toBeLessThan(0.002)
        // With its band for the half, cut to whole metres, it is still taken.
        const banded = printUtm(utm).replace(/[NS]/, utm.band)
        if (utm.band !== 'S')
          expect(distanceMetres(theValue(parseUtm(banded)), point)).toBeLessThan(1.5)
      }),
      { seed: 23, numRuns: 500 },
    )
  })
})
