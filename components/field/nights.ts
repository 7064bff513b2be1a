import { sunTimes } from '@/lib/diag/daylight'

/** From civil dusk to civil dawn, in milliseconds since 1970. */
export type Night = [from: number, to: number]

const DAY_MS = 86_400_000

/** Nights at a place around an instant. A day whose sun never reaches civil dawn is one whole night. */
export function nightsAt(latitude: number, longitude: number, nowMs: number): Night[] {
  const days = [-1, 0, 1, 2].map((n) => {
    const dayMs = nowMs + n * DAY_MS
    return { dayMs, sun: sunTimes(latitude, longitude, dayMs) }
  })
  const nights: Night[] = []
  for (const [i, { dayMs, sun }] of days.entries()) {
    const next = days[i + 1]
    if (sun.never === 'rises' && sun.civilDawn === null) {
      nights.push([dayMs - DAY_MS / 2, dayMs + DAY_MS / 2])
    } else if (sun.civilDusk !== null && next) {
      nights.push([sun.civilDusk, next.sun.civilDawn ?? next.dayMs])
    }
  }
  return nights
}
