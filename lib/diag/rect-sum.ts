/**
 * The sum of independent rectangular errors, exactly: the distribution of a sum of n uniforms by inclusion
 * and exclusion over its 2^n corners (n! prod 2a_i F(x) = sum of signs x (x + corner)_+^n). Widths below a
 * ten-thousandth of the widest are left out: they move nothing shown and would only cancel digits.
 */

/** P(sum <= x) for independent errors spread evenly over +-a for each half-width a; a step at 0 without any. */
export function rectSumCdf(halfWidths: readonly number[], x: number): number {
  const widest = Math.max(0, ...halfWidths)
  const widths = halfWidths.filter((a) => a > widest * 1e-4).slice(0, 8)
  if (widths.length === 0) return x < 0 ? 0 : 1
  const reach = widths.reduce((sum, a) => sum + a, 0)
  if (x <= -reach) return 0
  if (x >= reach) return 1
  if (x > 0) return 1 - rectSumCdf(widths, -x)
  let sum = 0
  for (let corner = 0; corner < 2 ** widths.length; corner++) {
    const { at, sign } = cornerOf(widths, corner)
    if (x + at > 0) sum += sign * (x + at) ** widths.length
  }
  const scale = widths.reduce((product, a, i) => product * 2 * a * (i + 1), 1)
  return Math.min(1, Math.max(0, sum / scale))
}

function cornerOf(widths: readonly number[], corner: number): { at: number; sign: number } {
  let at = 0
  let sign = 1
  widths.forEach((a, i) => {
    const minus = (corner >> i) & 1
    at += minus === 1 ? -a : a
    if (minus === 1) sign = -sign
  })
  return { at, sign }
}
