/**
 * What a code's number says by its own form, where the code book has no word for it: SAE J2012 / ISO 15031-6 for
 * letters and digits, SAE J1939 for the maker's range of SPNs. Digits of P3, C, B and U are from memory.
 */
import type { Pcode } from './codes'

/** SPNs that each maker gives out as it likes: 520192 to 524287 (SAE J1939). */
export const isMakerSpn = (spn: number): boolean => spn >= 520_192 && spn <= 524_287

/** The part of the machine a letter stands for. */
export const LETTER_SYSTEMS = { P: 'powertrain', C: 'chassis', B: 'body', U: 'network' } as const

export type PcodeArea =
  | 'fuelAndAir'
  | 'ignition'
  | 'auxiliaryEmission'
  | 'speedIdleInputs'
  | 'computerOutputs'
  | 'transmission'
  | 'hybrid'

/**
 * The area a standard P0 code's second digit names (seen in secondary text); null for other codes, whose second
 * digits are the maker's or are not known to us, and for D to F, which are kept free.
 */
export function areaOf({ letter, first, digits }: Pcode): PcodeArea | null {
  if (letter !== 'P' || first !== 0) return null
  return AREAS[Number.parseInt(digits.slice(0, 1), 16)] ?? null
}

const AREAS: readonly PcodeArea[] = [
  'fuelAndAir',
  'fuelAndAir',
  'fuelAndAir',
  'ignition',
  'auxiliaryEmission',
  'speedIdleInputs',
  'computerOutputs',
  'transmission',
  'transmission',
  'transmission',
  'hybrid',
  'hybrid',
  'hybrid',
]

export type SuffixKind = 'circuit' | 'range' | 'low' | 'high' | 'intermittent'

/**
 * The kind of failure that the last digit names in the classic groups (SAE J2012): circuit, range, low, high,
 * intermittent, from the group's first number on. P0503 is intermittent, erratic or high. Null outside these
 * groups: oxygen sensors, injectors, coils and misfires do not follow it.
 */
export function suffixKind({ letter, first, digits }: Pcode): SuffixKind | null {
  const number = Number.parseInt(digits, 10)
  if (letter !== 'P' || first !== 0 || !/^\d{3}$/.test(digits)) return null
  if (!GROUPS.some(([from, to]) => number >= from && number <= to)) return null
  return number === 503 ? 'intermittent' : (KINDS[number % 5] ?? null)
}

const GROUPS = [
  [105, 124],
  [220, 229],
  [325, 329],
  [335, 344],
  [460, 464],
  [500, 503],
] as const
const KINDS: readonly SuffixKind[] = ['circuit', 'range', 'low', 'high', 'intermittent']
