import type { Quantity } from '@/lib/model/meter-profile'

/** The minus of the screen is U+2212; data keeps the hyphen. */
const MINUS = '−'
export const THIN = ' '

const UNIT_WORDS: Record<Quantity, { short: string; spoken: string }> = {
  resistance: { short: 'ohm', spoken: 'ohm' },
  dcVoltage: { short: 'V DC', spoken: 'volts DC' },
  acVoltage: { short: 'V AC', spoken: 'volts AC' },
  dcCurrent: { short: 'A', spoken: 'amperes' },
  pressure: { short: 'kPa', spoken: 'kilopascals' },
  flow: { short: 'L/min', spoken: 'litres a minute' },
  temperature: { short: '°C', spoken: 'degrees Celsius' },
  length: { short: 'mm', spoken: 'millimetres' },
  time: { short: 's', spoken: 'seconds' },
}

export const shortUnit = (quantity: Quantity): string => UNIT_WORDS[quantity].short
export const spokenUnit = (quantity: Quantity): string => UNIT_WORDS[quantity].spoken

/** Decimals that show a step of the size of `step` (0.1 gives 1, 0.25 gives 2, 5 gives 0). */
export function decimalsOf(step: number): number {
  if (!(step > 0)) return 2
  for (let places = 0; places < 6; places++) {
    const scaled = step * 10 ** places
    if (Math.abs(scaled - Math.round(scaled)) < 1e-9 * Math.max(1, scaled)) return places
  }
  return 6
}

/** A number with a fixed count of decimals, with the screen's minus and never a minus zero. */
export function fixed(value: number, places: number): string {
  const text = value.toFixed(places)
  if (!text.startsWith('-')) return text
  return Number(text) === 0 ? text.slice(1) : `${MINUS}${text.slice(1)}`
}

/** An uncertainty with two significant digits, one from a 5 up: 0.3956 is `0.40`, 0.92 is `0.9`, 12.4 is `12`. */
export function twoDigits(value: number): { text: string; places: number } {
  if (!(value > 0)) return { text: '0', places: 0 }
  const power = Math.floor(Math.log10(value))
  const digits = value / 10 ** power >= 5 ? 1 : 2
  const places = Math.min(6, Math.max(0, digits - 1 - power))
  return { text: value.toFixed(places), places }
}

/** A share as a whole number of 100; under one of 100 it says `under 1`, never a bare 0. */
export function of100(share: number): string {
  const n = share * 100
  if (n > 0 && n < 0.5) return 'under 1'
  if (n < 100 && n >= 99.5) return 'over 99'
  return String(Math.round(n))
}

/** Keeps what was typed but with the screen's minus. */
export const asTypedOnScreen = (typed: string): string => typed.replace('-', MINUS)
