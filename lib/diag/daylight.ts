/**
 * Sunrise, sunset and civil twilight of one local day. suncalc finds the moments; this file is the only one
 * that may import it or hold a Date. Standard zeniths: 90.833 degrees for rise and set, 96 for civil twilight.
 */
import { getPosition, getTimes } from 'suncalc'

/** Instants in milliseconds UTC; null when the moment does not come that day, with `never` saying why. */
export type SunTimes = {
  sunrise: number | null
  sunset: number | null
  civilDawn: number | null
  civilDusk: number | null
  /** `rises`: below the horizon all day. `sets`: above it all day. `darkens`: civil twilight all night. */
  never: 'rises' | 'sets' | 'darkens' | null
}

/**
 * The sun's day at a place: degrees north and east, and any instant (ms) of the local day wanted. The day is
 * the solar one around that instant's local noon, so sunset follows sunrise also where UTC's date differs.
 */
export function sunTimes(lat: number, lon: number, dayMs: number): SunTimes {
  const times = getTimes(new Date(dayMs), lat, lon)
  const at = (d: Date | null): number | null =>
    d === null || Number.isNaN(d.getTime()) ? null : d.getTime()
  const sun = {
    sunrise: at(times.sunrise),
    sunset: at(times.sunset),
    civilDawn: at(times.dawn),
    civilDusk: at(times.dusk),
  }
  return { ...sun, never: never(sun, times.alwaysUp === true) }
}

/** Apparent height of the sun over the horizon in degrees, refraction included, at an instant (ms). */
export const sunHeight = (lat: number, lon: number, atMs: number): number =>
  getPosition(new Date(atMs), lat, lon).altitude

/** Kept between leaving and civil dusk when nothing else is said (rule R6; common practice, no source). */
export const LEAVE_BY_MARGIN_MINUTES = 30

/** Minutes left to work: leave-by minus now, leave-by = civil dusk - ride-out - margin (rule R6). Null without dusk. */
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

function never(sun: Omit<SunTimes, 'never'>, alwaysUp: boolean): SunTimes['never'] {
  if (sun.sunrise === null || sun.sunset === null) return alwaysUp ? 'sets' : 'rises'
  return sun.civilDusk === null ? 'darkens' : null
}
