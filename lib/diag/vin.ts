/**
 * The check digit of a 17-character vehicle number (49 CFR 565.15): letters by value, weights, modulo 11, 10 is
 * X; I, O and Q are not used. Off-road machines need not follow it, and one random string in eleven does: a
 * mismatch warns and never blocks.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { mustFit } from './figure-bounds'

const WEIGHTS = [8, 7, 6, 5, 4, 3, 2, 10, 0, 9, 8, 7, 6, 5, 4, 3, 2]
const VALUES: Record<string, number> = {
  ...Object.fromEntries([...'0123456789'].map((d) => [d, Number(d)])),
  ...Object.fromEntries([...'ABCDEFGH'].map((c, i) => [c, i + 1])),
  ...Object.fromEntries([...'JKLMN'].map((c, i) => [c, i + 1])),
  P: 7,
  R: 9,
  ...Object.fromEntries([...'STUVWXYZ'].map((c, i) => [c, i + 2])),
}

/** What is no such number: another length, or a character it does not use, with its place from 1. */
export type VinProblem =
  | { kind: 'notSeventeen'; length: number }
  | { kind: 'badCharacter'; character: string; at: number }

/**
 * The weighted sum, the digit it asks for and whether position 9 holds it; position 9 itself counts nothing (49 CFR
 * 565.15). Any case, blanks around it left out. A mismatch is a value and not a problem: warn, never block.
 */
export function checkVin(
  text: string,
): Result<{ sum: number; expected: string; matches: boolean }, VinProblem> {
  const vin = text.trim().toUpperCase()
  if (vin.length !== 17) return fail({ kind: 'notSeventeen', length: vin.length })
  let sum = 0
  for (const [i, character] of [...vin].entries()) {
    const value = VALUES[character]
    const isCheckPlace = i === 8
    if (value === undefined && !isCheckPlace)
      return fail({ kind: 'badCharacter', character, at: i + 1 })
    sum += (value ?? 0) * (WEIGHTS[i] ?? 0)
  }
  const digit = sum % 11
  const expected = digit === 10 ? 'X' : String(digit)
  return ok({ sum, expected, matches: vin[8] === expected })
}

/** Year letters of position 10 in the order of the years from 1980 on; I, O, Q, U, Z and 0 are not used. */
const YEARS = 'ABCDEFGHJKLMNPRSTVWXY123456789'

/**
 * The years position 10 can mean, 30 apart from 1980 on, up to `thisYear` and the next (models come early); empty
 * when it is no year letter, as on many off-road machines and outside North America. 49 CFR 565.15, table. `thisYear`
 * 1980 to 9999, of the caller's clock.
 */
export function modelYears(text: string, thisYear: number): Result<number[], VinProblem> {
  mustFit({ thisYear: [thisYear, 1980, 9999] })
  const vin = text.trim().toUpperCase()
  if (vin.length !== 17) return fail({ kind: 'notSeventeen', length: vin.length })
  const at = YEARS.indexOf(vin.charAt(9))
  if (at < 0) return ok([])
  const years: number[] = []
  for (let year = 1980 + at; year <= thisYear + 1; year += YEARS.length) years.push(year)
  return ok(years)
}
