/**
 * Light at a place (rule R6): light until civil dusk, dark until civil dawn. Nights are made of the sun's days
 * around an instant, so that the dark before midnight and after it is one night. Instants in ms UTC.
 */
import type { Place } from '@/lib/model/place'
import { sunTimes } from './daylight'

const DAY_MS = 24 * 3_600_000

type At = Pick<Place, 'latitude' | 'longitude'>
/** A stretch of time, instants in ms UTC. */
export type Span = { from: number; to: number }

/** Whether it is light, until when (ms from now and instant), or which of the two never comes that day. */
export type Light =
  | { kind: 'light'; untilMs: number; dusk: number; sunset: number | null }
  | { kind: 'dark'; untilMs: number; dawn: number }
  | { kind: 'never'; which: 'rises' | 'sets' | 'darkens' }

/** The light at a place (degrees north and east) at an instant. `never` when no dusk comes within a day. */
export function lightAt(at: At, now: number): Light {
  const suns = daysAround(at, now)
  const { nights } = nightsOf(suns)
  const night = nights.find(({ from, to }) => now >= from && now < to)
  if (night) return { kind: 'dark', untilMs: night.to - now, dawn: night.to }
  const next = nights.find(({ from }) => from > now)
  const today = sunTimes(at.latitude, at.longitude, now)
  if (!next || next.from - now > DAY_MS) return { kind: 'never', which: today.never ?? 'darkens' }
  const sunset = suns
    .map((day) => day.sunset)
    .find((time) => time !== null && time > now && time <= next.from)
  return { kind: 'light', untilMs: next.from - now, dusk: next.from, sunset: sunset ?? null }
}

/** True between civil dusk and civil dawn at the place, and where the sun does not rise at all that day. */
export function isDark(at: At, now: number): boolean {
  const light = lightAt(at, now)
  return light.kind === 'dark' || (light.kind === 'never' && light.which === 'rises')
}

/** The nights (civil dusk to civil dawn) and the twilights beside them, from the day before to two days on. */
export const nightsAround = (at: At, now: number): { nights: Span[]; twilights: Span[] } =>
  nightsOf(daysAround(at, now))

const daysAround = ({ latitude, longitude }: At, now: number) =>
  [-1, 0, 1, 2].map((n) => sunTimes(latitude, longitude, now + n * DAY_MS))

/** Days without a dusk or dawn give no night. */
function nightsOf(suns: ReturnType<typeof daysAround>): { nights: Span[]; twilights: Span[] } {
  const nights: Span[] = []
  const twilights: Span[] = []
  for (const [i, sun] of suns.entries()) {
    if (sun.sunset !== null && sun.civilDusk !== null) {
      twilights.push({ from: sun.sunset, to: sun.civilDusk })
    }
    if (sun.civilDawn !== null && sun.sunrise !== null) {
      twilights.push({ from: sun.civilDawn, to: sun.sunrise })
    }
    const dawn = suns[i + 1]?.civilDawn ?? null
    if (sun.civilDusk !== null && dawn !== null) nights.push({ from: sun.civilDusk, to: dawn })
  }
  return { nights, twilights }
}
