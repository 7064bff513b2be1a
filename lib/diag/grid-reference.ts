/**
 * Grid positions: UTM, and the squares of MGRS and USNG (the same grid on WGS 84). Choice: the package geodesy, as
 * its transverse Mercator (Karney 2011, sixth order) is right to nanometres also where the coast and island
 * exceptions stretch a zone to 9 or 12 degrees; the other kept package uses a shorter series and shows no UTM. It
 * adds two methods to Number.prototype, so this file alone imports it, and no screen that comes with the app may
 * reach this file. Rule [A7].
 */
import LibraryUtm, { LatLon } from 'geodesy/utm.js'
import type { Place } from '@/lib/model/place'
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'

type Point = Pick<Place, 'latitude' | 'longitude'>

/** A position in metres of its zone, with the letter of its latitude band. */
export type Utm = {
  zone: number
  hemisphere: 'N' | 'S'
  band: string
  eastingMetres: number
  northingMetres: number
}

/**
 * A square of the grid: zone 1 to 60, band letter, the two letters of its 100 km square, and 0 to 5 digits of
 * easting and of northing. Digits are cut off, never rounded: they name the square's south-west corner.
 */
export type GridSquare = {
  zone: number
  band: string
  column: string
  row: string
  easting: string
  northing: string
}

/** What a square covers, in WGS 84 degrees. */
export type GridPlace = {
  corner: Point
  centre: Point
  sizeMetres: number
  /** True when an edge of the zone or band runs through the square, so that it is no whole square. */
  cut: boolean
}

/** `polar`: beyond 80 S or 84 N, where other grids hold. `noSuchSquare`: no such letters, zone or digits there. */
export type GridProblem = FigureProblem | { kind: 'polar' } | { kind: 'noSuchSquare' }

/** The position in UTM. Latitude -90 to 90, longitude -180 to 180; 180 counts as 180 west, zone 1. */
export function utmOf({ latitude, longitude }: Point): Result<Utm, GridProblem> {
  const problem = unfit({ latitude: [latitude, -90, 90], longitude: [longitude, -180, 180] })
  if (problem !== null) return fail(problem)
  if (latitude < -80 || latitude > 84) return fail({ kind: 'polar' })
  // A hair from the equator or the date line is on it: the library leaves its range there by a rounding.
  const north = Math.abs(latitude) < HAIR_DEGREES ? 0 : latitude
  const east = longitude > 180 - HAIR_DEGREES ? -180 : longitude
  const utm = new LatLon(north, east).toUtm()
  return ok({
    zone: utm.zone,
    hemisphere: utm.hemisphere,
    band: bandOf(north),
    eastingMetres: utm.easting,
    northingMetres: utm.northing,
  })
}

/**
 * The point of a UTM position. Easting 0 to 1,000 km; northing so that it lies within 80 S to 84 N,
 * or a metre and a half beyond, which is taken for the edge.
 */
export function pointOfUtm(utm: Omit<Utm, 'band'>): Result<Point, GridProblem> {
  const { zone, hemisphere, eastingMetres, northingMetres } = utm
  const [least, most] = hemisphere === 'N' ? [0, 9_400_000] : [1_100_000, 10_000_000]
  const problem = unfit({
    zone: [zone, 1, 60],
    eastingMetres: [eastingMetres, 0, 1_000_000],
    northingMetres: [northingMetres, least, most],
  })
  if (problem !== null) return fail(problem)
  if (!Number.isInteger(zone)) return fail({ kind: 'noSuchSquare' })
  const { latitude, longitude } = pointAt(utm)
  // Metres that were cut off may lie that much outside.
  if (latitude < -80 - EDGE_DEGREES || latitude > 84 + EDGE_DEGREES) return fail({ kind: 'polar' })
  return ok({ latitude: Math.min(84, Math.max(-80, latitude)), longitude })
}

/** The square that holds a position, with 0 to 5 whole digits each way (5 is a metre, 0 is 100 km). */
export function squareOf(point: Point, digits: number): Result<GridSquare, GridProblem> {
  const problem = unfit({ digits: [Number.isInteger(digits) ? digits : Number.NaN, 0, 5] })
  if (problem !== null) return fail(problem)
  const utm = utmOf(point)
  if (!utm.ok) return utm
  const { zone, band, eastingMetres, northingMetres } = utm.value
  const { columns, rows } = lettersOf(zone)
  const cut = (metres: number): string =>
    String(Math.floor(metres) % 100_000)
      .padStart(5, '0')
      .slice(0, digits)
  return ok({
    zone,
    band,
    column: columns.charAt(Math.floor(eastingMetres / 100_000) - 1),
    row: rows.charAt(Math.floor(northingMetres / 100_000) % 20),
    easting: cut(eastingMetres),
    northing: cut(northingMetres),
  })
}

/**
 * What a square covers. `noSuchSquare` for letters that do not exist in that zone, and for a square that does
 * not touch the zone and band it names: such a reference has a wrong letter.
 */
export function placeOfSquare(square: GridSquare): Result<GridPlace, GridProblem> {
  const edges = edgesOf(square.zone, square.band)
  const corner = edges === null ? null : cornerOf(square)
  if (edges === null || corner === null) return fail({ kind: 'noSuchSquare' })
  const sizeMetres = 100_000 / 10 ** square.easting.length
  const at = (east: number, north: number): Point =>
    pointAt({
      ...corner,
      eastingMetres: corner.eastingMetres + east * sizeMetres,
      northingMetres: corner.northingMetres + north * sizeMetres,
    })
  const corners = [at(0, 0), at(1, 0), at(0, 1), at(1, 1)].map((one) => besides(one, edges))
  const inside = corners.map((one) => liesIn(one, edges))
  if (!touches(corners, edges)) return fail({ kind: 'noSuchSquare' })
  return ok({ corner: at(0, 0), centre: at(0.5, 0.5), sizeMetres, cut: inside.includes(false) })
}

/** A tenth of a millimetre. */
const HAIR_DEGREES = 1e-9
/** A metre and a half: UTM cut off to whole metres may lie that far beyond the edge it came from. */
export const EDGE_DEGREES = 1.5e-5

const BANDS = 'CDEFGHJKLMNPQRSTUVWX'
const bandOf = (latitude: number): string =>
  BANDS[Math.min(19, Math.floor((latitude + 80) / 8))] ?? 'X'

/** Edges of a zone within a band, in degrees, or null where that zone has none (32X, 34X and 36X). */
type Edges = { west: number; east: number; south: number; north: number }

function edgesOf(zone: number, band: string): Edges | null {
  const index = band.length === 1 ? BANDS.indexOf(band) : -1
  if (index < 0 || !Number.isInteger(zone) || zone < 1 || zone > 60) return null
  const south = 8 * index - 80
  const north = band === 'X' ? 84 : south + 8
  const west = 6 * zone - 186
  const [from, to] = EXCEPTIONS[`${zone}${band}`] ?? [west, west + 6]
  return from === to ? null : { west: from, east: to, south, north }
}

/** West and east of the zones that the grid widens, narrows or leaves out (coast of band V, islands of band X). */
const EXCEPTIONS: Readonly<Record<string, readonly [number, number]>> = {
  '31V': [0, 3],
  '32V': [3, 12],
  '31X': [0, 9],
  '32X': [9, 9],
  '33X': [9, 21],
  '34X': [21, 21],
  '35X': [21, 33],
  '36X': [33, 33],
  '37X': [33, 42],
}

const liesIn = ({ latitude, longitude }: Point, { west, east, south, north }: Edges): boolean =>
  latitude >= south - HAIR_DEGREES &&
  latitude <= north + HAIR_DEGREES &&
  longitude >= west - HAIR_DEGREES &&
  longitude <= east + HAIR_DEGREES

/** The point with its longitude counted on from the zone's own, past 180 where a square lies over the date line. */
const besides = ({ latitude, longitude }: Point, { west, east }: Edges): Point => {
  const middle = (west + east) / 2
  return { latitude, longitude: middle + ((((longitude - middle + 180) % 360) + 360) % 360) - 180 }
}

/** Whether the square that these corners stand for has ground in common with the zone and band, not an edge alone. */
function touches(corners: readonly Point[], { west, east, south, north }: Edges): boolean {
  const latitudes = corners.map((c) => c.latitude)
  const longitudes = corners.map((c) => c.longitude)
  return (
    Math.max(...latitudes) > south + HAIR_DEGREES &&
    Math.min(...latitudes) < north - HAIR_DEGREES &&
    Math.max(...longitudes) > west + HAIR_DEGREES &&
    Math.min(...longitudes) < east - HAIR_DEGREES
  )
}

type Corner = Omit<Utm, 'band'>

/** South-west corner: the row letters come again every 2,000 km, so the band says which of them is meant. */
function cornerOf({ zone, band, column, row, easting, northing }: GridSquare): Corner | null {
  const digits = /^\d{0,5}$/
  const { columns, rows } = lettersOf(zone)
  const [col, line] = [columns.indexOf(column), rows.indexOf(row)]
  if (column.length !== 1 || row.length !== 1 || col < 0 || line < 0) return null
  if (easting.length !== northing.length || !digits.test(easting) || !digits.test(northing))
    return null
  const metres = (text: string): number => Number(text.padEnd(5, '0'))
  const south = 8 * BANDS.indexOf(band) - 80
  // South of the equator a band reaches lowest at the zone's edge, north of it in its middle.
  const lowest = new LatLon(south, south < 0 ? 0 : 3).toUtm().northing
  const bottom = Math.floor(lowest / 100_000) * 100_000
  let start = 100_000 * line
  while (start < bottom) start += 2_000_000
  return {
    zone,
    hemisphere: band >= 'N' ? 'N' : 'S',
    eastingMetres: 100_000 * (col + 1) + metres(easting),
    northingMetres: start + metres(northing),
  }
}

/** Letters of the 100 km squares in a zone, from 100 km east and from the equator or 2,000 km steps on. */
function lettersOf(zone: number): { columns: string; rows: string } {
  const columns = ['ABCDEFGH', 'JKLMNPQR', 'STUVWXYZ'][(zone - 1) % 3] ?? ''
  const rows = 'ABCDEFGHJKLMNPQRSTUV'
  return { columns, rows: zone % 2 === 1 ? rows : rows.slice(5) + rows.slice(0, 5) }
}

/**
 * The library's point. A corner of a square may lie past the northings that its constructor takes (beyond 80 S,
 * 84 N or the equator), where the projection itself still holds, so the northing is set afterwards.
 */
function pointAt({ zone, hemisphere, eastingMetres, northingMetres }: Corner): Point {
  const utm = new LibraryUtm(zone, hemisphere, eastingMetres, 5_000_000)
  utm.northing = northingMetres
  const { lat, lon } = utm.toLatLon()
  return { latitude: lat, longitude: lon }
}
