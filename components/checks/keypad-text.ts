/** What stands on the keypad after a key. `back` takes one away, `sign` turns it round. */
export type PadKey =
  | '0'
  | '1'
  | '2'
  | '3'
  | '4'
  | '5'
  | '6'
  | '7'
  | '8'
  | '9'
  | '.'
  | 'back'
  | 'sign'

const MOST = 9

/** The typed figure after one key; a key that makes no sense there changes nothing. */
export function pressed(typed: string, key: PadKey): string {
  if (key === 'back') return typed.slice(0, -1) === '-' ? '' : typed.slice(0, -1)
  if (key === 'sign') return typed.startsWith('-') ? typed.slice(1) : `-${typed}`
  if (typed.length >= MOST) return typed
  return key === '.' ? pointAdded(typed) : digitAdded(typed, key)
}

function pointAdded(typed: string): string {
  if (typed.includes('.')) return typed
  return typed === '' || typed === '-' ? `${typed}0.` : `${typed}.`
}

const digitAdded = (typed: string, digit: string): string =>
  typed === '0' || typed === '-0' ? typed.replace('0', digit) : typed + digit

/** The figure's value; null while there is none (`1.` is 1, `-` and an empty pad are none). */
export function figureOf(typed: string): number | null {
  if (!/^-?\d+(\.\d*)?$/.test(typed)) return null
  return Number(typed)
}
