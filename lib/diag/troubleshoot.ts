/**
 * The engine's three plain questions (engine.md 2.1): the next action, the belief behind it, and noisy-OR
 * marginals. `nextAction` searches within a limit of expansions and says how far its bounds are apart; the
 * limit is a count, never a time, so that the same input gives the same answer on every machine and later.
 */
import { AppError } from '@/lib/model/result'
import { leastCosts, lookAhead } from './look-ahead'
import { noisyOrMarginals } from './noisy-or'
import { gapOf, guessOf, optionsOf, solve, solveWithout, startSearch } from './search'
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
import { dot, massOf } from './search-steps'
import type { NoisyOrModel, SearchState, SingleModel } from './troubleshoot-model'

/**
 * Expansions where the caller names none, at 8 faults and 17 actions: some 50 ms (docs/performance.md). A wider
 * problem's expansions cost more, and it gets fewer; a narrower one gets as many as close it nearly always.
 */
const EXPANSIONS = 1500
const WIDTH = 8 * 17
const LEAST_EXPANSIONS = 100

export type NextAction = {
  type: ActionType
  id: string
  /** Expected total cost of the whole rest of the job when this is done next. */
  expectedCost: number
  /** How much cheaper the best plan could at most be; 0 when the answer is exact. */
  gap: number
  /** The next best first action; `exact` false when its cost is that of a plan that was found, and not surely the least. */
  runnerUp: { type: ActionType; id: string; expectedCost: number; exact: boolean } | null
  expansions: number
}

/**
 * The cheapest next action from a state. `limit`: how many points may be expanded; a default by the size of what
 * is left. Throws AppError `badModel` for unknown names, `noAction` when nothing can end the job, `impossible`
 * when the evidence cannot come about.
 */
export function nextAction(model: SingleModel, state: SearchState, limit?: number): NextAction {
  const problem = problemOf(model)
  const w = weightsOf(model, problem, state)
  const spot = { w, ...leftOf(problem, state), open: openOf(model, state), elapsed: state.elapsed }
  if (!(massOf(w) > 0)) throw new AppError('impossible')
  const small = Math.max(problem.checks.length, problem.repairs.length) <= MOST_IN_MASK
  if (!small) return looked(problem, spot)
  const { found, cheapest } = searched(problem, spot, limit ?? budgetOf(spot))
  if (found.gap === 0) return found
  const two = looked(problem, spot)
  if (two.expectedCost >= cheapest) return found
  const least = found.expectedCost - found.gap
  return { ...two, gap: two.expectedCost - least, expansions: found.expansions }
}

/** P(each fault | outcomes, and that the tried repairs were seen to fail), for kind `single`. */
export function posterior(model: SingleModel, state: SearchState): Record<string, number> {
  const w = weightsOf(model, problemOf(model), state)
  const mass = massOf(w)
  return Object.fromEntries(model.faults.map((f, i) => [f.id, mass > 0 ? (w[i] ?? 0) / mass : 0]))
}

/** P(each fault | evidence) for kind `noisyor`, exact. */
export function marginals(model: NoisyOrModel): Record<string, number> {
  return noisyOrMarginals(model)
}

type Spot = Parameters<typeof lookAhead>[1]

function budgetOf({ w, checks, repairs }: Spot): number {
  const share = WIDTH / Math.max(1, w.length * (checks.length + repairs.length))
  return Math.max(LEAST_EXPANSIONS, Math.ceil(EXPANSIONS * (share > 1 ? share ** 4 : share)))
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
  const action = named(problem, actionOf(search, best))
  const expansions = search.expanded
  const found = { ...action, expectedCost: cost, gap, runnerUp, expansions }
  return { found, cheapest: nodes.high[root] ?? 0 }
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

function looked(problem: Problem, spot: Spot): NextAction {
  const [best, second] = lookAhead(problem, spot)
  if (best === undefined) throw new AppError('noAction')
  const mass = massOf(spot.w)
  const least = dot(spot.w, leastCosts(problem))
  return {
    ...named(problem, best),
    expectedCost: best.cost / mass,
    gap: Math.max(0, best.cost - least) / mass,
    runnerUp:
      second === undefined
        ? null
        : { ...named(problem, second), expectedCost: second.cost / mass, exact: false },
    expansions: 0,
  }
}

const named = (problem: Problem, action: Action): { type: ActionType; id: string } => ({
  type: action.type,
  id: idOf(problem, action),
})

function idOf(problem: Problem, { type, index }: Action): string {
  const list = { check: problem.checks, repair: problem.repairs, stop: problem.stops }[type]
  return list[index]?.id ?? ''
}
