/**
 * Light at a place (rule R6): light until civil dusk, dark until civil dawn. Nights are made of the sun's days
 * around an instant, so that the dark before midnight and after it is one night. Instants in ms UTC.
 */
import type { Place } from '@/lib/model/place'
import { type SunTimes, sunTimes } from './daylight'

const DAY_MS = 24 * 3_600_000

type At = Pick<Place, 'latitude' | 'longitude'>
/** A stretch of time, instants in ms UTC. */
export type Span = { from: number; to: number }

/** Whether it is light, until when (ms from now and instant), or which of the two never comes that day. */
export type Light =
  | { kind: 'light'; untilMs: number; dusk: number; sunset: number | null }
  | { kind: 'dark'; untilMs: number; dawn: number }
  | { kind: 'never'; which: 'rises' | 'sets' | 'darkens' }

/**
 * The light at a place (degrees north and east) at an instant. `never` when no dusk comes within a day, or no dawn
 * within two; of a sun that stays between horizon and civil dusk all day it says that it does not rise.
 */
export function lightAt(at: At, now: number): Light {
  const suns = daysAround(at, now)
  const { nights } = nightsOf(suns)
  const night = nights.find((one) => holds(one, now))
  if (night !== undefined)
    return night.to === Number.POSITIVE_INFINITY
      ? { kind: 'never', which: 'rises' }
      : { kind: 'dark', untilMs: night.to - now, dawn: night.to }
  const next = nights.find(({ from }) => from > now)
  const today = sunTimes(at.latitude, at.longitude, now)
  if (!next || next.from - now > DAY_MS) return { kind: 'never', which: today.never ?? 'darkens' }
  const sunset = suns
    .map((day) => day.sunset)
    .find((time) => time !== null && time > now && time <= next.from)
  return { kind: 'light', untilMs: next.from - now, dusk: next.from, sunset: sunset ?? null }
}

/** True between civil dusk and civil dawn at the place: the sun stands more than 6 degrees under the horizon. */
export const isDark = (at: At, now: number): boolean =>
  nightsOf(daysAround(at, now)).nights.some((one) => holds(one, now))

/**
 * The nights (civil dusk to civil dawn) and the twilights beside them, from the day before to two days on. A night
 * without an end in that time is told a day long, and one without either not at all.
 */
export function nightsAround(at: At, now: number): { nights: Span[]; twilights: Span[] } {
  const { nights, twilights } = nightsOf(daysAround(at, now))
  const told = nights
    .map(({ from, to }) => ({ from: Math.max(from, to - DAY_MS), to: Math.min(to, from + DAY_MS) }))
    .filter(({ from, to }) => Number.isFinite(from) && Number.isFinite(to))
  return { nights: told, twilights }
}

const holds = ({ from, to }: Span, now: number): boolean => now >= from && now < to

const daysAround = ({ latitude, longitude }: At, now: number) =>
  [-1, 0, 1, 2].map((n) => sunTimes(latitude, longitude, now + n * DAY_MS))

/**
 * Nights go on through days that stay dark; one that began before these days, or ends after them, is infinite there.
 * A day without dusk that is not dark gives no night.
 */
function nightsOf(suns: readonly SunTimes[]): { nights: Span[]; twilights: Span[] } {
  const nights: Span[] = []
  const twilights: Span[] = []
  let dusk = suns[0]?.darkAllDay ? Number.NEGATIVE_INFINITY : null
  for (const sun of suns) {
    if (sun.sunset !== null && sun.civilDusk !== null) {
      twilights.push({ from: sun.sunset, to: sun.civilDusk })
    }
    if (sun.civilDawn !== null && sun.sunrise !== null) {
      twilights.push({ from: sun.civilDawn, to: sun.sunrise })
    }
    if (sun.darkAllDay) continue
    if (dusk !== null && sun.civilDawn !== null) nights.push({ from: dusk, to: sun.civilDawn })
    dusk = sun.civilDusk
  }
  if (dusk !== null && suns.at(-1)?.darkAllDay)
    nights.push({ from: dusk, to: Number.POSITIVE_INFINITY })
  return { nights, twilights }
}
