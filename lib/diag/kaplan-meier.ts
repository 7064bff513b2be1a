/**
 * How long parts last, without assuming a shape: Kaplan and Meier (1958), with Greenwood's standard error (1926).
 * A part still running, or taken out for another reason, is censored: it counts as at risk up to its time and as
 * no failure. At equal times failures come before censored ones.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { eachWithin, type FigureProblem, mustFit, unfit } from './figure-bounds'

/** One part's life in any one unit (hours, days, kilometres), and whether it ended by the failure meant. */
export type Life = { time: number; failed: boolean }

/** Survival just after a time of failure. */
export type SurvivalStep = {
  time: number
  atRisk: number
  failures: number
  /** Share 0 to 1 that lasts longer. */
  survival: number
  /** Greenwood's; null once nothing survives, where it has no value. */
  standardError: number | null
}

/** `noLives`: an empty list has no curve. */
export type LivesProblem = FigureProblem | { kind: 'noLives' }

/** The curve as steps at the times of failure, first to last; empty when every life is censored. Times from 0. */
export function kaplanMeier(lives: readonly Life[]): Result<SurvivalStep[], LivesProblem> {
  if (lives.length === 0) return fail({ kind: 'noLives' })
  const problem = timesProblem(lives)
  if (problem !== null) return fail(problem)
  const steps: SurvivalStep[] = []
  let survival = 1
  let sum = 0
  for (const { time, atRisk, failures } of failureTimes(lives)) {
    survival *= 1 - failures / atRisk
    sum += atRisk === failures ? 0 : failures / (atRisk * (atRisk - failures))
    const standardError = atRisk === failures ? null : survival * Math.sqrt(sum)
    steps.push({ time, atRisk, failures, survival, standardError })
  }
  return ok(steps)
}

/**
 * Share still running at a time from 0, from the steps of a curve: 1 before the first failure. Past the longest life
 * it stays what it was there, where the curve says nothing more.
 */
export function survivalAt(steps: readonly SurvivalStep[], time: number): number {
  mustFit({ time: [time, 0, Number.MAX_SAFE_INTEGER] })
  return steps.findLast((step) => step.time <= time)?.survival ?? 1
}

/** Times at which lives failed, in order, with how many were at risk and how many failed there. */
export function failureTimes(
  lives: readonly Life[],
): { time: number; atRisk: number; failures: number }[] {
  const sorted = lives.toSorted((a, b) => a.time - b.time)
  const steps: { time: number; atRisk: number; failures: number }[] = []
  for (const [before, { time, failed }] of sorted.entries()) {
    const last = steps.at(-1)
    if (last?.time === time) last.failures += failed ? 1 : 0
    else steps.push({ time, atRisk: sorted.length - before, failures: failed ? 1 : 0 })
  }
  return steps.filter(({ failures }) => failures > 0)
}

/** The first time that cannot be, as field `time.1`, `time.2`...; null when all fit. */
export const timesProblem = (lives: readonly Life[], name = 'time'): FigureProblem | null =>
  unfit(
    eachWithin(
      name,
      lives.map(({ time }) => time),
      0,
      Number.MAX_SAFE_INTEGER,
    ),
  )
