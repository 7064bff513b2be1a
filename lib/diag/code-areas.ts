/**
 * What a code's number says by its own form, where the code book has no word for it: SAE J2012 / ISO 15031-6 for
 * letters and digits, SAE J1939 for the maker's range of SPNs. Digits of P3, C, B and U are from memory.
 */
import type { CodeSeen } from '@/lib/model/code-seen'
import { definedBy, type Pcode, parsePcode } from './codes'

/** SPNs that each maker gives out as it likes: 516096 to 524287 (SAE J1939; the part below 520192 from memory). */
export const isMakerSpn = (spn: number): boolean => spn >= FIRST_MAKER_SPN && spn <= 524_287
const FIRST_MAKER_SPN = 516_096

/** The part of the machine a letter stands for. */
export const LETTER_SYSTEMS = { P: 'powertrain', C: 'chassis', B: 'body', U: 'network' } as const

/** The area that the second digit of a standard P0 code names, see `areaOf`. */
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

/** The kind of failure that a last digit can name in the classic groups, see `suffixKind`. */
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

/** Groups of five; those of knock 2, cam and crank B, purge flow, outside air and second air sensor from memory. */
const GROUPS = [
  [70, 74],
  [95, 99],
  [105, 124],
  [180, 184],
  [220, 229],
  [325, 349],
  [365, 369],
  [385, 394],
  [460, 469],
  [500, 503],
] as const
const KINDS: readonly SuffixKind[] = ['circuit', 'range', 'low', 'high', 'intermittent']

/** What the form of a number says where the book has no word for it, in a sentence; null where it says nothing. */
export function formWords(seen: CodeSeen): string | null {
  if (seen.format === 'spn')
    return isMakerSpn(seen.spn)
      ? `Numbers from ${FIRST_MAKER_SPN} up are each maker's own: only the maker's manual says what ${seen.spn} is. The failure kind is the standard's.`
      : null
  if (seen.format !== 'pcode') return null
  const code = parsePcode(seen.code)
  if (!code.ok) return null
  const system = LETTER_SYSTEMS[code.value.letter]
  if (definedBy(code.value) === 'maker')
    return `A code of this form is each maker's own: only the maker's manual says what ${seen.code} is. Its letter stands for ${system}.`
  const area = areaOf(code.value)
  const where = area === null ? '' : ` Its digits put it to ${AREA_WORDS[area]}.`
  return `A number of the standard that the code book does not hold. Its letter stands for ${system}.${where}`
}

const AREA_WORDS: Record<PcodeArea, string> = {
  fuelAndAir: 'fuel and air',
  ignition: 'ignition and misfire',
  auxiliaryEmission: 'exhaust and fuel vapour',
  speedIdleInputs: 'speed, idle and inputs',
  computerOutputs: 'the module and what it drives',
  transmission: 'the transmission',
  hybrid: 'an electric drive',
}
