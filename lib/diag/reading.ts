/**
 * Verdicts on readings after JCGM 100, JCGM 106 clause 7 and the decision rule of ISO 14253-1 (k = 2): `in`
 * or `out` only when the whole of estimate +-U lies inside or outside the limits, else `tooClose`. The chance
 * shown is the normal one; the exact one convolves the rectangles of the budget.
 */

import type { FigureProblem } from './figure-bounds'
import { between, ONE_SIDED_95, phi, TWO_SIDED_95 } from './normal'
import { type Advice, adviceFor, figure } from './reading-advice'
import {
  type BudgetLine,
  budgetOf,
  kelvinsOutside,
  limitsOf,
  type ReadingInput,
  rectangles,
  SOURCES,
} from './reading-budget'
import { problemWords, readingProblem } from './reading-problem'
import { rectSumCdf } from './rect-sum'

export type { Advice, BudgetLine, ReadingInput }

/** The whole of +-U within the limits, outside them on a side, or neither (ISO 14253-1). */
export type Verdict = 'in' | 'outLow' | 'outHigh' | 'tooClose'

/** What a reading says; figures in the kept unit of its quantity. */
export type ReadingResult = {
  estimate: number
  standardU: number
  /** k = 2. */
  expandedU: number
  budget: BudgetLine[]
  /** null when nothing says where the limits lie. */
  verdict: Verdict | null
  /** Chance (0 to 1) that the part lies within the limits: normal, and with the exact rectangles. */
  conformance: number | null
  conformanceExact: number | null
  /** Every part that could show this reading, worst case; `high` null over range. */
  span: { low: number; high: number | null }
  limits: { low: number | null; high: number | null } | null
  /** From the estimate to the nearest limit: above 0 inside, below 0 outside. */
  toLimit: number | null
  /** What would let a meter decide; empty when this reading does. */
  wouldDecide: Advice[]
  /** The first field that cannot be; then there is no verdict, and every figure is 0 or null. */
  problem: FigureProblem | null
}

/** Whether a meter can decide a figure at all, said before the panel comes off. */
export type MeterFitness = {
  decides: boolean
  words: string
  /** Largest u at which a reading in the middle reaches 95 %; null for one limit without a nominal value. */
  standardUNeeded: number | null
  standardUHas: number
  because: string[]
  wouldDecide: Advice[]
}

/**
 * The verdict on one reading with its whole budget. Over range (`OL`) the value is the top of the range. A reading
 * that cannot be has no verdict and names its `problem`.
 */
export function judge(input: ReadingInput): ReadingResult {
  const problem = readingProblem(input)
  if (problem !== null) return { ...NO_RESULT, problem }
  const { estimate, lines, standardU, worst } = budgetOf(input)
  const limits = limitsOf(input.spec)
  const expandedU = 2 * standardU
  const at = { estimate, standardU, overRange: input.overRange }
  const verdict = limits === null ? null : verdictOf(at, limits)
  return {
    estimate,
    standardU,
    expandedU,
    budget: lines,
    verdict,
    conformance: limits === null ? null : normalChance(at, limits, verdict),
    conformanceExact: limits === null ? null : exactChance(at, limits, { lines, verdict }),
    span: { low: estimate - worst, high: input.overRange ? null : estimate + worst },
    limits,
    toLimit: limits === null ? null : distance(estimate, limits),
    wouldDecide: verdict === 'tooClose' ? adviceFor(input) : [],
    problem: null,
  }
}

const NO_RESULT: Omit<ReadingResult, 'problem'> = {
  estimate: 0,
  standardU: 0,
  expandedU: 0,
  budget: [],
  verdict: null,
  conformance: null,
  conformanceExact: null,
  span: { low: 0, high: null },
  limits: null,
  toLimit: null,
  wouldDecide: [],
}

/**
 * What this meter can say about a figure before it is read, judged where a part in the middle would read. A meter
 * outside 18 to 28 C is told to be warmed even where it decides (rule R7).
 */
export function canDecide(input: Omit<ReadingInput, 'value' | 'overRange'>): MeterFitness {
  const limits = limitsOf(input.spec)
  const middle = middleOf(input.spec)
  const asRead = readingAt(input, middle ?? 0)
  const problem = readingProblem(asRead)
  if (problem !== null)
    return { ...NOT_FIT, words: `This meter cannot be judged: ${problemWords(problem)}` }
  const { standardU } = budgetOf(asRead)
  const needed = neededFor(input.spec)
  const decides = limits !== null && (needed === null || standardU <= needed)
  const unit = input.spec?.unit ?? ''
  return {
    decides,
    words: fitnessWords({ decides, standardU, unit, hasLimits: limits !== null, needed }),
    standardUNeeded: needed,
    standardUHas: standardU,
    because: decides ? [] : reasons(asRead, needed),
    wouldDecide: adviceFor(asRead).filter((a) => !decides || a.way === 'warmMeter'),
  }
}

const NOT_FIT: Omit<MeterFitness, 'words'> = {
  decides: false,
  standardUNeeded: null,
  standardUHas: 0,
  because: [],
  wouldDecide: [],
}

/** The largest u that reaches 95 % with the reading in the middle (JCGM 106); null when no middle is known. */
export function neededFor(spec: ReadingInput['spec']): number | null {
  const limits = limitsOf(spec)
  if (limits === null) return null
  const { low, high } = limits
  if (low !== null && high !== null) return (high - low) / 2 / TWO_SIDED_95
  const nominal = spec?.nominal ?? null
  const only = low ?? high
  return nominal === null || only === null ? null : Math.abs(nominal - only) / ONE_SIDED_95
}

/** The zone of estimates that prove at least 95 % at each limit: [low + 1.645 u, high - 1.645 u]; null if empty. */
export function acceptZone(
  limits: { low: number; high: number },
  standardU: number,
): { low: number; high: number } | null {
  const guard = ONE_SIDED_95 * standardU
  const zone = { low: limits.low + guard, high: limits.high - guard }
  return zone.low <= zone.high ? zone : null
}

type At = { estimate: number; standardU: number; overRange: boolean }
type Limits = { low: number | null; high: number | null }

function verdictOf({ estimate, standardU, overRange }: At, { low, high }: Limits): Verdict {
  const from = estimate - 2 * standardU
  const to = overRange ? Number.POSITIVE_INFINITY : estimate + 2 * standardU
  if (high !== null && from > high) return 'outHigh'
  if (low !== null && to < low) return 'outLow'
  const aboveLow = low === null || from >= low
  const belowHigh = high === null || to <= high
  return aboveLow && belowHigh ? 'in' : 'tooClose'
}

function normalChance(at: At, limits: Limits, verdict: Verdict | null): number | null {
  if (at.overRange) return overRangeChance(verdict)
  const low = limits.low ?? Number.NEGATIVE_INFINITY
  const high = limits.high ?? Number.POSITIVE_INFINITY
  if (at.standardU === 0) return at.estimate >= low && at.estimate <= high ? 1 : 0
  const a = (low - at.estimate) / at.standardU
  const b = (high - at.estimate) / at.standardU
  if (limits.low === null) return phi(b)
  return limits.high === null ? phi(-a) : between(a, b)
}

function exactChance(
  at: At,
  limits: Limits,
  { lines, verdict }: { lines: readonly BudgetLine[]; verdict: Verdict | null },
): number | null {
  if (at.overRange) return overRangeChance(verdict)
  const widths = rectangles(lines)
  const below = limits.high === null ? 1 : rectSumCdf(widths, limits.high - at.estimate)
  const under = limits.low === null ? 0 : rectSumCdf(widths, limits.low - at.estimate)
  return Math.max(0, below - under)
}

const overRangeChance = (verdict: Verdict | null): number | null =>
  verdict === 'outHigh' ? 0 : verdict === 'in' ? 1 : null

function distance(estimate: number, { low, high }: Limits): number | null {
  const sides = [low === null ? null : estimate - low, high === null ? null : high - estimate]
  const known = sides.filter((d) => d !== null)
  return known.length === 0 ? null : Math.min(...known)
}

/** The value in the middle of the limits, or the nominal one, or the only limit. */
export function middleOf(spec: ReadingInput['spec']): number | null {
  const limits = limitsOf(spec)
  if (spec?.nominal !== null && spec?.nominal !== undefined) return spec.nominal
  if (limits === null) return null
  const { low, high } = limits
  if (low !== null && high !== null) return (low + high) / 2
  return low ?? high
}

/** The input as it would stand with a part of this true value under the probes. */
function readingAt(
  input: Omit<ReadingInput, 'value' | 'overRange'>,
  trueValue: number,
): ReadingInput {
  const leads =
    input.quantity === 'resistance' && !input.nulled
      ? (input.leadsOhm.low + input.leadsOhm.high) / 2
      : 0
  const partTempC = input.partTempC ?? input.spec?.partTempC ?? null
  return { ...input, value: trueValue + leads, overRange: false, partTempC }
}

function fitnessWords(said: {
  decides: boolean
  standardU: number
  unit: string
  hasLimits: boolean
  needed: number | null
}): string {
  const spread = `+-${figure(2 * said.standardU)} ${said.unit}`
  if (!said.hasLimits) return 'No limits are known for this figure, so no reading can be judged.'
  if (!said.decides)
    return `This meter cannot decide this spec: it reads ${spread} (k = 2), and a reading in the middle needs +-${figure(2 * (said.needed ?? 0))} ${said.unit} to reach 95 %.`
  if (said.needed === null)
    return `This meter reads ${spread} (k = 2) here; nearer to the limit than that is too close to call.`
  return `This meter can decide this spec: it reads ${spread} (k = 2).`
}

function reasons(asRead: ReadingInput, needed: number | null): string[] {
  const { lines } = budgetOf(asRead)
  const unit = asRead.spec?.unit ?? ''
  const said = lines.map((line) => {
    const share = Math.round(line.share * 100)
    return `${line.source}: +-${figure(line.halfWidth)} ${unit}, ${share} % of the variance${detail(line.source, asRead)}`
  })
  if (needed === null) return said
  return [...said, `The spec leaves room for u = ${figure(needed)} ${unit} at most`]
}

function detail(source: string, { meterFunction: m, leadsOhm, meterTempC }: ReadingInput): string {
  if (source === SOURCES.meter) return ` (${m.percent} % + ${m.digits} digits of ${m.resolution})`
  if (source === SOURCES.leads) return ` (${leadsOhm.low} to ${leadsOhm.high} ohm, not nulled)`
  if (source === SOURCES.meterTemp) return ` (${kelvinsOutside(meterTempC)} K outside 18 to 28 C)`
  return ''
}
