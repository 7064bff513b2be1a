/**
 * The engine's three plain questions (engine.md 2.1): the next action, the belief behind it, and noisy-OR
 * marginals. `nextAction` searches within a limit of expansions and says how far its bounds are apart; the
 * limit is a count, never a time, so that the same input gives the same answer on every machine and later.
 */
import { AppError } from '@/lib/model/result'
import { type Candidate, leastCosts, lookAhead, type Spot, stepAfter } from './look-ahead'
import { mustBeFigures } from './model-figures'
import { noisyOrMarginals } from './noisy-or'
import { gapOf, guessOf, optionsOf, pointsAfter, solve, solveWithout, startSearch } from './search'
import { type Action, actionOf, type Search } from './search-moves'
import {
  type ActionType,
  leftOf,
  MOST_IN_MASK,
  openOf,
  type Problem,
  problemOf,
  weightsOf,
} from './search-problem'
import { dot, massOf, NO_MASS } from './search-steps'
import type { NoisyOrModel, SearchState, SingleModel } from './troubleshoot-model'

/**
 * Expansions where the caller names none, at 8 faults and 17 actions: some 35 ms (docs/performance.md). A wider
 * problem's expansions cost more, and it gets fewer; a narrower one gets as many as close it nearly always, as far
 * as 50 ms go: an expansion takes so long as there are faults times actions, and half as long again where test runs
 * can pass wrongly.
 */
const EXPANSIONS = 4000
const WIDTH = 8 * 17
const LEAST_EXPANSIONS = 100
const MOST_WORK = 560_000
const MOST_WORK_WITH_SLIPS = 500_000

/** An action by the names of the model. */
export type NamedAction = { type: ActionType; id: string }

/**
 * What an action can lead to: an outcome of a check, or for a repair `cured`, `passedWrongly` (the test run passed
 * and the fault is still there) or `failed`. `chance` is 0 to 1; `next` the action after it, null when the job is
 * over or the outcome cannot come up.
 */
export type LeadsTo = { outcome: string; chance: number; next: NamedAction | null }

/** The advised action, its expected cost, how sure that is, and what each outcome leads to. */
export type NextAction = {
  type: ActionType
  id: string
  /** Expected total cost of the whole rest of the job when this is done next. */
  expectedCost: number
  /** How much cheaper the best plan could at most be; 0 when the answer is exact. */
  gap: number
  /** The next best first action; `exact` false when its cost is that of a plan that was found, and not surely the least. */
  runnerUp: { type: ActionType; id: string; expectedCost: number; exact: boolean } | null
  /** Every outcome of the action, in the model's order; their chances sum to 1. Empty for a stop. */
  outcomes: LeadsTo[]
  expansions: number
}

/**
 * The cheapest next action from a state. `limit`: how many points may be expanded; a default by the size of what
 * is left. Throws AppError `badModel` (with the field) for unknown names and figures that cannot be, `noAction` when
 * nothing can end the job, `impossible` when the evidence cannot come about.
 */
export function nextAction(model: SingleModel, state: SearchState, limit?: number): NextAction {
  mustBeFigures(model, state)
  const problem = problemOf(model)
  const w = weightsOf(model, problem, state)
  const spot = { w, ...leftOf(problem, state), open: openOf(model, state), elapsed: state.elapsed }
  if (!(massOf(w) > 0)) throw new AppError('impossible')
  const small = Math.max(problem.checks.length, problem.repairs.length) <= MOST_IN_MASK
  if (!small) return looked({ problem, spot })
  const { found, cheapest } = searched(problem, spot, limit ?? budgetOf(problem, spot))
  if (found.gap === 0) return found
  const two = looked({ problem, spot })
  if (two.expectedCost >= cheapest) return found
  const floor = found.expectedCost - found.gap
  return { ...two, gap: two.expectedCost - floor, expansions: found.expansions }
}

/**
 * P(each fault | outcomes, and that the tried repairs were seen to fail), for kind `single`: 0 to 1, sum 1; all 0
 * when the state cannot come about. Throws AppError `badModel` for unknown names and figures that cannot be.
 */
export function posterior(model: SingleModel, state: SearchState): Record<string, number> {
  mustBeFigures(model, state)
  const w = weightsOf(model, problemOf(model), state)
  const mass = massOf(w)
  return Object.fromEntries(model.faults.map((f, i) => [f.id, mass > 0 ? (w[i] ?? 0) / mass : 0]))
}

/**
 * P(each fault | evidence) for kind `noisyor`, exact: 0 to 1 each. Throws AppError `badModel` for figures that cannot
 * be, `impossible` when the evidence cannot come about, `tooLarge` past 2^20 combinations.
 */
export function marginals(model: NoisyOrModel): Record<string, number> {
  return noisyOrMarginals(model)
}

function budgetOf({ slips }: Problem, { w, checks, repairs }: Spot): number {
  const width = Math.max(1, w.length * (checks.length + repairs.length))
  const share = WIDTH / width
  const wanted = EXPANSIONS * (share > 1 ? share ** 4 : share)
  const most = (slips ? MOST_WORK_WITH_SLIPS : MOST_WORK) / width
  return Math.max(LEAST_EXPANSIONS, Math.ceil(Math.min(wanted, most)))
}

/** What the search found, and the cost of the cheapest plan that it came across. */
function searched(
  problem: Problem,
  spot: Spot,
  limit: number,
): { found: NextAction; cheapest: number } {
  const mask = (left: readonly number[]) => left.reduce((m, i) => m | (1 << i), 0)
  const start = { ...spot, checks: mask(spot.checks), repairs: mask(spot.repairs) }
  const { search, root } = startSearch(problem, start, limit)
  const { nodes, options } = search.pool
  const plain = nodes.high[root] ?? 0
  solve(search, root)
  const isExact = gapOf(search, root) <= search.slack
  const highOf = (option: number): number => options.high[option] ?? 0
  const measure = isExact ? highOf : (option: number) => guessOf(search, option)
  // Nothing is advised whose plan is dearer than repairs without checks.
  const all = optionsOf(search, root)
  const best = least(
    all.filter((option) => highOf(option) <= plain + search.slack),
    measure,
  )
  if (best === null || !Number.isFinite(highOf(best))) throw new AppError('noAction')
  const cost = highOf(best)
  const gap = isExact ? 0 : cost - (nodes.low[root] ?? 0)
  const second = secondOf(search, { root, best, measure, isExact })
  const runnerUp = second && {
    ...named(problem, actionOf(search, second.option)),
    expectedCost: Math.max(second.cost, cost),
    exact: second.isSure,
  }
  const action = actionOf(search, best)
  const expansions = search.expanded
  const after = pointsAfter(search, best)
  let at = 0
  const outcomes = outcomesOf({ problem, spot }, action, () => {
    const node = after[at++]
    return node === undefined ? null : nextAt(search, node)
  })
  const found = {
    ...named(problem, action),
    expectedCost: cost,
    gap,
    runnerUp,
    outcomes,
    expansions,
  }
  return { found, cheapest: nodes.high[root] ?? 0 }
}

/** Expansions for the action after an outcome, beyond what the search has found out there already. */
const EXPANSIONS_AFTER = 40

/** The best action at a point that a search came by. */
function nextAt(search: Search, node: number): NamedAction | null {
  search.limit = search.expanded + EXPANSIONS_AFTER
  solve(search, node)
  const isExact = gapOf(search, node) <= search.slack
  const highOf = (option: number): number => search.pool.options.high[option] ?? 0
  const measure = isExact ? highOf : (option: number) => guessOf(search, option)
  const best = least(optionsOf(search, node), measure)
  return best === null ? null : named(search.problem, actionOf(search, best))
}

/** A problem and where it stands; the weights sum to 1. */
type At = { problem: Problem; spot: Spot }

/** Every outcome of an action, and what is next after those that can come up and leave something to do. */
function outcomesOf(
  { problem, spot: { w } }: At,
  { type, index }: Action,
  next: (outcome: number) => NamedAction | null,
): LeadsTo[] {
  const [check, repair] = [problem.checks[index], problem.repairs[index]]
  if (type === 'check' && check !== undefined)
    return check.p.map((row, o) => {
      const chance = dot(w, row)
      return { outcome: check.outcomes[o] ?? '', chance, next: chance > 0 ? next(o) : null }
    })
  if (type !== 'repair' || repair === undefined) return []
  const stays = dot(w, repair.fails)
  const wrong = w.reduce(
    (sum, x, f) => sum + x * (repair.fails[f] ?? 1) * (problem.falsePass[f] ?? 0),
    0,
  )
  const failed = stays - wrong
  return [
    { outcome: 'cured', chance: 1 - stays, next: null },
    ...(problem.slips ? [{ outcome: 'passedWrongly', chance: wrong, next: null }] : []),
    { outcome: 'failed', chance: failed, next: failed > NO_MASS ? next(0) : null },
  ]
}

type Chosen = { root: number; best: number; measure: (option: number) => number; isExact: boolean }

/** The best of the other first actions, its cost solved for where the budget allows; null where there is no other. */
function secondOf(
  search: Search,
  { root, best, measure, isExact }: Chosen,
): { option: number; cost: number; isSure: boolean } | null {
  const others = optionsOf(search, root).filter((option) => option !== best)
  const without = isExact && others.length > 0 ? solveWithout(search, root, best) : null
  const option = least(others, measure)
  if (option === null) return null
  const cost = search.pool.options.high[option] ?? 0
  if (!Number.isFinite(cost)) return null
  return { option, cost, isSure: without !== null && without.high - without.low <= search.slack }
}

/** The least by a measure; the first of equals in the order of the list. */
function least(options: readonly number[], measure: (option: number) => number): number | null {
  let best: { option: number; x: number } | null = null
  for (const option of options) {
    const x = measure(option)
    if (best === null || x < best.x) best = { option, x }
  }
  return best?.option ?? null
}

/** The look-ahead alone. */
const looked = (at: At): NextAction => aheadOf(at, lookAhead(at.problem, at.spot), DEEP_AFTER)

/** The answer of a one-step look-ahead, given by `ranked`: what follows its outcomes is seen no further either. */
export const oneAhead = (at: At, ranked: readonly Candidate[]): NextAction => aheadOf(at, ranked, 0)

/** First actions looked at two steps deep after an outcome: its own best is seldom further down. */
const DEEP_AFTER = 3

function aheadOf(at: At, [best, second]: readonly Candidate[], deep: number): NextAction {
  if (best === undefined || !Number.isFinite(best.cost)) throw new AppError('noAction')
  const { problem, spot } = at
  return {
    ...named(problem, best),
    expectedCost: best.cost,
    gap: Math.max(0, best.cost - dot(spot.w, leastCosts(problem))),
    runnerUp:
      second === undefined || !Number.isFinite(second.cost)
        ? null
        : { ...named(problem, second), expectedCost: second.cost, exact: false },
    outcomes: outcomesAhead(at, best, deep),
    expansions: 0,
  }
}

/** Every outcome of an action, with what a look-ahead puts next; `deep` as there. */
export function outcomesAhead(at: At, action: Action, deep = DEEP_AFTER): LeadsTo[] {
  const { problem, spot } = at
  const after = stepAfter(problem, spot, action)?.next ?? []
  return outcomesOf(at, action, (outcome) => {
    const behind = after[outcome] ?? null
    const [next] = behind === null ? [] : lookAhead(problem, behind, deep)
    return next === undefined ? null : named(problem, next)
  })
}

const named = (problem: Problem, action: Action): NamedAction => ({
  type: action.type,
  id: idOf(problem, action),
})

function idOf(problem: Problem, { type, index }: Action): string {
  const list = { check: problem.checks, repair: problem.repairs, stop: problem.stops }[type]
  return list[index]?.id ?? ''
}
