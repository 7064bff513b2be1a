/**
 * How far two places are apart. Choice: the geodesic on the WGS 84 ellipsoid by Karney's method (C. F. F.
 * Karney, Algorithms for geodesics, J. Geodesy 87, 2013), which also holds for places nearly opposite on the
 * globe, where Vincenty's series (1975) does not end. The trade-off is 9 kB (gzip), so only screens that are
 * fetched when wanted may come to this file; it is the only one that may import the library.
 */
import geodesic from 'geographiclib-geodesic'
import type { Place } from '@/lib/model/place'
import { AppError } from '@/lib/model/result'

/** A point on WGS 84 in degrees, north and east positive. */
export type Point = Pick<Place, 'latitude' | 'longitude'>

/**
 * The shortest way over the ellipsoid from one point to the other, in metres, good to well under a
 * millimetre; 0 for the same point. Latitudes -90 to 90; longitudes may run past 180. What is no point was never
 * parsed as one: AppError.
 */
export const distanceMetres = (from: Point, to: Point): number =>
  known(inverse(from, to, geodesic.Geodesic.DISTANCE).s12, from, to)

/**
 * The courses of that way in degrees from north by east, 0 to 360: `start` where it leaves, `end` where it comes
 * in. For one and the same point, and between poles, a course is a convention of the library.
 */
export function coursesBetween(from: Point, to: Point): { start: number; end: number } {
  const { azi1, azi2 } = inverse(from, to, geodesic.Geodesic.AZIMUTH)
  const turn = (degrees: number | undefined): number => (known(degrees, from, to) + 360) % 360
  return { start: turn(azi1), end: turn(azi2) }
}

const inverse = (from: Point, to: Point, wanted: number) =>
  geodesic.Geodesic.WGS84.Inverse(from.latitude, from.longitude, to.latitude, to.longitude, wanted)

function known(figure: number | undefined, from: Point, to: Point): number {
  if (figure === undefined || Number.isNaN(figure))
    throw new AppError('notAPoint', { context: { from, to } })
  return figure
}
