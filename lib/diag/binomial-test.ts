import { fail, ok, type Result } from '@/lib/model/result'
import { binomialCdf } from './exact-intervals'
import { type FigureProblem, unfit } from './figure-bounds'

/**
 * Two-sided p of `k` of `n` against a share, exactly: the chance of every count that is no likelier than the one
 * seen (the method of R's exact binomial test). Whole k 0 to n, n 1 to 100,000, share 0 to 1.
 */
export function binomialP(k: number, n: number, share: number): Result<number, FigureProblem> {
  const problem = unfit({ n: [n, 1, 100_000], k: [k, 0, n], share: [share, 0, 1] })
  if (problem !== null) return fail(problem)
  if (!Number.isInteger(k)) return fail({ kind: 'notANumber', field: 'k' })
  if (!Number.isInteger(n)) return fail({ kind: 'notANumber', field: 'n' })
  let before = 0
  const chances = Array.from({ length: n + 1 }, (_, i) => {
    const upTo = binomialCdf(i, n, share)
    const chance = upTo - before
    before = upTo
    return chance
  })
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
