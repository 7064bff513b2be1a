/**
 * The engine's three plain questions (engine.md 2.1): the next action, the belief behind it, and noisy-OR
 * marginals. `nextAction` searches within a limit of expansions and says how far its bounds are apart; the
 * limit is a count, never a time, so that the same input gives the same answer on every machine and later.
 */
import { AppError } from '@/lib/model/result'
import { leastCosts, lookAhead } from './look-ahead'
import { noisyOrMarginals } from './noisy-or'
import {
  type ActionType,
  guessOf,
  type Node,
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

/**
 * Expansions where the caller names none, at 8 faults and 17 actions: some 50 ms (docs/performance.md). A wider
 * problem's expansions cost more, and it gets fewer; a narrower one gets as many as close it nearly always.
 */
const EXPANSIONS = 1500
const WIDTH = 8 * 17
const LEAST_EXPANSIONS = 100
/** Bounds that differ by less than this share have met: what is left is rounding. */
const SLACK = 1e-12

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
  const search = startSearch(problem, limit)
  const mask = (left: readonly number[]) => left.reduce((m, i) => m | (1 << i), 0)
  const { w, open, elapsed } = spot
  const checks = mask(spot.checks)
  const root = nodeAt(search, { w, checks, repairs: mask(spot.repairs), open, elapsed, code: 0 })
  search.slack = SLACK * Math.max(1, root.high)
  const plain = root.high
  solve(search, root)
  const options = root.options ?? []
  const isExact = root.high - root.low <= search.slack
  // Nothing is advised whose plan is dearer than repairs without checks.
  const sound = options.filter(({ high }) => high <= plain + search.slack)
  const { best } = topTwo(sound, isExact ? highOf : guessOf)
  if (best === null) throw new AppError('noAction')
  const others = options.filter((option) => option !== best)
  const isSure =
    isExact && isSolved(search, { ...root, high: Number.POSITIVE_INFINITY, options: others })
  const { best: second } = topTwo(others, isExact ? highOf : guessOf)
  const mass = massOf(w)
  const found: NextAction = {
    ...named(problem, best),
    expectedCost: best.high / mass,
    gap: isExact ? 0 : (best.high - root.low) / mass,
    runnerUp: second && {
      ...named(problem, second),
      expectedCost: Math.max(second.high, best.high) / mass,
      exact: isSure,
    },
    expansions: search.expanded,
  }
  return { found, cheapest: root.high / mass }
}

const highOf = ({ high }: Option): number => high

/** Whether the bounds of a node meet within what is left of the budget. */
function isSolved(search: Search, node: Node): boolean {
  if (node.options?.length === 0) return true
  solve(search, node)
  return node.high - node.low <= search.slack
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

const named = (problem: Problem, option: { type: ActionType; index: number }) => ({
  type: option.type,
  id: idOf(problem, option),
})

function idOf(problem: Problem, { type, index }: Pick<Option, 'type' | 'index'>): string {
  const list = { check: problem.checks, repair: problem.repairs, stop: problem.stops }[type]
  return list[index]?.id ?? ''
}
