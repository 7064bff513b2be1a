/**
 * The plan: the cheapest next step by the expected cost of the whole rest of the job, what it would decide, the
 * runner-up and the difference (engine.md 2). Where a notice says that more than one fault is likely, or that
 * the fault may not be in the list, it plans one action ahead only (rule R5).
 */
import type { Caution } from '@/lib/model/code-book'
import { NOTICE_ABOVE } from './belief'
import { SOMETHING_ELSE } from './book-index'
import type { Case } from './case'
import { type Candidate, lookAhead } from './look-ahead'
import type { Outcome } from './outlook'
import { type Kind, type LeftOut, type Means, minutesHere } from './plan-means'
import { fixedFaults, type PlanModel, planModel, TEST_RUN_MINUTES } from './plan-model'
import { kindOf, type PlanOutcome, planOutcomes, stepName } from './plan-outcomes'
import type { Action } from './search-moves'
import { leftOf, openOf, type Problem, problemOf, weightsOf } from './search-problem'
import { type NextAction, nextAction, oneAhead, outcomesAhead } from './troubleshoot'

export type { LeftOut, Means }

/** A step with the expected cost of the whole rest of the job when it is done next. */
export type PlannedAction = {
  type: Kind
  id: string
  name: string
  minutes: number
  expectedCostMinor: number
  /** Null where the book does not say: of a swap, a repair and a way out. */
  tools: string[] | null
  people: number
  caution: Caution | null
}

/** What to do next, its price, what else could be done and what was left out; money in minor units. */
export type Plan = {
  next: PlannedAction
  runnerUp: PlannedAction | null
  differenceMinor: number
  /** The two cost the same to within one minor unit. */
  equal: boolean
  /** How much cheaper the best plan could at most be, in minor units; 0 when it was searched to the end. */
  gap: number
  leftOut: LeftOut[]
  others: PlannedAction[]
  /** What the next step decides, in one plain sentence. */
  decides: string
  /** What each outcome of the next step leads to; empty for a way out, and while a fix is to be proved. */
  outcomes: PlanOutcome[]
  /** `prove`: a fix is in and the fault was not seen since; what is left is the proof run. */
  stage: 'find' | 'prove'
}

/** The next step for a case with these means. Stops are always there, so there always is one. */
export function nextStep(c: Case, means: Means): Plan {
  const built = planModel(c, means)
  const proving = fixInProof(c)
  if (proving !== null) return provePlan(c, { means, built, fault: proving })
  const problem = problemOf(built.model)
  const spot = {
    w: weightsOf(built.model, problem, built.state),
    ...leftOf(problem, built.state),
    open: openOf(built.model, built.state),
    elapsed: 0,
  }
  const { twoOrMore, only } = built.reckoning.last
  const at = built.reckoning.suspects.findIndex((s) => s.fault === SOMETHING_ELSE)
  const oneStep = twoOrMore > NOTICE_ABOVE || (only[at] ?? 0) > NOTICE_ABOVE
  const ranked = lookAhead(problem, spot, oneStep ? 0 : undefined)
  const best = oneStep ? oneAhead({ problem, spot }, ranked) : nextAction(built.model, built.state)
  const rows = inOrder(
    c,
    rowsOf(c, best),
    ranked.map((r) => rowOf(c, problem, r)),
  )
  const planned = rows.map((r) => plannedAction(c, means, r))
  const [next, runnerUp = null, ...others] = planned
  const chosen =
    next ?? plannedAction(c, means, { type: 'stop', id: 'tow', cost: means.shop.towMinor })
  const differenceMinor =
    runnerUp === null ? 0 : runnerUp.expectedCostMinor - chosen.expectedCostMinor
  // The step put first for its safety is not the one that was searched for: its outcomes are looked up.
  const leads =
    chosen.id === best.id
      ? best.outcomes
      : outcomesAhead({ problem, spot }, placeOf(problem, chosen), oneStep ? 0 : undefined)
  return {
    next: chosen,
    runnerUp,
    differenceMinor,
    equal: runnerUp !== null && Math.abs(differenceMinor) < 1,
    gap: best.gap,
    leftOut: built.leftOut,
    others,
    decides: decidesWords(c, built, chosen),
    outcomes: planOutcomes(c, chosen, leads),
    stage: 'find',
  }
}

type Row = { type: Kind; id: string; cost: number }

const rowOf = (c: Case, problem: Problem, { type, index, cost }: Candidate): Row => {
  const list = { check: problem.checks, repair: problem.repairs, stop: problem.stops }[type]
  return { ...kindOf(c, { type, id: list[index]?.id ?? '' }), cost }
}

/** Where a step stands in the problem. */
function placeOf(problem: Problem, { type, id }: PlannedAction): Action {
  const kind = type === 'swap' ? 'check' : type
  const list = { check: problem.checks, repair: problem.repairs, stop: problem.stops }[kind]
  return { type: kind, index: list.findIndex((one) => one.id === id) }
}

/** The two best by the search; behind them stand the costs of plans that the look-ahead found. */
function rowsOf(c: Case, { type, id, expectedCost, runnerUp }: NextAction): Row[] {
  const best = { ...kindOf(c, { type, id }), cost: expectedCost }
  return runnerUp === null
    ? [best]
    : [best, { ...kindOf(c, runnerUp), cost: runnerUp.expectedCost }]
}

/** Best first; among equals a check that costs nothing and carries no caution goes before the rest. */
function inOrder(c: Case, best: readonly Row[], ranked: readonly Row[]): Row[] {
  const seen = new Set(best.map((r) => `${r.type}:${r.id}`))
  const least = best[0]?.cost ?? 0
  const rest = ranked.filter((r) => !seen.has(`${r.type}:${r.id}`) && Number.isFinite(r.cost))
  const rows = [...best, ...rest.map((r) => ({ ...r, cost: Math.max(r.cost, least) }))]
  const safe = (r: Row) =>
    r.type === 'check' && c.index.checks.get(r.id)?.costMinor === 0 && cautionOf(c, r) === null
  const [a, b] = rows
  if (a !== undefined && b !== undefined && b.cost - a.cost < 1 && safe(b) && !safe(a))
    return [b, a, ...rows.slice(2)]
  return rows
}

function plannedAction(c: Case, means: Means, row: Row): PlannedAction {
  const check = row.type === 'check' ? c.index.checks.get(row.id) : undefined
  const swap = row.type === 'swap' ? c.index.swaps.get(row.id) : undefined
  const repair = row.type === 'repair' ? c.index.faults.get(row.id)?.repair : undefined
  const testRun = row.type === 'repair' ? TEST_RUN_MINUTES : 0
  const minutes = (check ?? swap ?? repair)?.minutes ?? 0
  return {
    type: row.type,
    id: row.id,
    name: stepName(c, row),
    minutes: minutesHere(minutes + testRun, means),
    expectedCostMinor: row.cost,
    tools: check?.tools.map((t) => t.tool) ?? null,
    people: check === undefined ? 1 : Math.min(check.people, means.people),
    caution: cautionOf(c, row),
  }
}

const SEVERITY = ['DANGER', 'WARNING', 'CAUTION', 'NOTICE']

/** The gravest caution of a check or swap (ANSI Z535.6 order); null where the book has none. */
function cautionOf(c: Case, { type, id }: Pick<Row, 'type' | 'id'>): Caution | null {
  const item =
    type === 'check' ? c.index.checks.get(id) : type === 'swap' ? c.index.swaps.get(id) : undefined
  const all = [...(item?.cautions ?? []), ...(item?.steps ?? []).flatMap((s) => s.caution ?? [])]
  all.sort((a, b) => SEVERITY.indexOf(a.signal) - SEVERITY.indexOf(b.signal))
  return all[0] ?? null
}

function decidesWords(c: Case, built: PlanModel, next: PlannedAction): string {
  const outcomes = built.outlooks.get(`${next.type}:${next.id}`)
  if (outcomes !== undefined) return outcomeWords(c, outcomes)
  if (next.type === 'repair') {
    const chance = chanceOf(built, next.id)
    return `It cures the machine if that is the fault: ${of100(chance)} of 100 by what is known; the test run tells.`
  }
  return 'Nothing at hand is expected to cost less than this way out.'
}

function outcomeWords(c: Case, outcomes: readonly Outcome[]): string {
  const likely = outcomes.filter((o) => o.probability >= 0.05)
  const parts = likely.map((o) => {
    const [fault = SOMETHING_ELSE, chance = 0] = topOf(o.chances)
    const name = c.index.faults.get(fault)?.name ?? 'Something else'
    return `"${o.name}" (${of100(o.probability)} of 100): ${name} stands at ${of100(chance)}`
  })
  return `${parts.join('; ')}.`
}

const of100 = (p: number): number => Math.round(100 * p)

const topOf = (chances: Record<string, number>): [string, number] | [] =>
  Object.entries(chances).reduce<[string, number] | []>(
    (best, [fault, p]) => (p > (best[1] ?? -1) ? [fault, p] : best),
    [],
  )

function chanceOf({ reckoning }: PlanModel, fault: string): number {
  const at = reckoning.suspects.findIndex((s) => s.fault === fault)
  return reckoning.last.marginals[at] ?? 0
}

/** The fault whose fix is in and was not seen to fail since; null before any fix. */
function fixInProof(c: Case): string | null {
  const at = c.entries.findLastIndex(({ body }) => body.kind === 'fix')
  if (at < 0) return null
  const failed = c.entries
    .slice(at + 1)
    .some(({ body }) => body.kind === 'proofRun' && body.faults > 0)
  return failed ? null : (fixedFaults(c).at(-1) ?? null)
}

function provePlan(
  c: Case,
  { means, built, fault }: { means: Means; built: PlanModel; fault: string },
): Plan {
  const name = c.index.faults.get(fault)?.name ?? fault
  const minutes = minutesHere(TEST_RUN_MINUTES, means)
  const next: PlannedAction = {
    type: 'repair',
    id: fault,
    name: `Prove the fix: ${name}`,
    minutes,
    expectedCostMinor: minutes * means.shop.perMinuteMinor,
    tools: null,
    people: 1,
    caution: null,
  }
  const decides = 'The fix is in: the proof run shows whether it holds.'
  return {
    next,
    runnerUp: null,
    differenceMinor: 0,
    equal: false,
    gap: 0,
    leftOut: built.leftOut,
    others: [],
    decides,
    outcomes: [],
    stage: 'prove',
  }
}
