import type { Instant } from '@/lib/model/time'

const MINUTE_MS = 60_000
const DAY_MINUTES = 1440

/**
 * The latest instant not after `now` whose wall clock in the zone shows the typed time ("11:30", "1130",
 * "9:05"). Empty text answers now; null when it is no time of day. A time later than now is yesterday's.
 */
export function happenedAbout(text: string, now: Instant, zone: string): Instant | null {
  const plain = text.trim()
  if (plain === '') {
    return now
  }
  const [, hours = '', minutes = ''] = /^(\d{1,2})[:.h ]?(\d{2})$/.exec(plain) ?? []
  if (hours === '' || Number(hours) > 23 || Number(minutes) > 59) {
    return null
  }
  const wanted = Number(hours) * 60 + Number(minutes)
  const nowMs = Date.parse(now)
  const clock = wallClock(zone)
  const backMinutes = (clock(nowMs) - wanted + DAY_MINUTES) % DAY_MINUTES
  const at = nowMs - (nowMs % MINUTE_MS) - backMinutes * MINUTE_MS
  const fits = candidates(at).find((ms) => ms <= nowMs && clock(ms) === wanted)
  return new Date(fits ?? at).toISOString()
}

/** Around an instant, the latest first: a day and two hours to either side, by which a clock may change. */
function candidates(at: number): number[] {
  const shifts = [-120, -90, -60, -30, 0, 30, 60, 90, 120]
  const minutes = [-DAY_MINUTES, 0, DAY_MINUTES].flatMap((day) => shifts.map((by) => day + by))
  return minutes.map((by) => at + by * MINUTE_MS).sort((a, b) => b - a)
}

/** Minutes since midnight on the wall clock of a zone, at ms since 1970. */
function wallClock(zone: string): (ms: number) => number {
  const format = new Intl.DateTimeFormat('en-GB', {
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZone: zone,
  })
  return (ms) => {
    const parts = format.formatToParts(new Date(ms))
    const of = (type: string) => Number(parts.find((p) => p.type === type)?.value ?? 0)
    return of('hour') * 60 + of('minute')
  }
}
