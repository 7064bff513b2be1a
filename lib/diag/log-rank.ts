/**
 * Whether two groups of parts last equally long: the log-rank test (Mantel 1966). At each time of failure the
 * failures of the first group are held against the share of it among all at risk, with the hypergeometric variance.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { failureTimes, type Life, type LivesProblem, timesProblem } from './kaplan-meier'
import { erfc } from './normal'

/** Failures of the first group seen and expected, their variance, chi-square with one degree, and its p (0 to 1). */
export type LogRank = {
  observed: number
  expected: number
  variance: number
  chiSquare: number
  p: number
}

/** The test; `noComparison` when no failure falls while both groups are at risk. Times from 0. */
export function logRank(
  first: readonly Life[],
  second: readonly Life[],
): Result<LogRank, LivesProblem | { kind: 'noComparison' }> {
  if (first.length === 0 || second.length === 0) return fail({ kind: 'noLives' })
  const problem = timesProblem(first, 'first') ?? timesProblem(second, 'second')
  if (problem !== null) return fail(problem)
  const observed = first.filter(({ failed }) => failed).length
  let expected = 0
  let variance = 0
  const times = first.map(({ time }) => time).sort((x, y) => x - y)
  let ended = 0
  for (const { time, atRisk, failures } of failureTimes([...first, ...second])) {
    while ((times[ended] ?? time) < time) ended++
    const share = (first.length - ended) / atRisk
    expected += failures * share
    if (atRisk > 1)
      variance += (failures * share * (1 - share) * (atRisk - failures)) / (atRisk - 1)
  }
  if (variance <= 0) return fail({ kind: 'noComparison' })
  const chiSquare = (observed - expected) ** 2 / variance
  // With one degree of freedom chi-square is a squared normal: P = erfc(sqrt(x / 2)).
  return ok({ observed, expected, variance, chiSquare, p: erfc(Math.sqrt(chiSquare / 2)) })
}
