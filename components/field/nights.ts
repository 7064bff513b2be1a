import { isDark, nightsAround } from '@/lib/diag/light'

/** From civil dusk to civil dawn, in milliseconds since 1970. */
export type Night = [from: number, to: number]

const HALF_DAY_MS = 43_200_000

/**
 * Nights at a place around an instant, by the same rule as the daylight of the job (lib/diag/light): theme and
 * daylight never disagree. Where it is dark with neither dusk nor dawn, half a day to either side is one night.
 */
export function nightsAt(latitude: number, longitude: number, nowMs: number): Night[] {
  const at = { latitude, longitude }
  const nights = nightsAround(at, nowMs).nights.map(({ from, to }): Night => [from, to])
  const isKnown = nights.some(([from, to]) => nowMs >= from && nowMs < to)
  return isKnown || !isDark(at, nowMs)
    ? nights
    : [...nights, [nowMs - HALF_DAY_MS, nowMs + HALF_DAY_MS]]
}
