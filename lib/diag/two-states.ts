/**
 * What a meter can tell apart, before it is used: how far two states of a part must lie asunder to be known from
 * each other at 5 of 100 wrong either way, the old four-to-one rule, and the risks of accepting by a limit
 * (JCGM 106:2012 clauses 8 and 9). All figures in one unit.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'
import { between, ONE_SIDED_95, phi } from './normal'

const MOST = 1e9

/**
 * Bad states that can be told from a good one: at or below `below`, at or above `above`, each 3.29 u away (5 of 100
 * wrong either way, normal). One unit, good within +-1e9, u 0 to 1e9. Answers the first field that lies outside.
 */
export function separableFrom(
  good: number,
  standardU: number,
): Result<{ below: number; above: number }, FigureProblem> {
  const problem = unfit({ good: [good, -MOST, MOST], standardU: [standardU, 0, MOST] })
  if (problem !== null) return fail(problem)
  const apart = 2 * ONE_SIDED_95 * standardU
  return ok({ below: good - apart, above: good + apart })
}

/**
 * Largest u by the four-to-one rule: U = 2 u at most a quarter of the half tolerance, 0 to 1e9 (common practice).
 * Answers the half tolerance where it lies outside.
 */
export function fourToOneU(halfTolerance: number): Result<number, FigureProblem> {
  const problem = unfit({ halfTolerance: [halfTolerance, 0, MOST] })
  return problem === null ? ok(halfTolerance / 8) : fail(problem)
}

/** Parts as they come (normal, about the middle of the limits) and the meter; acceptance within +-`accept`. */
export type Inspection = {
  /** All in one unit: half tolerance and acceptance 0 to 1e9, both u 1e-12 to 1e9. */
  halfTolerance: number
  processU: number
  meterU: number
  accept: number
}

/** Shares of all parts, 0 to 1. */
export type InspectionRisks = {
  conforming: number
  /** Bad and accepted. */
  consumer: number
  /** Good and refused. */
  producer: number
}

/** Strips of the quadrature between two bends; Simpson within +-9 process u, right to about 1e-10. */
const STRIPS = 1000
/** Where a normal has ended, in standard deviations. */
const ENDS = 9

/** The risks of an acceptance limit over all parts (JCGM 106 clause 9). Both u above 0. */
export function inspectionRisks(inspection: Inspection): Result<InspectionRisks, FigureProblem> {
  const { halfTolerance, processU, meterU, accept } = inspection
  const problem = unfit({
    halfTolerance: [halfTolerance, 0, MOST],
    processU: [processU, 1e-12, MOST],
    meterU: [meterU, 1e-12, MOST],
    accept: [accept, 0, MOST],
  })
  if (problem !== null) return fail(problem)
  const accepted = (value: number): number =>
    between((-accept - value) / meterU, (accept - value) / meterU)
  const weight = (value: number): number =>
    Math.exp(-((value / processU) ** 2) / 2) / (processU * Math.sqrt(2 * Math.PI))
  const far = ENDS * processU
  const within = Math.min(halfTolerance, far)
  // The chance of acceptance turns within some meter u of the limit; strips begin and end there.
  const bends = [accept - ENDS * meterU, accept, accept + ENDS * meterU]
  const consumer = 2 * integral((x) => weight(x) * accepted(x), [within, far, ...bends])
  const producer = 2 * integral((x) => weight(x) * (1 - accepted(x)), [0, within, ...bends])
  return ok({ conforming: 1 - 2 * phi(-halfTolerance / processU), consumer, producer })
}

/** The integral from the first point to the second, by parts at those of the others that lie between. */
function integral(
  f: (x: number) => number,
  [from, to, ...bends]: [number, number, ...number[]],
): number {
  const cuts = [from, ...bends.filter((x) => x > from && x < to).sort((a, b) => a - b), to]
  return cuts.slice(1).reduce((sum, next, i) => sum + simpson(f, cuts[i] ?? from, next), 0)
}

function simpson(f: (x: number) => number, from: number, to: number): number {
  const step = (to - from) / STRIPS
  let sum = f(from) + f(to)
  for (let i = 1; i < STRIPS; i++) sum += (i % 2 === 1 ? 4 : 2) * f(from + i * step)
  return Math.max(0, (sum * step) / 3)
}
