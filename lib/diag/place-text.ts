/**
 * Reads and prints positions: decimal degrees, degrees and decimal minutes, or degrees, minutes and seconds,
 * with or without N/S and E/W, in either order when the letters say so (F1). Never guesses: what can be read
 * in two ways is refused or comes with a doubt. What is printed here is read back as the same place.
 */
import type { Place } from '@/lib/model/place'
import { fail, ok, type Result } from '@/lib/model/result'

type PlaceForm = 'degrees' | 'minutes' | 'seconds'
/** A position as it was typed: WGS 84 degrees, north and east positive, and the form it was typed in. */
export type TypedPlace = {
  latitude: number
  longitude: number
  form: PlaceForm
  /** True when N/S and E/W stood there; without them a minus sign is the only word on the half of the globe. */
  lettered: boolean
}
/** Why a text is no position: nothing there, not two numbers, or one that cannot be. */
export type PlaceProblem = {
  kind: 'empty' | 'notTwo' | 'twoOfOneKind' | 'latitudeRange' | 'longitudeRange' | 'minutesRange'
}

type Letter = 'N' | 'S' | 'E' | 'W'
type Half = { numbers: number[]; minus: boolean; letter: Letter | null }

const NUMBER = /-?\d+(?:\.\d+)?/g

/**
 * The position in the text, in WGS 84 degrees, or why it is none. Latitude -90 to 90, longitude -180 to 180,
 * minutes and seconds under 60; both halves in the same form, and letters on both or on neither.
 */
export function parsePlace(text: string): Result<TypedPlace, PlaceProblem> {
  const clean = tidy(text)
  if (clean === '') {
    return fail({ kind: 'empty' })
  }
  const halves = halvesOf(clean)
  if (halves === null) {
    return fail({ kind: 'notTwo' })
  }
  const [first, second] = halves
  if (first.numbers.length !== second.numbers.length) {
    return fail({ kind: 'notTwo' })
  }
  const swapped = isEastWest(first.letter) || isNorthSouth(second.letter)
  const [lat, lon] = swapped ? [second, first] : [first, second]
  if (isEastWest(lat.letter) || isNorthSouth(lon.letter)) {
    return fail({ kind: 'twoOfOneKind' })
  }
  const latitude = degreesOf(lat)
  const longitude = degreesOf(lon)
  if (latitude === null || longitude === null) {
    return fail({ kind: 'minutesRange' })
  }
  if (Math.abs(latitude) > 90) {
    return fail({ kind: 'latitudeRange' })
  }
  if (Math.abs(longitude) > 180) {
    return fail({ kind: 'longitudeRange' })
  }
  const form = (['degrees', 'minutes', 'seconds'] as const)[lat.numbers.length - 1] ?? 'degrees'
  return ok({ latitude, longitude, form, lettered: lat.letter !== null && lon.letter !== null })
}

type Printed = Pick<Place, 'latitude' | 'longitude'>

/** "47.10000 N  93.20000 W": five decimals of a degree, about a metre. */
export function printDegrees({ latitude, longitude }: Printed): string {
  return `${Math.abs(latitude).toFixed(5)} ${northSouth(latitude)}  ${Math.abs(longitude).toFixed(5)} ${eastWest(longitude)}`
}

/** "47 06.000 N  093 12.000 W": degrees and thousandths of a minute, as radios and the rescue service read them. */
export function printMinutes({ latitude, longitude }: Printed): string {
  const one = (value: number, width: number) => {
    const thousandths = Math.round(Math.abs(value) * 60_000)
    const degrees = Math.floor(thousandths / 60_000)
    const minutes = ((thousandths % 60_000) / 1000).toFixed(3).padStart(6, '0')
    return `${String(degrees).padStart(width, '0')} ${minutes}`
  }
  return `${one(latitude, 2)} ${northSouth(latitude)}  ${one(longitude, 3)} ${eastWest(longitude)}`
}

const northSouth = (latitude: number) => (latitude < 0 ? 'S' : 'N')
const eastWest = (longitude: number) => (longitude < 0 ? 'W' : 'E')

const isNorthSouth = (letter: Letter | null) => letter === 'N' || letter === 'S'
const isEastWest = (letter: Letter | null) => letter === 'E' || letter === 'W'

/** Signs of degrees, minutes and seconds become blanks; a decimal comma a point where no point is used. */
function tidy(text: string): string {
  const plain = text
    .trim()
    .toUpperCase()
    .replace(/[−–]/g, '-')
    .replace(/[°º'’′"”″:]/g, ' ')
  const commas = /\d,\d/.test(plain) && !plain.includes('.') && /[NSEW;]/.test(plain)
  return (commas ? plain.replace(/(\d),(\d)/g, '$1.$2') : plain).replace(/[;,]/g, ' ; ').trim()
}

/** Cuts the text into its two halves at the letters, at the comma, or in the middle of its numbers. */
function halvesOf(text: string): [Half, Half] | null {
  if (/[^0-9NSEW.;\s-]/.test(text)) {
    return null
  }
  const letters = [...text.matchAll(/[NSEW]/g)]
  if (letters.length > 2 || letters.length === 1) {
    return null
  }
  const cut = letters.length === 2 ? atLetters(text, letters) : atMiddle(text)
  const halves = cut?.map(half)
  const [first, second] = halves ?? []
  return first && second ? [first, second] : null
}

function atLetters(text: string, letters: readonly RegExpMatchArray[]): [string, string] | null {
  const [a, b] = [letters[0]?.index ?? 0, letters[1]?.index ?? 0]
  const before = /\d/.test(text.slice(0, a))
  const after = /\d/.test(text.slice(b))
  if (before === after) {
    return null
  }
  return before ? [text.slice(0, a + 1), text.slice(a + 1)] : [text.slice(0, b), text.slice(b)]
}

function atMiddle(text: string): [string, string] | null {
  const parts = text.split(';').filter((part) => /\d/.test(part))
  if (parts.length === 2) {
    return [parts[0] ?? '', parts[1] ?? '']
  }
  const numbers = [...text.matchAll(NUMBER)]
  const middle = numbers[numbers.length / 2]
  if (parts.length !== 1 || middle?.index === undefined) {
    return null
  }
  return [text.slice(0, middle.index), text.slice(middle.index)]
}

function half(text: string): Half | null {
  const numbers = (text.match(NUMBER) ?? []).map(Number)
  const minus = /-\s*\d/.test(text)
  const letter = (text.match(/[NSEW]/)?.[0] ?? null) as Letter | null
  if (numbers.length < 1 || numbers.length > 3 || (minus && letter !== null)) {
    return null
  }
  return { numbers: numbers.map(Math.abs), minus, letter }
}

/** Degrees with their sign; null when minutes or seconds are 60 or more, or a part before the last is broken. */
function degreesOf({ numbers, minus, letter }: Half): number | null {
  const [degrees = 0, minutes = 0, seconds = 0] = numbers
  const whole = numbers.slice(0, -1).every(Number.isInteger)
  if (!whole || minutes >= 60 || seconds >= 60) {
    return null
  }
  const size = degrees + minutes / 60 + seconds / 3600
  return minus || letter === 'S' || letter === 'W' ? -size : size
}
