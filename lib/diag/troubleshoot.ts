/**
 * The engine's three plain questions (engine.md 2.1): the next action, the belief behind it, and noisy-OR
 * marginals. `nextAction` is exact within its limit of expansions and a two-step look-ahead beyond it; the
 * limit is a count, never a time, so that the same input gives the same answer on every machine and later.
 */
import { AppError } from '@/lib/model/result'
import { leastCosts, lookAhead } from './look-ahead'
import { noisyOrMarginals } from './noisy-or'
import {
  type ActionType,
  nodeAt,
  type Option,
  type Search,
  solve,
  startSearch,
  topTwo,
} from './search'
import { leftOf, MOST_IN_MASK, openOf, type Problem, problemOf, weightsOf } from './search-problem'
import { dot, massOf } from './search-steps'
import type { NoisyOrModel, SearchState, SingleModel } from './troubleshoot-model'

/** Expansions allowed when the caller names none, at 8 faults and 17 actions; wider models get fewer, by the square. */
export const DEFAULT_LIMIT = 20_000
const WIDTH = 8 * 17

export type NextAction = {
  type: ActionType
  id: string
  /** Expected total cost of the whole rest of the job when this is done next. */
  expectedCost: number
  /** How much cheaper the best plan could at most be; 0 when the answer is exact. */
  gap: number
  /** The next best first action; `exact` false when its cost is a lower bound only. */
  runnerUp: { type: ActionType; id: string; expectedCost: number; exact: boolean } | null
  expansions: number
}

/** The cheapest next action from a state. Throws AppError `badModel` for unknown names, `noAction` when nothing can end the job. */
export function nextAction(
  model: SingleModel,
  state: SearchState,
  limit = DEFAULT_LIMIT,
): NextAction {
  const problem = problemOf(model)
  const w = weightsOf(model, problem, state)
  const spot = { w, ...leftOf(problem, state), open: openOf(model, state), elapsed: state.elapsed }
  const small = Math.max(problem.checks.length, problem.repairs.length) <= MOST_IN_MASK
  const found = small ? searched(problem, spot, limit) : null
  return found?.exact === true ? found.answer : looked(problem, spot, found?.search ?? null)
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

function searched(
  problem: Problem,
  spot: Spot,
  limit: number,
): { exact: true; answer: NextAction } | { exact: false; search: Search } {
  const width = problem.faults.length * (problem.checks.length + problem.repairs.length)
  const search = startSearch(problem, Math.ceil(limit * Math.min(1, (WIDTH / width) ** 2)))
  const mask = (left: readonly number[]) => left.reduce((m, i) => m | (1 << i), 0)
  const { w, open, elapsed } = spot
  const point = {
    w,
    checks: mask(spot.checks),
    repairs: mask(spot.repairs),
    open,
    elapsed,
    code: 0,
  }
  const root = nodeAt(search, point)
  search.slack = 1e-13 * Math.max(1, root.bound)
  solve(search, root, Number.POSITIVE_INFINITY)
  const { best } = topTwo(root.options ?? [])
  if (!root.solved || best === null) return { exact: false, search }
  const mass = massOf(w)
  const others = (root.options ?? []).filter((o) => o !== best)
  const rest = { point, bound: root.bound, solved: false, options: others }
  if (others.length > 0) solve(search, rest, Number.POSITIVE_INFINITY)
  const second = topTwo(others).best
  const answer: NextAction = {
    type: best.type,
    id: idOf(problem, best),
    expectedCost: best.bound / mass,
    gap: 0,
    runnerUp:
      second === null
        ? null
        : { ...named(problem, second), expectedCost: second.bound / mass, exact: second.exact },
    expansions: search.expanded,
  }
  return { exact: true, answer }
}

function looked(problem: Problem, spot: Spot, search: Search | null): NextAction {
  const [best, second] = lookAhead(problem, spot)
  if (best === undefined) throw new AppError('noAction')
  const mass = massOf(spot.w)
  const least = Math.max(dot(spot.w, leastCosts(problem)), rootBound(search))
  return {
    type: best.type,
    id: idOf(problem, best),
    expectedCost: best.cost / mass,
    gap: Math.max(0, best.cost - least) / mass,
    runnerUp:
      second === undefined
        ? null
        : { ...named(problem, second), expectedCost: second.cost / mass, exact: false },
    expansions: search?.expanded ?? 0,
  }
}

/** The bound the search had reached when its budget ran out. */
function rootBound(search: Search | null): number {
  const root = search?.nodes.values().next().value
  return root?.bound ?? 0
}

const named = (problem: Problem, option: { type: ActionType; index: number }) => ({
  type: option.type,
  id: idOf(problem, option),
})

function idOf(problem: Problem, { type, index }: Pick<Option, 'type' | 'index'>): string {
  const list = { check: problem.checks, repair: problem.repairs, stop: problem.stops }[type]
  return list[index]?.id ?? ''
}
