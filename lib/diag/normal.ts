/**
 * The normal distribution to about 1e-14 of each chance: for |x| < 1.5 the all-positive series
 * erf x = 2/sqrt(pi) e^(-x^2) sum 2^n x^(2n+1) / (2n+1)!!, beyond it the continued fraction of erfc
 * (Abramowitz and Stegun 7.1.6 and 7.1.14).
 */

/** The complementary error function, without loss in either tail. */
export function erfc(x: number): number {
  if (x < 0) return 2 - erfc(-x)
  if (x < 1.5) return 1 - erfSeries(x)
  return x > 27 ? 0 : (Math.exp(-x * x) / Math.sqrt(Math.PI)) * tailFraction(x)
}

/** The density of a standard normal Z at z. */
export const density = (z: number): number => Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI)

/** P(Z <= z) for a standard normal Z. */
export const phi = (z: number): number => erfc(-z / Math.SQRT2) / 2

/** P(a < Z <= b) for a standard normal Z, without loss when both lie in the same tail; 0 when b <= a. */
export function between(a: number, b: number): number {
  if (b <= a) return 0
  return a > 0 ? phi(-a) - phi(-b) : phi(b) - phi(a)
}

/** Two-sided 95 % and one-sided 95 % factors of the normal distribution. */
export const TWO_SIDED_95 = 1.959963984540054
/** The one-sided 95 % factor. */
export const ONE_SIDED_95 = 1.6448536269514722

function erfSeries(x: number): number {
  let term = x
  let sum = x
  for (let n = 1; n < 200 && term > sum * 1e-17; n++) {
    term *= (2 * x * x) / (2 * n + 1)
    sum += term
  }
  return (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum
}

function tailFraction(x: number): number {
  let f = 0
  for (let n = 80; n >= 1; n--) f = n / 2 / (x + f)
  return 1 / (x + f)
}
