/**
 * Grid references as text: MGRS in one word (`38SMB4414084706`), USNG in groups (`18S UJ 23478 06483`), its short
 * form without the zone (`UJ 234 064`), and UTM. What is printed here is read back as the same square. Rule [A7].
 */
import type { Place } from '@/lib/model/place'
import { fail, ok, type Result } from '@/lib/model/result'
import type { FigureProblem } from './figure-bounds'
import {
  EDGE_DEGREES,
  type GridProblem,
  type GridSquare,
  placeOfSquare,
  pointOfUtm,
  squareOf,
  type Utm,
} from './grid-reference'

type Point = Pick<Place, 'latitude' | 'longitude'>

/** `notGrid`: the text has not the form. `twoWays`: the letter S is a band in the north and the southern half. */
export type GridTextProblem =
  | GridProblem
  | { kind: 'notGrid' }
  | { kind: 'twoWays'; north: Point; south: Point }

/** The square in one word, as on military maps. */
export const printMgrs = ({ zone, band, column, row, easting, northing }: GridSquare): string =>
  `${zone}${band}${column}${row}${easting}${northing}`

/** The square in groups, as rescue services write it. */
export const printUsng = (square: GridSquare): string =>
  `${square.zone}${square.band} ${printShort(square)}`

/** The square without its zone: enough for people who know where they are within some hundred kilometres. */
export const printShort = ({ column, row, easting, northing }: GridSquare): string =>
  [`${column}${row}`, easting, northing].filter((part) => part !== '').join(' ')

/** Zone with the half of the globe, metres east and north with 0 to 3 decimals, cut off and not rounded. */
export function printUtm(utm: Utm, decimals = 0): string {
  const unit = 10 ** Math.min(3, Math.max(0, Math.floor(decimals)))
  const metres = (m: number): string =>
    (Math.floor(m * unit + 1e-7) / unit).toFixed(Math.round(Math.log10(unit)))
  return `${utm.zone}${utm.hemisphere} ${metres(utm.eastingMetres)} ${metres(utm.northingMetres)}`
}

/** A whole reference in any spacing and case, MGRS or USNG; squares that do not exist are refused. */
export function parseGrid(text: string): Result<GridSquare, GridTextProblem> {
  const match = /^(\d{1,2})([C-HJ-NP-X])([A-HJ-NP-Z])([A-HJ-NP-V])(\d*)$/.exec(tight(text))
  const digits = digitsOf(match?.[5])
  if (match === null || digits === null) return fail({ kind: 'notGrid' })
  const [, zone = '', band = '', column = '', row = ''] = match
  const square = { zone: Number(zone), band, column, row, ...digits }
  const place = placeOfSquare(square)
  return place.ok ? ok(square) : place
}

/**
 * A reference without its zone, read as the square nearest to a place known to be near: the two letters come
 * again every 18 degrees east and every 2,000 km north. Both sides of a zone's edge are looked at.
 */
export function parseShort(text: string, near: Point): Result<GridSquare, GridTextProblem> {
  const match = /^([A-HJ-NP-Z])([A-HJ-NP-V])(\d*)$/.exec(tight(text))
  const digits = digitsOf(match?.[3])
  const here = squareOf(near, 0)
  if (match === null || digits === null) return fail({ kind: 'notGrid' })
  if (!here.ok) return here
  const [, column = '', row = ''] = match
  const [best] = around(here.value)
    .map(({ zone, band }) => ({ zone, band, column, row, ...digits }))
    .flatMap((square) => {
      const place = placeOfSquare(square)
      if (!place.ok) return []
      const own = squareOf(place.value.centre, 0)
      const named = own.ok && own.value.zone === square.zone && own.value.band === square.band
      return [{ square, apart: apart(place.value.centre, near), named }]
    })
    // A square on a band's edge is read in both bands; the one its centre lies in names it.
    .sort((a, b) => a.apart - b.apart || Number(b.named) - Number(a.named))
  return best === undefined ? fail({ kind: 'noSuchSquare' }) : ok(best.square)
}

/**
 * UTM as text: zone with N, S or a band letter, metres east, metres north. `38S` may mean band S, which lies in
 * the north, or the southern half; where both fit, both are answered and neither is taken. Another letter than N
 * and S is a band, and metres that lie outside it are refused as `noSuchSquare`.
 */
export function parseUtm(text: string): Result<Point, GridTextProblem> {
  const match = /^(\d{1,2})\s*([C-HJ-NP-X])[\s,]+(\d+(?:\.\d+)?)[\s,]+(\d+(?:\.\d+)?)$/.exec(
    text.trim().toUpperCase(),
  )
  if (match === null) return fail({ kind: 'notGrid' })
  const [, zone, letter = '', east, north] = match
  const at = (hemisphere: 'N' | 'S'): Result<Point, FigureProblem | GridProblem> =>
    pointOfUtm({
      zone: Number(zone),
      hemisphere,
      eastingMetres: Number(east),
      northingMetres: Number(north),
    })
  if (letter === 'N') return at('N')
  if (letter !== 'S') {
    const point = at(letter > 'N' ? 'N' : 'S')
    return point.ok && !isInBand(point.value, letter) ? fail({ kind: 'noSuchSquare' }) : point
  }
  const [asBand, asHalf] = [at('N'), at('S')]
  if (!asBand.ok || asBand.value.latitude < 32 || asBand.value.latitude >= 40) return asHalf
  return asHalf.ok
    ? fail({ kind: 'twoWays', north: asBand.value, south: asHalf.value })
    : ok(asBand.value)
}

const tight = (text: string): string => text.toUpperCase().replace(/[\s-]/g, '')

function digitsOf(text = ''): { easting: string; northing: string } | null {
  if (text.length % 2 === 1 || text.length > 10) return null
  const half = text.length / 2
  return { easting: text.slice(0, half), northing: text.slice(half) }
}

const BANDS = 'CDEFGHJKLMNPQRSTUVWX'
function isInBand({ latitude }: Point, band: string): boolean {
  const south = 8 * BANDS.indexOf(band) - 80
  const north = band === 'X' ? 84 : south + 8
  return latitude >= south - EDGE_DEGREES && latitude <= north + EDGE_DEGREES
}

function around({ zone, band }: GridSquare): { zone: number; band: string }[] {
  const at = BANDS.indexOf(band)
  const bands = [at - 1, at, at + 1].flatMap((i) => BANDS[i] ?? [])
  const zones = [zone - 2, zone - 1, zone, zone + 1, zone + 2].map((z) => ((z + 59) % 60) + 1)
  return zones.flatMap((z) => bands.map((b) => ({ zone: z, band: b })))
}

/** How far apart two points are, only good for telling which is nearer: degrees on a flat map. */
function apart(a: Point, b: Point): number {
  const across = ((a.longitude - b.longitude + 540) % 360) - 180
  const middle = ((a.latitude + b.latitude) / 2) * (Math.PI / 180)
  return Math.hypot(a.latitude - b.latitude, across * Math.cos(middle))
}
