/**
 * Exact intervals for counts: Garwood (1936) for Poisson, Clopper and Pearson (1934) for the binomial.
 * Both by bisection on the distribution function itself: no special functions, right to about 1e-12.
 */
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

/** Garwood's exact two-sided interval for the mean of a Poisson count `n` at this confidence (0 to 1). */
export function poissonInterval(n: number, confidence = 0.95): Interval {
  const tail = (1 - confidence) / 2
  const top = n + 10 * Math.sqrt(n + 1) + 40
  return {
    low: n === 0 ? 0 : root((m) => 1 - poissonCdf(n - 1, m) - tail, 0, top),
    high: root((m) => tail - poissonCdf(n, m), 0, top),
  }
}

/** Clopper-Pearson's exact two-sided interval for `k` of `n` at this confidence (0 to 1). */
export function clopperPearson(k: number, n: number, confidence = 0.95): Interval {
  const tail = (1 - confidence) / 2
  return {
    low: k === 0 ? 0 : root((p) => 1 - binomialCdf(k - 1, n, p) - tail, 0, 1),
    high: k === n ? 1 : root((p) => tail - binomialCdf(k, n, p), 0, 1),
  }
}

/** Smallest stock s with P(demand <= s) at least `service`, for Poisson demand of this mean (Palm). */
export function spareStock(mean: number, service: number): number {
  let s = 0
  // The sum may stop a rounding short of 1: past the mean, a step that adds nothing is the last.
  for (let sum = poissonCdf(s, mean); sum < service; s++) {
    const next = poissonCdf(s + 1, mean)
    if (s > mean && next <= sum) break
    sum = next
  }
  return s
}

/** Expected back-orders at stock s for Poisson demand of this mean: EBO(s+1) = EBO(s) - P(X > s). */
export function expectedBackOrders(stock: number, mean: number): number {
  let ebo = mean
  for (let s = 0; s < stock; s++) ebo -= 1 - poissonCdf(s, mean)
  return ebo
}

function logFactorial(n: number): number {
  for (let i = logs.length; i <= n; i++) logs.push((logs[i - 1] ?? 0) + Math.log(i))
  return logs[n] ?? 0
}
const logs: number[] = [0]

/** Where an increasing function crosses zero between `from` and `to`. */
function root(f: (x: number) => number, from: number, to: number): number {
  let low = from
  let high = to
  for (let i = 0; i < 200; i++) {
    const middle = (low + high) / 2
    if (f(middle) < 0) low = middle
    else high = middle
  }
  return (low + high) / 2
}
