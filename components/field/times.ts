import type { Instant } from '@/lib/model/time'

/** How times are shown: in the zone they were lived in, 24 hours. */
const formats = new Map<string, Intl.DateTimeFormat>()

function format(zone: string, parts: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `${zone} ${Object.keys(parts).join()}`
  const known = formats.get(key)
  if (known) {
    return known
  }
  const made = new Intl.DateTimeFormat('en-GB', { ...parts, timeZone: zone, hourCycle: 'h23' })
  formats.set(key, made)
  return made
}

/** "14:02" in the zone. */
export const clockTime = (at: Instant, zone: string): string =>
  format(zone, { hour: '2-digit', minute: '2-digit' }).format(new Date(at))

/** "Tue 24 Nov 2026" in the zone. */
export const dayOf = (at: Instant, zone: string): string =>
  format(zone, { weekday: 'short', day: 'numeric', month: 'short', year: 'numeric' })
    .format(new Date(at))
    .replace(',', '')

/** A length of time in words: "under 1 min", "12 min", "1 h 05", "3 days". Negative counts as nothing. */
export function span(ms: number): string {
  const minutes = Math.floor(ms / 60_000)
  if (minutes < 1) {
    return 'under 1 min'
  }
  if (minutes < 60) {
    return `${minutes} min`
  }
  const hours = Math.floor(minutes / 60)
  return hours < 48
    ? `${hours} h ${String(minutes % 60).padStart(2, '0')}`
    : `${Math.floor(hours / 24)} days`
}

/** Bytes for people: "1 kB", "1.9 MB"; never less than 1 kB. */
export function size(bytes: number): string {
  return bytes < 100_000
    ? `${Math.max(1, Math.round(bytes / 1000))} kB`
    : `${(bytes / 1_000_000).toFixed(1)} MB`
}

/** How long a voice note is: "22 s", never less than 1 s. */
export const seconds = (of: number): string => `${Math.max(1, Math.round(of))} s`
