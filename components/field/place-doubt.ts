/**
 * Doubts about a typed position, judged against a place that is surely near (the last fix or the last
 * job): the same digits with the other hemisphere, in the other order, or with the decimals read as
 * minutes, when that lies far nearer. A doubt is shown, never applied by itself.
 */
import type { TypedPlace } from './place-text'

export type Point = { latitude: number; longitude: number }
export type Doubt = {
  kind: 'otherHalf' | 'swapped' | 'readAsMinutes' | 'far' | 'noLetters'
  /** The position meant instead; null when only a look is asked for. */
  meant: Point | null
  km: number | null
}

/** Mean radius of the earth in km (IUGG). */
const EARTH_KM = 6371.0088
/** A job is seldom farther than this from the last one; beyond it the digits are looked at again. From memory. */
const FAR_KM = 150

const rad = (degrees: number) => (degrees * Math.PI) / 180

/** Great-circle distance in km (haversine); good to about 0.5 %, which is plenty for a doubt. */
export function distanceKm(a: Point, b: Point): number {
  const s =
    Math.sin(rad(b.latitude - a.latitude) / 2) ** 2 +
    Math.cos(rad(a.latitude)) *
      Math.cos(rad(b.latitude)) *
      Math.sin(rad(b.longitude - a.longitude) / 2) ** 2
  return 2 * EARTH_KM * Math.asin(Math.min(1, Math.sqrt(s)))
}

/** What speaks against the position as typed; empty when nothing does. `near` null: nothing to compare with. */
export function doubtsOf(typed: TypedPlace, near: Point | null): Doubt[] {
  if (near === null) {
    return typed.lettered || typed.latitude < 0 || typed.longitude < 0
      ? []
      : [{ kind: 'noLetters', meant: null, km: null }]
  }
  const km = distanceKm(typed, near)
  const better = variants(typed)
    .map((v) => ({ ...v, km: distanceKm(v.meant, near) }))
    .filter((v) => v.km < km / 4 && km - v.km > 1)
    .sort((a, b) => a.km - b.km)
  const [best] = better
  if (best) {
    return [best]
  }
  return km > FAR_KM ? [{ kind: 'far', meant: null, km }] : []
}

function variants({
  latitude,
  longitude,
  form,
}: TypedPlace): { kind: Doubt['kind']; meant: Point }[] {
  const list: { kind: Doubt['kind']; meant: Point }[] = [
    { kind: 'otherHalf', meant: { latitude, longitude: -longitude } },
    { kind: 'otherHalf', meant: { latitude: -latitude, longitude } },
    { kind: 'otherHalf', meant: { latitude: -latitude, longitude: -longitude } },
  ]
  if (Math.abs(longitude) <= 90) {
    list.push({ kind: 'swapped', meant: { latitude: longitude, longitude: latitude } })
  }
  const asMinutes = { latitude: minutesRead(latitude), longitude: minutesRead(longitude) }
  if (form === 'degrees' && asMinutes.latitude !== null && asMinutes.longitude !== null) {
    list.push({
      kind: 'readAsMinutes',
      meant: { latitude: asMinutes.latitude, longitude: asMinutes.longitude },
    })
  }
  return list
}

/** 47.06 read as 47 degrees 06 minutes; null when the digits cannot be minutes. */
function minutesRead(degrees: number): number | null {
  const size = Math.abs(degrees)
  const whole = Math.floor(size)
  const minutes = (size - whole) * 100
  return minutes < 60 ? Math.sign(degrees) * (whole + minutes / 60) : null
}

/** "47.10000 N 93.20000 W": as every screen shows a position. */
export function inDegrees({ latitude, longitude }: Point): string {
  return `${Math.abs(latitude).toFixed(5)} ${latitude < 0 ? 'S' : 'N'}  ${Math.abs(longitude).toFixed(5)} ${longitude < 0 ? 'W' : 'E'}`
}

/** "47 06.000 N 93 12.000 W": degrees and decimal minutes, as radios and the rescue service read them. */
export function inMinutes({ latitude, longitude }: Point): string {
  const one = (value: number, width: number) => {
    const thousandths = Math.round(Math.abs(value) * 60_000)
    const degrees = Math.floor(thousandths / 60_000)
    const minutes = ((thousandths % 60_000) / 1000).toFixed(3).padStart(6, '0')
    return `${String(degrees).padStart(width, '0')} ${minutes}`
  }
  return `${one(latitude, 2)} ${latitude < 0 ? 'S' : 'N'}  ${one(longitude, 3)} ${longitude < 0 ? 'W' : 'E'}`
}
