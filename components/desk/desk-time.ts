/** Times as the desk shows them: in the zone of the shop or the job, never in the browser's. */
const formats = new Map<string, Intl.DateTimeFormat>()

function format(zone: string, kind: 'time' | 'date'): Intl.DateTimeFormat {
  const key = `${zone} ${kind}`
  const known = formats.get(key)
  if (known) return known
  const made =
    kind === 'time'
      ? new Intl.DateTimeFormat('en-GB', {
          timeZone: zone,
          hour: '2-digit',
          minute: '2-digit',
          hourCycle: 'h23',
        })
      : new Intl.DateTimeFormat('en-GB', { timeZone: zone, day: 'numeric', month: 'short' })
  formats.set(key, made)
  return made
}

/** `14:22` in the zone. `at` is an instant as text or ms since 1970. */
export const clockTime = (at: string | number, zone: string) =>
  format(zone, 'time').format(new Date(at))

/** `24 Nov` in the zone. */
export const dayName = (at: string | number, zone: string) =>
  format(zone, 'date').format(new Date(at))

/** `14:22` today, else `24 Nov 14:22`. `now` null (not known yet): always with the day. */
export function whenWords(at: string | number, zone: string, now: number | null): string {
  const time = clockTime(at, zone)
  const day = dayName(at, zone)
  return now !== null && dayName(now, zone) === day ? time : `${day} ${time}`
}

const MINUTE = 60_000

/** How long ago: `just now`, `12 min`, `3 h 05`, `2 days`. Times ahead of `now` read `just now`. */
export function ageWords(at: string | number, now: number): string {
  const minutes = Math.floor((now - new Date(at).getTime()) / MINUTE)
  if (minutes < 1) return 'just now'
  if (minutes < 60) return `${minutes} min`
  if (minutes < 48 * 60)
    return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, '0')}`
  return `${Math.floor(minutes / (24 * 60))} days`
}

/** Hours and minutes of a span, `2:46`. */
export function spanWords(ms: number): string {
  const minutes = Math.max(0, Math.floor(ms / MINUTE))
  return `${Math.floor(minutes / 60)}:${String(minutes % 60).padStart(2, '0')}`
}
