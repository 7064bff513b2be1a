/**
 * The suspect part against a good twin read by the same check (rules R7, R17): what both readings share drops out
 * of their difference, so that it is surer than either.
 */
import type { ReadingBody } from '@/lib/model/log-entry'
import { budgetOf, partTempsApart } from './reading-budget'

/** Two readings side by side, in the kept unit; each U is k = 2. */
export type TwinDifference = {
  /** Suspect less good twin, both corrected. */
  difference: number
  expandedU: number
  suspectU: number
  goodU: number
  /** Whether they read alike within U of the difference. */
  agrees: boolean
}

/** The difference of two readings that can be (reading-problem.ts), with both uncertainties and its own. */
export function twinDifference(suspect: ReadingBody, good: ReadingBody): TwinDifference {
  const [a, b] = [budgetOf(suspect), budgetOf(good)]
  return {
    difference: a.estimate - b.estimate,
    expandedU: 2 * differenceU(suspect, good),
    suspectU: 2 * a.standardU,
    goodU: 2 * b.standardU,
    agrees: agrees(suspect, good),
  }
}

/**
 * u of the difference of two readings. With the same meter and leads gain, steps and contact remain, and the
 * temperature of the parts: a hot suspect and a cold twin do not share it.
 */
export function differenceU(a: ReadingBody, b: ReadingBody): number {
  if (!sameSetUp(a, b)) return Math.hypot(budgetOf(a).standardU, budgetOf(b).standardU)
  const { percent, resolution } = a.meterFunction
  const gain = (percent / 100) * Math.abs(a.value - b.value)
  const step = resolution / 2
  const contact = a.quantity === 'resistance' ? step : 0
  const warmth = partTempsApart(a, b).reduce((sum, halfWidth) => sum + halfWidth ** 2, 0)
  return Math.sqrt((gain ** 2 + 2 * step ** 2 + contact ** 2 + warmth) / 3)
}

/** Whether suspect and twin read alike within U = 2u of their difference; over range only with over range. */
export function agrees(suspect: ReadingBody, twin: ReadingBody): boolean {
  if (suspect.overRange || twin.overRange) return suspect.overRange === twin.overRange
  const apart = Math.abs(budgetOf(suspect).estimate - budgetOf(twin).estimate)
  return apart <= 2 * differenceU(suspect, twin) + 1e-12
}

const sameSetUp = (a: ReadingBody, b: ReadingBody): boolean =>
  a.meterId === b.meterId &&
  a.nulled === b.nulled &&
  a.meterFunction.resolution === b.meterFunction.resolution &&
  a.meterFunction.percent === b.meterFunction.percent
