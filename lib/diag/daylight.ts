/**
 * Sunrise, sunset and the twilights of one local day. suncalc finds the moments; this file is the only one that may
 * import it or hold a Date. Standard zeniths: 90.833 degrees for rise and set, 96, 102 and 108 for civil, nautical
 * and astronomical twilight.
 */
import { getPosition, getTimes } from 'suncalc'
import { AppError } from '@/lib/model/result'

/** Instants in milliseconds UTC; null when the moment does not come that day, with `never` saying why. */
export type SunTimes = {
  /** When the sun stands highest. */
  noon: number
  sunrise: number | null
  sunset: number | null
  civilDawn: number | null
  civilDusk: number | null
  /** `rises`: below the horizon all day. `sets`: above it all day. `darkens`: civil twilight all night. */
  never: 'rises' | 'sets' | 'darkens' | null
  /** True when it is dark all day: not even at noon does civil twilight come. */
  darkAllDay: boolean
}

/**
 * The sun's day at a place: degrees north (-90 to 90) and east, and any instant (ms) of the local day wanted. The
 * day is the solar one around that instant's local noon, so sunset follows sunrise also where UTC's date differs.
 * A place or instant that is none was never parsed as one: AppError.
 */
export function sunTimes(lat: number, lon: number, dayMs: number): SunTimes {
  mustBePlaceAndTime(lat, lon, dayMs)
  const times = getTimes(new Date(dayMs), lat, lon)
  const noon = times.solarNoon.getTime()
  const sun = {
    noon,
    sunrise: momentOf(times.sunrise),
    sunset: momentOf(times.sunset),
    civilDawn: momentOf(times.dawn),
    civilDusk: momentOf(times.dusk),
  }
  const darkAllDay = sun.civilDusk === null && sunHeight(lat, lon, noon) < CIVIL_HEIGHT
  return { ...sun, never: never(sun, times.alwaysUp === true), darkAllDay }
}

/** When a twilight begins in the morning and ends in the evening, ms UTC; null where it does not that day. */
export type Twilight = { dawn: number | null; dusk: number | null }

/**
 * The three twilights of the same day as sunTimes: the sun 6, 12 and 18 degrees under the horizon. The later ones say
 * how long shapes (civil), the horizon (nautical) and a last glow (astronomical) are to be seen. Degrees north and
 * east, ms UTC; a place or instant that is none: AppError.
 */
export function twilights(
  lat: number,
  lon: number,
  dayMs: number,
): Record<'civil' | 'nautical' | 'astronomical', Twilight> {
  mustBePlaceAndTime(lat, lon, dayMs)
  const times = getTimes(new Date(dayMs), lat, lon)
  return {
    civil: { dawn: momentOf(times.dawn), dusk: momentOf(times.dusk) },
    nautical: { dawn: momentOf(times.nauticalDawn), dusk: momentOf(times.nauticalDusk) },
    astronomical: { dawn: momentOf(times.nightEnd), dusk: momentOf(times.night) },
  }
}

const momentOf = (d: Date | null): number | null =>
  d === null || Number.isNaN(d.getTime()) ? null : d.getTime()

/**
 * Apparent height of the sun over the horizon in degrees, -90 to 90, refraction included, at an instant (ms).
 * Below the horizon the refraction stays that of the horizon, 0.48 degrees.
 */
export function sunHeight(lat: number, lon: number, atMs: number): number {
  mustBePlaceAndTime(lat, lon, atMs)
  return getPosition(new Date(atMs), lat, lon).altitude
}

/** Where the sun stands, in degrees from north by east, 0 to 360, at an instant (ms). */
export function sunBearing(lat: number, lon: number, atMs: number): number {
  mustBePlaceAndTime(lat, lon, atMs)
  return getPosition(new Date(atMs), lat, lon).azimuth
}

/** Apparent height at civil dusk: zenith 96 degrees without refraction, of which the library adds 0.4841. */
const CIVIL_HEIGHT = -6 + 0.4841

/** Instants that a Date can hold. */
const MOST_MS = 8.64e15 - 864e5

function mustBePlaceAndTime(lat: number, lon: number, atMs: number): void {
  if (Math.abs(lat) <= 90 && Number.isFinite(lon) && Math.abs(atMs) <= MOST_MS) return
  throw new AppError('notAPoint', { context: { lat, lon, atMs } })
}

/** Kept between leaving and civil dusk when nothing else is said (rule R6; common practice, no source). */
export const LEAVE_BY_MARGIN_MINUTES = 30

/**
 * Minutes left to work: leave-by minus now, leave-by = civil dusk - ride-out - margin (rule R6); negative once it is
 * past, null without a dusk. Instants in ms UTC, minutes from 0.
 */
export function minutesToLeaveBy(at: {
  nowMs: number
  civilDuskMs: number | null
  rideOutMinutes: number
  marginMinutes?: number
}): number | null {
  if (at.civilDuskMs === null) return null
  const margin = at.marginMinutes ?? LEAVE_BY_MARGIN_MINUTES
  return (at.civilDuskMs - at.nowMs) / 60_000 - at.rideOutMinutes - margin
}

function never(sun: Omit<SunTimes, 'never' | 'darkAllDay'>, alwaysUp: boolean): SunTimes['never'] {
  if (sun.sunrise === null || sun.sunset === null) return alwaysUp ? 'sets' : 'rises'
  return sun.civilDusk === null ? 'darkens' : null
}
