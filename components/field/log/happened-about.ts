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
  const shown = wallMinutes(nowMs, zone)
  const backMinutes = (shown - wanted + DAY_MINUTES) % DAY_MINUTES
  const wholeMinute = nowMs - (nowMs % MINUTE_MS)
  const at = wholeMinute - backMinutes * MINUTE_MS
  // Across a change of the clocks the difference is put right once.
  const off = wanted - wallMinutes(at, zone)
  const mended = Math.abs(off) <= 120 ? at + off * MINUTE_MS : at
  return new Date(mended).toISOString()
}

function wallMinutes(ms: number, zone: string): number {
  const parts = new Intl.DateTimeFormat('en-GB', {
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZone: zone,
  }).formatToParts(new Date(ms))
  const of = (type: string) => Number(parts.find((p) => p.type === type)?.value ?? 0)
  return of('hour') * 60 + of('minute')
}
