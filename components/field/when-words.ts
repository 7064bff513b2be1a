import type { Instant } from '@/lib/model/time'
import { clockTime, dayOf } from './times'

/** "24 Nov 2026" less what goes without saying: "24 Nov" in the year of `now`. */
function shortDay(at: Instant, zone: string, now: number): string {
  const [, day = '', month = '', year = ''] = dayOf(at, zone).split(' ')
  const isThisYear = dayOf(new Date(now).toISOString(), zone).endsWith(` ${year}`)
  return isThisYear ? `${day} ${month}` : `${day} ${month} ${year}`
}

/**
 * "14:22" on the day of `now` (ms), else with its day: "24 Nov 14:22". A time without its day is only ever
 * read as today's. Beside another time `now` is that other one.
 */
export function whenWords(at: Instant, zone: string, now: number): string {
  const time = clockTime(at, zone)
  const isSameDay = dayOf(new Date(now).toISOString(), zone) === dayOf(at, zone)
  return isSameDay ? time : `${shortDay(at, zone, now)} ${time}`
}
