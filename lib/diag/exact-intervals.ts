/**
 * Exact intervals for counts: Garwood (1936) for Poisson, Clopper and Pearson (1934) for the binomial.
 * Both by bisection on the distribution function itself: no special functions, right to about 1e-12.
 */
import { crossing } from './bisection'
import { mustFit } from './figure-bounds'

/** Both ends belong to it; in the unit of what it is the interval of. */
export type Interval = { low: number; high: number }

/** Largest count that these sums go through one by one; above it a screen would wait. */
export const MOST_COUNTED = 10_000
const MOST_TRIALS = Number.MAX_SAFE_INTEGER
const CONFIDENCE = [Number.MIN_VALUE, 1 - Number.EPSILON] as const

/** P(X <= k) for a Poisson count of this mean (from 0), k up to 1e6; 0 below 0. Terms by recurrence of logarithms. */
export function poissonCdf(k: number, mean: number): number {
  mustFit({ k: [k, -1, 1e6], mean: [mean, 0, 1e6] })
  if (k < 0) return 0
  if (mean === 0) return 1
  let log = -mean
  let sum = Math.exp(log)
  for (let i = 1; i <= k; i++) {
    log += Math.log(mean / i)
    sum += Math.exp(log)
  }
  return Math.min(1, sum)
}

/** P(X <= k) for k (up to 1e6, or n) of n trials with chance p (0 to 1) each; 0 below 0. Terms by recurrence. */
export function binomialCdf(k: number, n: number, p: number): number {
  mustFit({ n: [n, 0, MOST_TRIALS], k: [k, -1, MOST_TRIALS], p: [p, 0, 1] })
  if (k < 0) return 0
  if (k >= n || p === 0) return 1
  if (p === 1) return 0
  mustFit({ k: [k, 0, 1e6] })
  const odds = Math.log(p) - Math.log1p(-p)
  let log = n * Math.log1p(-p)
  let sum = Math.exp(log)
  for (let i = 1; i <= k; i++) {
    log += Math.log((n - i + 1) / i) + odds
    sum += Math.exp(log)
  }
  return Math.min(1, sum)
}

/** Garwood's exact two-sided interval for the mean of a whole count `n`, 0 to 10,000, at this confidence (0 to 1). */
export function poissonInterval(n: number, confidence = 0.95): Interval {
  mustFit({ n: [whole(n), 0, MOST_COUNTED], confidence: [confidence, ...CONFIDENCE] })
  const tail = (1 - confidence) / 2
  const top = n + 10 * Math.sqrt(n + 1) + 40
  return {
    low: n === 0 ? 0 : crossing((m) => 1 - poissonCdf(n - 1, m) - tail, 0, top),
    high: crossing((m) => tail - poissonCdf(n, m), 0, top),
  }
}

/**
 * Clopper-Pearson's exact two-sided interval for whole `k` of `n`, n of 1 or more, at this confidence (0 to 1). k or
 * what is left of n at most 10,000: of the two the lesser is counted through.
 */
export function clopperPearson(k: number, n: number, confidence = 0.95): Interval {
  mustFit({
    n: [whole(n), 1, MOST_TRIALS],
    k: [whole(k), 0, n],
    confidence: [confidence, ...CONFIDENCE],
  })
  if (k > n - k) {
    const { low, high } = clopperPearson(n - k, n, confidence)
    return { low: 1 - high, high: 1 - low }
  }
  mustFit({ k: [k, 0, MOST_COUNTED] })
  const tail = (1 - confidence) / 2
  return {
    low: k === 0 ? 0 : crossing((p) => 1 - binomialCdf(k - 1, n, p) - tail, 0, 1),
    high: crossing((p) => tail - binomialCdf(k, n, p), 0, 1),
  }
}

const whole = (count: number): number => (Number.isInteger(count) ? count : Number.NaN)
