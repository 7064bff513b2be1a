/** Times as the desk shows them: in the zone of the shop, never in the browser's. */
const days = new Map<string, Intl.DateTimeFormat>()

/** `24 Nov` in the zone. `at`: an instant as text, or ms since 1970. */
export function dayName(at: string | number, zone: string): string {
  const known = days.get(zone)
  const made =
    known ?? new Intl.DateTimeFormat('en-GB', { timeZone: zone, day: 'numeric', month: 'short' })
  if (!known) days.set(zone, made)
  return made.format(new Date(at))
}

/** Hours and minutes of a length of time, `2:46`; never negative. */
export function hoursAndMinutes(ms: number): string {
  const minutes = Math.max(0, Math.floor(ms / 60_000))
  return `${Math.floor(minutes / 60)}:${String(minutes % 60).padStart(2, '0')}`
}
