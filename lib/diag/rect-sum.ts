/**
 * The sum of independent rectangular errors, exactly: its density is a univariate box spline, reckoned by the
 * recurrence of de Boor and Hollig (J. d'Analyse Math. 42, 1982), in which no term is negative, so that no digits
 * cancel however unlike the widths are. The distribution is that density with one more width that reaches across
 * them all. Three to the power of the widths in steps: at most the ten widest are taken, more than any budget has.
 */
import { AppError } from '@/lib/model/result'

const MOST_WIDTHS = 10

/**
 * P(sum <= x) for independent errors spread evenly over +-a for each half-width a; a step at 0 without any. Throws
 * AppError `badNumber` for what is no number.
 */
export function rectSumCdf(halfWidths: readonly number[], x: number): number {
  if (Number.isNaN(x) || !halfWidths.every(Number.isFinite)) throw new AppError('badNumber')
  const widest = Math.max(0, ...halfWidths)
  const widths = halfWidths
    .filter((a) => a > widest * 1e-12)
    .sort((a, b) => b - a)
    .slice(0, MOST_WIDTHS)
    .map((a) => (2 * a) / widest)
  if (widths.length === 0) return x < 0 ? 0 : 1
  const reach = widths.reduce((sum, w) => sum + w, 0)
  const from = x / widest + reach / 2
  if (from <= 0) return 0
  if (from >= reach) return 1
  // Past the middle by its mirror image, so that small chances on either side keep their digits.
  if (from > reach / 2) return 1 - rectSumCdf(halfWidths, -x)
  return Math.min(1, reach * boxSpline([...widths, reach], from))
}

/** The density at x of the sum of errors spread evenly over 0 to w, for two or more widths. */
function boxSpline(widths: readonly number[], x: number): number {
  const all = 2 ** widths.length - 1
  const known = new Map<number, number>()
  const lengths = subsetSums(widths)
  const at = (left: number, taken: number): number => {
    const y = x - (lengths[taken] ?? 0)
    const length = lengths[left] ?? 0
    if (y < 0 || y >= length) return 0
    if ((left & (left - 1)) === 0) return 1 / length
    const key = left * (all + 1) + taken
    const before = known.get(key)
    if (before !== undefined) return before
    const t = y / length
    let sum = 0
    let count = 0
    for (let i = 0; i < widths.length; i++) {
      const bit = 1 << i
      if ((left & bit) === 0) continue
      count++
      sum += t * at(left & ~bit, taken) + (1 - t) * at(left & ~bit, taken | bit)
    }
    known.set(key, sum / (count - 1))
    return sum / (count - 1)
  }
  return at(all, 0)
}

function subsetSums(widths: readonly number[]): Float64Array {
  const sums = new Float64Array(2 ** widths.length)
  for (let i = 0; i < widths.length; i++)
    for (let set = 0; set < 2 ** i; set++) sums[set + 2 ** i] = (sums[set] ?? 0) + (widths[i] ?? 0)
  return sums
}
