/**
 * Life of parts by a Weibull curve with right-censored lives: maximum likelihood (NIST/SEMATECH e-Handbook
 * 8.4.1.3). The shape solves one equation that grows steadily with it, so it is found by halving; the scale
 * follows. Shape under 1: early failures; near 1: chance; over 1: wear.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { crossing } from './bisection'
import { type Life, type LivesProblem, timesProblem } from './kaplan-meier'
import { logGamma } from './log-gamma'

/** The fitted curve; times in the unit of the lives. */
export type Weibull = {
  /** Time by which 63.2 of 100 have failed (eta). */
  scale: number
  /** Shape (beta). */
  shape: number
  minusLogLikelihood: number
  /** Akaike's criterion: 2 x 2 parameters + 2 x minus log-likelihood. */
  aic: number
  mean: number
  standardDeviation: number
  /** Time by which 10 of 100 have failed. */
  b10: number
}

/** Shapes looked at; outside it a Weibull curve says nothing about a part. */
const SHAPES = { least: 0.05, most: 500 } as const

/**
 * The likeliest curve. Times above 0 to 9e15, in any one unit. `noFailures` when all are censored; `noFit` when the lives have no curve
 * within shapes 0.05 to 500, as when every failure came at the one longest time.
 */
export function fitWeibull(
  lives: readonly Life[],
): Result<Weibull, LivesProblem | { kind: 'noFailures' } | { kind: 'noFit' }> {
  if (lives.length === 0) return fail({ kind: 'noLives' })
  const problem = timesProblem(lives)
  if (problem !== null) return fail(problem)
  const zero = lives.findIndex((l) => l.time === 0)
  if (zero >= 0) return fail({ kind: 'below', field: `time.${zero + 1}`, limit: Number.MIN_VALUE })
  const failed = lives.filter((l) => l.failed)
  if (failed.length === 0) return fail({ kind: 'noFailures' })
  const longest = lives.reduce((most, l) => Math.max(most, l.time), 0)
  const logs = lives.map((l) => Math.log(l.time / longest))
  const meanLog = failed.reduce((sum, l) => sum + Math.log(l.time / longest), 0) / failed.length
  const slope = (shape: number): number => weightedLog(logs, shape) - 1 / shape - meanLog
  if (slope(SHAPES.least) > 0 || slope(SHAPES.most) < 0) return fail({ kind: 'noFit' })
  const shape = crossing(slope, SHAPES.least, SHAPES.most)
  const powers = logs.reduce((sum, log) => sum + Math.exp(shape * log), 0)
  const scale = longest * (powers / failed.length) ** (1 / shape)
  return ok({ scale, shape, ...fitOf(failed, scale, shape), ...curve(scale, shape) })
}

/** Mean of the logarithms, each weighted by its time to the power of the shape. */
function weightedLog(logs: readonly number[], shape: number): number {
  let weights = 0
  let sum = 0
  for (const log of logs) {
    const weight = Math.exp(shape * log)
    weights += weight
    sum += weight * log
  }
  return sum / weights
}

function fitOf(failed: readonly Life[], scale: number, shape: number) {
  // At the likeliest scale the sum of (t / scale)^shape over all lives is the number of failures.
  const perFailure = failed.map(
    ({ time }) => Math.log(shape / scale) + (shape - 1) * Math.log(time / scale),
  )
  const minusLogLikelihood = failed.length - perFailure.reduce((sum, one) => sum + one, 0)
  return { minusLogLikelihood, aic: 4 + 2 * minusLogLikelihood }
}

function curve(scale: number, shape: number) {
  // Gamma(1 + 2/b) - Gamma(1 + 1/b)^2, kept as a share of the square so that no scale overflows.
  const [first, second] = [logGamma(1 + 1 / shape), logGamma(1 + 2 / shape)]
  const mean = scale * Math.exp(first)
  return {
    mean,
    standardDeviation: mean * Math.sqrt(Math.max(0, Math.expm1(second - 2 * first))),
    b10: scale * (-Math.log(0.9)) ** (1 / shape),
  }
}
