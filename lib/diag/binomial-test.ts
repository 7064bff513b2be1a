import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'
import { logGamma } from './log-gamma'

/**
 * Two-sided p of `k` of `n` against a share, exactly: the chance of every count that is no likelier than the one
 * seen (the method of R's exact binomial test). Whole k 0 to n, n 1 to 100,000, share 0 to 1.
 */
export function binomialP(k: number, n: number, share: number): Result<number, FigureProblem> {
  const problem = unfit({ n: [n, 1, 100_000], k: [k, 0, n], share: [share, 0, 1] })
  if (problem !== null) return fail(problem)
  if (!Number.isInteger(k)) return fail({ kind: 'notANumber', field: 'k' })
  if (!Number.isInteger(n)) return fail({ kind: 'notANumber', field: 'n' })
  const chances = Array.from({ length: n + 1 }, (_, i) => chanceOf(i, n, share))
  const seen = chances[k] ?? 0
  // Equal chances differ by rounding: R takes one ten-millionth.
  const rarer = chances.filter((chance) => chance <= seen * (1 + 1e-7))
  return ok(
    Math.min(
      1,
      rarer.reduce((sum, chance) => sum + chance, 0),
    ),
  )
}

function chanceOf(k: number, n: number, share: number): number {
  if (share === 0 || share === 1) return k === (share === 0 ? 0 : n) ? 1 : 0
  const ways = logGamma(n + 1) - logGamma(k + 1) - logGamma(n - k + 1)
  return Math.exp(ways + k * Math.log(share) + (n - k) * Math.log1p(-share))
}
