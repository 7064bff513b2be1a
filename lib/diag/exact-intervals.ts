/**
 * Exact intervals for counts: Garwood (1936) for Poisson, Clopper and Pearson (1934) for the binomial.
 * Both by bisection on the distribution function itself: no special functions, right to about 1e-12.
 */
import { AppError } from '@/lib/model/result'
import { crossing } from './bisection'

export type Interval = { low: number; high: number }

/** P(X <= k) for a Poisson count of this mean; 0 below 0. Sums terms by recurrence from the largest. */
export function poissonCdf(k: number, mean: number): number {
  if (k < 0) return 0
  if (mean <= 0) return 1
  let sum = 0
  for (let i = 0; i <= k; i++) sum += Math.exp(i * Math.log(mean) - mean - logFactorial(i))
  return Math.min(1, sum)
}

/** P(X <= k) for k of n trials with chance p each. */
export function binomialCdf(k: number, n: number, p: number): number {
  if (k < 0) return 0
  if (k >= n) return 1
  if (p <= 0) return 1
  if (p >= 1) return 0
  const lp = Math.log(p)
  const lq = Math.log1p(-p)
  let sum = 0
  for (let i = 0; i <= k; i++)
    sum += Math.exp(logFactorial(n) - logFactorial(i) - logFactorial(n - i) + i * lp + (n - i) * lq)
  return Math.min(1, sum)
}

/** Garwood's exact two-sided interval for the mean of a Poisson count `n` from 0 at this confidence (0 to 1). */
export function poissonInterval(n: number, confidence = 0.95): Interval {
  mustBe(n >= 0 && Number.isFinite(n), { n })
  mustBe(confidence > 0 && confidence < 1, { confidence })
  const tail = (1 - confidence) / 2
  const top = n + 10 * Math.sqrt(n + 1) + 40
  return {
    low: n === 0 ? 0 : crossing((m) => 1 - poissonCdf(n - 1, m) - tail, 0, top),
    high: crossing((m) => tail - poissonCdf(n, m), 0, top),
  }
}

/** Clopper-Pearson's exact two-sided interval for `k` of `n`, 0 to n of 1 or more, at this confidence (0 to 1). */
export function clopperPearson(k: number, n: number, confidence = 0.95): Interval {
  mustBe(k >= 0 && k <= n && n >= 1 && Number.isFinite(n), { k, n })
  mustBe(confidence > 0 && confidence < 1, { confidence })
  const tail = (1 - confidence) / 2
  return {
    low: k === 0 ? 0 : crossing((p) => 1 - binomialCdf(k - 1, n, p) - tail, 0, 1),
    high: k === n ? 1 : crossing((p) => tail - binomialCdf(k, n, p), 0, 1),
  }
}

/** Callers parse first: rate-comparison.ts answers a typed figure with its field. */
function mustBe(holds: boolean, context: Record<string, number>): void {
  if (!holds) throw new AppError('figureOutOfRange', { context })
}

function logFactorial(n: number): number {
  for (let i = logs.length; i <= n; i++) logs.push((logs[i - 1] ?? 0) + Math.log(i))
  return logs[n] ?? 0
}
const logs: number[] = [0]
