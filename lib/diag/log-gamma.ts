/**
 * ln Gamma(x) for x > 0, right to about 1e-14: Stirling's series (Abramowitz and Stegun 6.1.41) after raising x to
 * 12 or more by Gamma(x + 1) = x Gamma(x). Own code, because the kept library for it brings some sixty packages
 * for this one function.
 */
export function logGamma(x: number): number {
  let shift = 0
  let z = x
  for (; z < 12; z++) shift += Math.log(z)
  const series = 1 / 12 / z - 1 / 360 / z ** 3 + 1 / 1260 / z ** 5 - 1 / 1680 / z ** 7
  return (z - 0.5) * Math.log(z) - z + Math.log(2 * Math.PI) / 2 + series - shift
}
