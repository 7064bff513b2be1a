import type { Instant } from '@/lib/model/time'
import { minutesUntil } from '../engine/leave-by'

const DAY_MINUTES = 24 * 60

/**
 * The instant of a `HH:MM` typed for "about": the last time that clock time was, up to a day ago, in
 * the given zone. Null when it is not a time.
 */
export function aboutInstant(clockTime: string, zone: string, now: Instant): Instant | null {
  if (!/^([01]\d|2[0-3]):[0-5]\d$/.test(clockTime)) return null
  const nowMs = Date.parse(now)
  const ahead = minutesUntil(clockTime, zone, nowMs)
  const back = ahead > 0 ? ahead - DAY_MINUTES : ahead
  const minute = Math.floor(nowMs / 60_000) + back
  return new Date(back === 0 ? nowMs : minute * 60_000).toISOString()
}
