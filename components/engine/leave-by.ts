import type { Instant } from '@/lib/model/time'
import { clockTime, dayOf } from '../field/times'

const MINUTE_MS = 60_000
const DAY_MINUTES = 1440

/** The next time the clock of a zone shows `HH:MM`: this minute still counts, what is past is tomorrow's. */
export function nextTime(clock: string, zone: string, nowMs: number): Instant {
  const ahead = (minutesUntil(clock, zone, nowMs) + DAY_MINUTES) % DAY_MINUTES
  const at = nowMs - (nowMs % MINUTE_MS) + ahead * MINUTE_MS
  // Across a change of the clocks the difference is put right once.
  const off = minutesUntil(clock, zone, at)
  const least = ((off + DAY_MINUTES * 1.5) % DAY_MINUTES) - DAY_MINUTES / 2
  return new Date(at + least * MINUTE_MS).toISOString()
}

/** Whole minutes to an instant; negative once it is past, so that work is listed with what it is over (R6). */
export const minutesTo = (at: Instant, nowMs: number): number =>
  Math.floor((Date.parse(at) - nowMs) / MINUTE_MS)

/** `16:33`, with its day when that is not today. */
export function leaveByWords(at: Instant, zone: string, nowMs: number): string {
  const today = dayOf(new Date(nowMs).toISOString(), zone)
  const day = dayOf(at, zone)
  return day === today ? clockTime(at, zone) : `${clockTime(at, zone)}, ${day}`
}

/** Whole minutes from now until a `HH:MM` of today in a zone; negative once it is past. */
export function minutesUntil(clockTime: string, zone: string, nowMs: number): number {
  const [hour = 0, minute = 0] = clockTime.split(':').map(Number)
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
  }).formatToParts(nowMs)
  const of = (type: 'hour' | 'minute') =>
    Number(parts.find((part) => part.type === type)?.value ?? 0)
  return hour * 60 + minute - (of('hour') * 60 + of('minute'))
}
