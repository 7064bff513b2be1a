import { describe, expect, it } from 'vitest'
import { distanceMetres } from '@/lib/diag/distance'

const between = (from: [number, number], to: [number, number]) =>
  distanceMetres({ latitude: from[0], longitude: from[1] }, { latitude: to[0], longitude: to[1] })
/** Degrees of a place given in degrees, minutes and seconds. */
const dms = (degrees: number, minutes: number, seconds: number) =>
  degrees + minutes / 60 + seconds / 3600

describe('distance on the WGS 84 ellipsoid, to the millimetre', () => {
  // The first two are lines of the published GeographicLib test cases; the others are answers of GeodSolve,
  // GeographicLib's own program. The fourth and fifth are those on which Vincenty's series does not end.
  it.each([
    [[35.60777, -139.44815], [-11.17491, -69.95921], 8935244.5604818],
    [[55.52454, 106.05087], [77.03196, 197.18234], 4105086.1713924],
    [[40.6, -73.8], [51.6, -0.5], 5551759.400319],
    [[0, 0], [0.5, 179.5], 19936288.578965],
    [[0, 0], [0.5, 179.7], 19944127.42075],
    [[-41.32, 174.81], [40.96, -5.5], 19959679.267354],
  ] as [[number, number], [number, number], number][])(
    '[STD] %j to %j: %f m',
    (from, to, metres) => {
      expect(Math.abs(between(from, to) - metres)).toBeLessThan(0.001)
      expect(Math.abs(between(to, from) - metres)).toBeLessThan(0.001)
    },
  )

  it('[STD] the test line of the geodetic manuals for Vincenty (GRS 80, the same to a micrometre): 54972.271 m', () => {
    const metres = between(
      [-dms(37, 57, 3.7203), dms(144, 25, 29.5244)],
      [-dms(37, 39, 10.1561), dms(143, 55, 35.3839)],
    )
    expect(Math.abs(metres - 54972.271)).toBeLessThan(0.001)
  })

  it('[STD] is nought for one place, also with its longitude a turn further', () => {
    expect(between([47.1, -93.2], [47.1, -93.2])).toBe(0)
    expect(between([47.1, -93.2], [47.1, 266.8])).toBeLessThan(0.001)
  })

  // A sphere of 6371.0088 km is within 0.56 % (published beside the test cases): a wrong axis would show.
  it('[STD] a degree of the equator is 2 pi 6378137 / 360 m (semi-major axis of WGS 84)', () => {
    expect(between([0, 0], [0, 1])).toBeCloseTo((2 * Math.PI * 6378137) / 360, 3)
  })
})
