import type { Instant } from '@/lib/model/time'
import { clockTime, dayOf } from './times'

/** "24 Nov" of a day as `dayOf` names it; with its year unless that is the year of `today`. */
function shortDay(named: string, today: string | null): string {
  const [, day = '', month = '', year = ''] = named.split(' ')
  return today === null || today.endsWith(` ${year}`)
    ? `${day} ${month}`
    : `${day} ${month} ${year}`
}

/**
 * "14:22" on the day of `now` (ms), else with its day: "24 Nov 14:22", and with its year in another one. A
 * time without its day is only ever read as today's. Beside another time `now` is that other one; null is
 * not known yet, and then the day is always named.
 */
export function whenWords(at: Instant, zone: string, now: number | null): string {
  const time = clockTime(at, zone)
  const day = dayOf(at, zone)
  const today = now === null ? null : dayOf(new Date(now).toISOString(), zone)
  return day === today ? time : `${shortDay(day, today)} ${time}`
}
