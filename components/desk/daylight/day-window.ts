import { sunHeight, sunTimes } from '@/lib/diag/daylight'
import type { Place } from '@/lib/model/place'

const HOUR_MS = 3_600_000
const DAY_MS = 24 * HOUR_MS
const STEP_MS = 10 * 60_000

type At = Pick<Place, 'latitude' | 'longitude'>
export type Span = { from: number; to: number }

/** What the daylight rule draws: all instants in ms since 1970, heights in degrees. */
export type DayWindow = Span & {
  /** Civil dusk to civil dawn, and the twilights on both sides of it. */
  nights: Span[]
  twilights: Span[]
  curve: { at: number; height: number }[]
}

/** What the big figure says at an instant. */
export type Light =
  | { kind: 'light'; untilMs: number; dusk: number; sunset: number | null }
  | { kind: 'dark'; untilMs: number; dawn: number }
  | { kind: 'never'; which: 'rises' | 'sets' | 'darkens' }

const days = ({ latitude, longitude }: At, now: number) =>
  [-1, 0, 1, 2].map((n) => sunTimes(latitude, longitude, now + n * DAY_MS))

/** Whether it is light at the place, until when, and how long that is. */
export function lightAt(at: At, now: number): Light {
  const { nights } = spans(days(at, now))
  const night = nights.find(({ from, to }) => now >= from && now < to)
  if (night) return { kind: 'dark', untilMs: night.to - now, dawn: night.to }
  const next = nights.find(({ from }) => from > now)
  const today = sunTimes(at.latitude, at.longitude, now)
  if (!next || next.from - now > DAY_MS) return { kind: 'never', which: today.never ?? 'darkens' }
  const sunset = days(at, now)
    .map((day) => day.sunset)
    .find((time) => time !== null && time > now && time <= next.from)
  return { kind: 'light', untilMs: next.from - now, dusk: next.from, sunset: sunset ?? null }
}

/** True between civil dusk and civil dawn at the place. */
export const isDark = (at: At, now: number): boolean => {
  const light = lightAt(at, now)
  return light.kind === 'dark' || (light.kind === 'never' && light.which === 'rises')
}

/** The stretch of time to draw: from two hours back to past the next dusk or dawn, 7.5 to 24 hours. */
export function dayWindow(at: At, now: number): DayWindow {
  const light = lightAt(at, now)
  const from = Math.floor((now - 2 * HOUR_MS) / (HOUR_MS / 2)) * (HOUR_MS / 2)
  const turn = light.kind === 'never' ? now : now + light.untilMs
  const to = Math.min(from + DAY_MS, Math.max(from + 7.5 * HOUR_MS, turn + 2.4 * HOUR_MS))
  const inside = ({ from: a, to: b }: Span) => b > from && a < to
  const cut = (span: Span) => ({ from: Math.max(from, span.from), to: Math.min(to, span.to) })
  const { nights, twilights } = spans(days(at, now))
  const curve: DayWindow['curve'] = []
  for (let t = from; t <= to; t += STEP_MS) {
    curve.push({ at: t, height: sunHeight(at.latitude, at.longitude, t) })
  }
  return {
    from,
    to,
    nights: nights.filter(inside).map(cut),
    twilights: twilights.filter(inside).map(cut),
    curve,
  }
}

/** Nights and twilights of some days in a row; days without a dusk or dawn give none. */
function spans(suns: ReturnType<typeof days>): { nights: Span[]; twilights: Span[] } {
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
