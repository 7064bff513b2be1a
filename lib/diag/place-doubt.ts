/**
 * Doubts about a typed position (F1, rule R19), judged against a place that is surely near (the last fix or
 * the last job): the same digits with the other hemisphere, in the other order, or with the decimals read as
 * minutes, when that lies far nearer. A doubt is shown, never applied by itself.
 */
import { distanceMetres, type Point } from './distance'
import type { TypedPlace } from './place-text'

/** One thing that speaks against a typed position. */
export type PlaceDoubt = {
  /**
   * `otherHalf`: the other hemisphere fits. `swapped`: latitude and longitude in the other order.
   * `readAsMinutes`: the decimals are minutes. `far`: nothing fits, only far. `noLetters`: north and east
   * were taken for granted.
   */
  kind: 'otherHalf' | 'swapped' | 'readAsMinutes' | 'far' | 'noLetters'
  /** The position meant instead; null when only a look is asked for. */
  meant: Point | null
  /** From the near place to the one meant, or to the one typed when it is far; null for `noLetters`. */
  distanceMetres: number | null
}

/** A job is seldom farther than this from the last one; beyond it the digits are looked at again. From memory. */
const FAR_METRES = 150_000
/** Another reading of the digits counts when it lies nearer by this factor and by this much (guess). */
const NEARER_BY_FACTOR = 4
const NEARER_BY_METRES = 1000

/**
 * What speaks against the position as typed: at most one doubt, the reading of the digits that lies nearest;
 * empty when nothing does. `near` null: nothing to compare with, so only missing letters are doubted.
 */
export function doubtsOf(typed: TypedPlace, near: Point | null): PlaceDoubt[] {
  if (near === null) {
    return typed.lettered || typed.latitude < 0 || typed.longitude < 0
      ? []
      : [{ kind: 'noLetters', meant: null, distanceMetres: null }]
  }
  const asTyped = distanceMetres(typed, near)
  const [best] = variants(typed)
    .map((v) => ({ ...v, distanceMetres: distanceMetres(v.meant, near) }))
    .filter((v) => v.distanceMetres < asTyped / NEARER_BY_FACTOR)
    .filter((v) => asTyped - v.distanceMetres > NEARER_BY_METRES)
    .sort((a, b) => a.distanceMetres - b.distanceMetres)
  if (best) {
    return [best]
  }
  return asTyped > FAR_METRES ? [{ kind: 'far', meant: null, distanceMetres: asTyped }] : []
}

function variants({
  latitude,
  longitude,
  form,
}: TypedPlace): { kind: PlaceDoubt['kind']; meant: Point }[] {
  const list: { kind: PlaceDoubt['kind']; meant: Point }[] = [
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
