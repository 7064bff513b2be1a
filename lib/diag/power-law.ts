/**
 * Whether machines that are mended and go on fail more and more often or less: the power law process (Crow 1974;
 * NIST/SEMATECH e-Handbook 8.4.5.2), failures per hour a b t^(b - 1). Two conventions are in use and both are
 * given: the plain maximum-likelihood shape n / sum, and the corrected one (n - 1) / sum, which is unbiased and
 * is the handbook's ("improvement" there is 1 minus it). Each machine's watch ends at a time, not at a failure.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type Interval, poissonInterval } from './exact-intervals'
import { eachWithin, type FigureProblem, unfit } from './figure-bounds'

/** One machine's failures in hours since new or since the watch began, and the hour at which the watch ended. */
export type Watched = { failures: readonly number[]; endsAt: number }

/** One convention's figures: shape b, scale a (per machine), and hours between failures at the longest watch. */
export type PowerLawFit = { shape: number; scale: number; hoursBetweenAtEnd: number }

/** Both conventions beside each other, and what the trend is. */
export type PowerLaw = {
  failures: number
  plain: PowerLawFit
  corrected: PowerLawFit
  /** Exact 95 % interval of the shape: 2 n b / b(plain) is chi-square with 2 n degrees. */
  shapeInterval: Interval
  /** `cannotTell` while the interval holds 1. */
  trend: 'worse' | 'better' | 'cannotTell'
}

/** `tooFewFailures`: a trend asks for two. */
export type PowerLawProblem = FigureProblem | { kind: 'tooFewFailures'; needed: 2 }

/**
 * The fit over one or more alike machines. Two failures in all, before the last hour, are the least; hours 1e-6 to
 * 1e9, no failure past its machine's end. A scale too small for a number is 0.
 */
export function fitPowerLaw(machines: readonly Watched[]): Result<PowerLaw, PowerLawProblem> {
  const problem = unfit(boundsOf(machines))
  if (problem !== null) return fail(problem)
  const failures = machines.reduce((n, m) => n + m.failures.length, 0)
  const sum = machines.reduce(
    (all, m) => all + m.failures.reduce((s, t) => s + Math.log(m.endsAt / t), 0),
    0,
  )
  if (failures < 2 || sum <= 0) return fail({ kind: 'tooFewFailures', needed: 2 })
  const longest = machines.reduce((most, m) => Math.max(most, m.endsAt), 0)
  const fitted = (shape: number): PowerLawFit => {
    // As many machines watched to the longest end: the powers of hours cancel before they can overflow.
    const asMany = machines.reduce((all, m) => all + (m.endsAt / longest) ** shape, 0)
    const scale = (failures / asMany) * longest ** -shape
    return { shape, scale, hoursBetweenAtEnd: (longest * asMany) / (failures * shape) }
  }
  const plain = failures / sum
  const shapeInterval = {
    low: (plain * poissonInterval(failures).low) / failures,
    high: (plain * poissonInterval(failures - 1).high) / failures,
  }
  return ok({
    failures,
    plain: fitted(plain),
    corrected: fitted((failures - 1) / sum),
    shapeInterval,
    trend: shapeInterval.low > 1 ? 'worse' : shapeInterval.high < 1 ? 'better' : 'cannotTell',
  })
}

const boundsOf = (machines: readonly Watched[]) =>
  Object.assign(
    {},
    ...machines.map(({ failures, endsAt }, i) => ({
      [`machine.${i + 1}.endsAt`]: [endsAt, 1e-6, 1e9],
      ...eachWithin(`machine.${i + 1}.failure`, failures, 1e-6, endsAt),
    })),
  )
