/**
 * How far two places are apart. Choice: the geodesic on the WGS 84 ellipsoid by Karney's method (C. F. F.
 * Karney, Algorithms for geodesics, J. Geodesy 87, 2013), which also holds for places nearly opposite on the
 * globe, where Vincenty's series (1975) does not end. The trade-off is 9 kB (gzip), so only screens that are
 * fetched when wanted may come to this file; it is the only one that may import the library.
 */
import geodesic from 'geographiclib-geodesic'
import type { Place } from '@/lib/model/place'

/** A point on WGS 84 in degrees, north and east positive. */
export type Point = Pick<Place, 'latitude' | 'longitude'>

/**
 * The shortest way over the ellipsoid from one point to the other, in metres, good to well under a
 * millimetre; 0 for the same point. Latitudes -90 to 90; longitudes may run past 180. NaN outside that.
 */
export function distanceMetres(from: Point, to: Point): number {
  const { s12 } = geodesic.Geodesic.WGS84.Inverse(
    from.latitude,
    from.longitude,
    to.latitude,
    to.longitude,
    geodesic.Geodesic.DISTANCE,
  )
  return s12 ?? Number.NaN
}
