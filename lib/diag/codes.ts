/**
 * Trouble codes from bytes: SAE J1939-73 DTCs in all four conversion versions, DM1 messages of any length,
 * and SAE J2012 / ISO 15031-6 two-byte codes. A cleared conversion bit (CM = 0) is version 4 on the wire;
 * versions 1 to 3 all set it and cannot be told apart, so the caller names which. One known manual states
 * the bit the other way round; three other sources agree with this reading (facts of CHECKS 1.1).
 */
import { fail, ok, type Result } from '@/lib/model/result'

/** The conversion versions of SAE J1939-73: 1 to 3 with the conversion bit set, 4 with it clear. */
export const DTC_VERSIONS = [1, 2, 3, 4] as const
/** One of the four conversion versions; which of 1 to 3 is not on the wire. */
export type DtcVersion = (typeof DTC_VERSIONS)[number]

/** A J1939 trouble code: SPN 0 to 524287, FMI 0 to 31, count 0 to 126 or null for "not available" (127). */
export type Dtc = { spn: number; fmi: number; count: number | null; version: DtcVersion }

/** Why bytes or a number are no code: each kind is a sentence on the screen. */
export type CodeProblem =
  | { kind: 'wrongLength'; expected: string; got: number }
  | { kind: 'notBytes' }
  | { kind: 'outOfRange'; field: 'spn' | 'fmi' | 'count' }
  | { kind: 'versionUnknown' }
  | { kind: 'versionMismatch' }
  | { kind: 'notPcode' }
  | { kind: 'noCode' }

const LAMP = ['off', 'on', 'error', 'notAvailable'] as const
const FLASH = ['slow', 'fast', 'reserved', 'steady'] as const
/** One of the four lamps of DM1: two bits of state and two of flashing each (SAE J1939-73). */
export type Lamp = { state: (typeof LAMP)[number]; flash: (typeof FLASH)[number] }

/** A DM1 message. `lampsUsed` is false when the sender leaves the lamp byte unused (FF, agricultural mode). */
export type Dm1 = {
  lampsUsed: boolean
  lamps: { malfunction: Lamp; stop: Lamp; warning: Lamp; protect: Lamp }
  codes: Dtc[]
}

/**
 * The DTC in four bytes. Without `version` a cleared conversion bit is read as version 4 and a set one answers
 * `versionUnknown`; naming a version that the bit contradicts answers `versionMismatch`.
 */
export function decodeDtc(
  bytes: readonly number[],
  version?: DtcVersion,
): Result<Dtc, CodeProblem> {
  if (bytes.length !== 4)
    return fail({ kind: 'wrongLength', expected: '4 bytes', got: bytes.length })
  if (!bytes.every(isByte)) return fail({ kind: 'notBytes' })
  const [b1 = 0, b2 = 0, b3 = 0, b4 = 0] = bytes
  const converted = b4 >> 7 === 1
  if (version === undefined && converted) return fail({ kind: 'versionUnknown' })
  const as = version ?? 4
  if ((as === 4) === converted) return fail({ kind: 'versionMismatch' })
  const count = b4 & 127
  return ok({
    spn: spnOf([b1, b2, b3], as),
    fmi: b3 & 31,
    count: count === 127 ? null : count,
    version: as,
  })
}

/** The four bytes of a DTC in its version; `outOfRange` names the first field that does not fit. */
export function encodeDtc(dtc: Dtc): Result<number[], CodeProblem> {
  const { spn, fmi, version } = dtc
  if (!fits(spn, 524287)) return fail({ kind: 'outOfRange', field: 'spn' })
  if (!fits(fmi, 31)) return fail({ kind: 'outOfRange', field: 'fmi' })
  if (dtc.count !== null && !fits(dtc.count, 126))
    return fail({ kind: 'outOfRange', field: 'count' })
  const last = (version === 4 ? 0 : 128) | (dtc.count ?? 127)
  const low3 = ((spn & 7) << 5) | fmi
  if (version === 1) return ok([(spn >> 11) & 255, (spn >> 3) & 255, low3, last])
  if (version === 2) return ok([(spn >> 3) & 255, (spn >> 11) & 255, low3, last])
  return ok([spn & 255, (spn >> 8) & 255, ((spn >> 16) << 5) | fmi, last])
}

/**
 * A DM1 payload: two lamp bytes and any number of DTCs, from one frame (8 bytes, padded with FF) or put
 * together from several packets. An all-zero DTC stands for "none"; all-FF tails are padding.
 */
export function readDm1(bytes: readonly number[], version?: DtcVersion): Result<Dm1, CodeProblem> {
  if (!bytes.every(isByte)) return fail({ kind: 'notBytes' })
  if (bytes.length < 6)
    return fail({ kind: 'wrongLength', expected: '2 lamp bytes and 4 per code', got: bytes.length })
  const [solid = 255, flash = 255] = bytes
  const body = withoutPadding(bytes.slice(2))
  if (body === null)
    return fail({ kind: 'wrongLength', expected: '2 lamp bytes and 4 per code', got: bytes.length })
  const codes: Dtc[] = []
  for (let i = 0; i < body.length; i += 4) {
    const four = body.slice(i, i + 4)
    if (four.every((b) => b === 0)) continue
    const dtc = decodeDtc(four, version)
    if (!dtc.ok) return dtc
    codes.push(dtc.value)
  }
  const lamp = (shift: number): Lamp => ({
    state: LAMP[(solid >> shift) & 3] ?? 'notAvailable',
    flash: FLASH[(flash >> shift) & 3] ?? 'steady',
  })
  const lamps = { malfunction: lamp(6), stop: lamp(4), warning: lamp(2), protect: lamp(0) }
  return ok({ lampsUsed: solid !== 255, lamps, codes })
}

/**
 * The bytes in a line of hex, with or without blanks, commas, colons, hyphens or `0x`. Each piece holds whole bytes
 * of two digits: `1 2` could be one byte or two, and is `notBytes`.
 */
export function bytesFromHex(text: string): Result<number[], CodeProblem> {
  const pieces = text.split(/[\s,:-]+/).filter((piece) => piece !== '')
  if (pieces.length === 0 || !pieces.every((piece) => /^(0x)?([0-9a-f]{2})+$/i.test(piece)))
    return fail({ kind: 'notBytes' })
  const digits = pieces.map((piece) => piece.replace(/^0x/i, '')).join('')
  return ok((digits.match(/../g) ?? []).map((pair) => Number.parseInt(pair, 16)))
}

/** A two-byte code by letter and digits. Digits after the first are hexadecimal, so `P00A5` is legal. */
export type Pcode = { letter: 'P' | 'C' | 'B' | 'U'; first: number; digits: string }

const LETTERS = ['P', 'C', 'B', 'U'] as const

/** A code as typed, in either case and with blanks around it; `notPcode` when it does not have the form. */
export function parsePcode(text: string): Result<Pcode, CodeProblem> {
  const match = /^([PCBU])([0-3])([0-9A-F]{3})$/.exec(text.trim().toUpperCase())
  const letter = LETTERS.find((l) => l === match?.[1])
  if (match === null || letter === undefined) return fail({ kind: 'notPcode' })
  return ok({ letter, first: Number(match[2]), digits: match[3] ?? '' })
}

/** The code as the dash prints it, five characters. */
export const printPcode = (code: Pcode): string => `${code.letter}${code.first}${code.digits}`

/** The code in two bytes: letter in the top two bits (P 0, C 1, B 2, U 3); `00 00` answers `noCode` (padding). */
export function pcodeFromBytes(high: number, low: number): Result<Pcode, CodeProblem> {
  if (!isByte(high) || !isByte(low)) return fail({ kind: 'notBytes' })
  if (high === 0 && low === 0) return fail({ kind: 'noCode' })
  const digits = (((high & 15) << 8) | low).toString(16).toUpperCase().padStart(3, '0')
  return ok({ letter: LETTERS[high >> 6] ?? 'P', first: (high >> 4) & 3, digits })
}

/** The two bytes of a code. */
export function pcodeToBytes(code: Pcode): [number, number] {
  const rest = Number.parseInt(code.digits, 16)
  return [(LETTERS.indexOf(code.letter) << 6) | (code.first << 4) | (rest >> 8), rest & 255]
}

/** Who defines a code's meaning: the standard or the maker (SAE J2012; P3, C, B and U digits from memory). */
export function definedBy({ letter, first, digits }: Pcode): 'standard' | 'maker' {
  if (first === 0) return 'standard'
  if (letter !== 'P') return first === 3 ? 'standard' : 'maker'
  if (first === 1) return 'maker'
  return first === 2 || digits >= '400' ? 'standard' : 'maker'
}

const isByte = (n: number): boolean => fits(n, 255)
const fits = (n: number, top: number): boolean => Number.isInteger(n) && n >= 0 && n <= top

function spnOf([b1, b2, b3]: [number, number, number], version: DtcVersion): number {
  if (version === 1) return (b1 << 11) | (b2 << 3) | (b3 >> 5)
  if (version === 2) return (b2 << 11) | (b1 << 3) | (b3 >> 5)
  return b1 | (b2 << 8) | ((b3 >> 5) << 16)
}

function withoutPadding(bytes: readonly number[]): number[] | null {
  const over = bytes.length % 4
  const tail = over === 0 ? [] : bytes.slice(-over)
  if (!tail.every((b) => b === 255)) return null
  const body = bytes.slice(0, bytes.length - over)
  while (body.length > 4 && body.slice(-4).every((b) => b === 255)) body.length -= 4
  return body.length === 4 && body.every((b) => b === 255) ? [] : body
}
