import { sunHeight } from '@/lib/diag/daylight'
import { lightAt, nightsAround, type Span } from '@/lib/diag/light'
import type { Place } from '@/lib/model/place'

const HOUR_MS = 3_600_000
const DAY_MS = 24 * HOUR_MS
const STEP_MS = 10 * 60_000

type At = Pick<Place, 'latitude' | 'longitude'>

/** What the daylight rule draws: all instants in ms since 1970, heights in degrees. */
export type DayWindow = Span & {
  /** Civil dusk to civil dawn, and the twilights on both sides of it. */
  nights: Span[]
  twilights: Span[]
  curve: { at: number; height: number }[]
}

/** The stretch of time to draw: from two hours back to past the next dusk or dawn, 7.5 to 24 hours. */
export function dayWindow(at: At, now: number): DayWindow {
  const light = lightAt(at, now)
  const from = Math.floor((now - 2 * HOUR_MS) / (HOUR_MS / 2)) * (HOUR_MS / 2)
  const turn = light.kind === 'never' ? now : now + light.untilMs
  const to = Math.min(from + DAY_MS, Math.max(from + 7.5 * HOUR_MS, turn + 2.4 * HOUR_MS))
  const inside = ({ from: a, to: b }: Span) => b > from && a < to
  const cut = (span: Span) => ({ from: Math.max(from, span.from), to: Math.min(to, span.to) })
  const { nights, twilights } = nightsAround(at, now)
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
