/**
 * The chance that a machine strands again on the way out (F6): faults that may still be there and show only now and
 * then, independent of each other, each in a ride of t minutes with 1 - e^(-rt) (exponential waiting time, as in
 * docs/spec/diag.md, Belief). What nobody suspects is not in it: it is a least, and is to be said as one.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type Bounded, type FigureProblem, unfit } from './figure-bounds'

/** A fault that may be left: its chance (0 to 1), and how often it shows per minute of riding (0 to 1,000,000). */
export type Remaining = { chance: number; ratePerMinute: number }

/** The chance, 0 to 1, that one or more show in a ride of 0 to 1,440 minutes; 0 when none is left. */
export function chanceOfStranding(
  remaining: readonly Remaining[],
  rideMinutes: number,
): Result<number, FigureProblem> {
  const problem = unfit({ rideMinutes: [rideMinutes, 0, 1440], ...boundsOf(remaining) })
  if (problem !== null) return fail(problem)
  // Summed as logarithms, so that small chances keep their digits.
  const through = remaining.reduce(
    (sum, { chance, ratePerMinute }) =>
      sum + Math.log1p(chance * Math.expm1(-ratePerMinute * rideMinutes)),
    0,
  )
  return ok(Math.abs(Math.expm1(through)))
}

/**
 * The most that this chance can be by a proof run's bound on the share of starts that fail (0 to 1), for a ride
 * with so many starts, 0 to 1,000: 1 - (1 - share)^starts.
 */
export function strandingBound(share: number, starts: number): Result<number, FigureProblem> {
  const whole = Number.isInteger(starts) ? starts : Number.NaN
  const problem = unfit({ share: [share, 0, 1], starts: [whole, 0, 1000] })
  if (problem !== null) return fail(problem)
  if (starts === 0) return ok(0)
  return ok(Math.abs(Math.expm1(starts * Math.log1p(-share))))
}

const boundsOf = (remaining: readonly Remaining[]): Record<string, Bounded> =>
  Object.fromEntries(
    remaining.flatMap(({ chance, ratePerMinute }, i) => [
      [`chance.${i + 1}`, [chance, 0, 1] as const],
      [`ratePerMinute.${i + 1}`, [ratePerMinute, 0, 1e6] as const],
    ]),
  )
