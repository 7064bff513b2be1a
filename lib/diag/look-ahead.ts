/**
 * Two-step look-ahead, for models too large to search exactly: every action, then the best one after it, then
 * repairs in p/c order with the cheapest stop behind them (optimal without checks and set-ups: Heckerman,
 * Breese and Rommelse 1995). Its answer is the cost of a plan that can really be carried out, so an upper bound.
 */

import { endCost } from './known-cost'
import { inPlanOrder, repairsOnly } from './repairs-only'
import type { ActionType, Problem } from './search-problem'
import { dot, massOf, NO_MASS, priceOf, survive } from './search-steps'

/** A state by lists, for any number of checks and repairs. */
export type Spot = {
  w: Float64Array
  checks: readonly number[]
  repairs: readonly number[]
  open: number
  elapsed: number
}

type Action = { type: ActionType; index: number }
/** A first action with the cost of the plan found behind it (weighted by the spot's mass). */
export type Candidate = Action & { cost: number }

/** How many of the best first actions by one step are looked at two steps deep. */
const DEEP = 10

/** All first actions, cheapest first; but for the `deep` best by one step they carry their one-step cost. */
export function lookAhead(problem: Problem, given: Spot, deep = DEEP): Candidate[] {
  // Behind any action the order of the repairs is nearly that of now: sorted once, it hardly has to be again.
  const spot = { ...given, repairs: inPlanOrder(problem, given, given.repairs) }
  const room = new Float64Array(spot.w.length)
  const first = actions(problem, given).map((a) => ({
    ...a,
    cost: oneStep(problem, spot, a, room),
  }))
  first.sort((a, b) => a.cost - b.cost)
  if (deep === 0) return first
  const least = leastCosts(problem)
  const deeper = first.map((a, rank) => {
    if (a.type === 'stop' || rank >= deep) return a
    const after = stepAfter(problem, spot, a)
    if (after === null) return a
    const cost = after.next.reduce(
      (sum, next) => sum + (next === null ? 0 : checkThenRest(problem, next, { least, room })),
      after.fixed,
    )
    return { ...a, cost: Math.min(a.cost, cost) }
  })
  return deeper.sort((a, b) => a.cost - b.cost)
}

/** A lower bound at any size: each fault at its end without a cure or its cheapest cure alone, per unit of mass. */
export function leastCosts(problem: Problem): Float64Array {
  return Float64Array.from(problem.faults, (_, f) => {
    const cures = problem.repairs.flatMap((r) => ((r.fails[f] ?? 1) < 1 ? [r.price] : []))
    return Math.min(endCost(problem, f), ...cures)
  })
}

/** What an action costs itself and the state behind each of its outcomes; null for one that cannot come up. */
export type Step = { fixed: number; next: (Spot | null)[] }

/**
 * A check or repair carried out: one state per outcome of a check, the state after a repair that was seen to
 * fail. Null where daylight forbids it (rule 5 of engine.md 2.1), and for a stop, which leads nowhere.
 */
export function stepAfter(problem: Problem, spot: Spot, { type, index }: Action): Step | null {
  if (type === 'stop') return null
  const action = (type === 'check' ? problem.checks : problem.repairs)[index]
  const priced = action === undefined ? null : priceOf(problem, { ...spot, index }, action)
  if (action === undefined || priced === null) return null
  const elapsed = spot.elapsed + priced.minutes
  if ('fails' in action) {
    const { w, fixed, mass } = survive(problem, action, { w: spot.w, price: priced.price })
    const repairs = spot.repairs.filter((r) => r !== index)
    const open = (spot.open | action.setups) & ~problem.closed
    return { fixed, next: [mass <= NO_MASS ? null : { ...spot, w, repairs, open, elapsed }] }
  }
  const checks = spot.checks.filter((c) => c !== index)
  const open = spot.open | action.setups
  const next = action.p.map((row) => {
    const w = spot.w.map((x, f) => x * (row[f] ?? 0))
    return massOf(w) > 0 ? { ...spot, w, checks, open, elapsed } : null
  })
  return { fixed: priced.price * massOf(spot.w), next }
}

function actions(problem: Problem, spot: Spot): Action[] {
  const list: Action[] = problem.stops.map((_, index) => ({ type: 'stop', index }))
  for (const index of spot.repairs) list.push({ type: 'repair', index })
  for (const index of spot.checks) list.push({ type: 'check', index })
  return list
}

/** An action and repairs alone behind it. */
function oneStep(problem: Problem, spot: Spot, action: Action, room: Float64Array): number {
  const { type, index } = action
  if (type === 'check') return checkThenRepairs(problem, spot, index, room)
  const stop = type === 'stop' ? problem.stops[index] : undefined
  if (stop !== undefined) return dot(spot.w, stop.byFault)
  const after = stepAfter(problem, spot, action)
  if (after === null) return Number.POSITIVE_INFINITY
  const [next = null] = after.next
  return after.fixed + (next === null ? 0 : repairsOnly(problem, next, next.repairs))
}

/** The same for a check; asked thousands of times, so nothing is made on the way. `room` holds the weights. */
function checkThenRepairs(problem: Problem, spot: Spot, index: number, room: Float64Array): number {
  const check = problem.checks[index]
  const priced = check === undefined ? null : priceOf(problem, { ...spot, index }, check)
  if (check === undefined || priced === null) return Number.POSITIVE_INFINITY
  const from = { w: room, open: spot.open | check.setups, elapsed: spot.elapsed + priced.minutes }
  let cost = priced.price * massOf(spot.w)
  for (const row of check.p) {
    let mass = 0
    for (let f = 0; f < room.length; f++) {
      const x = (spot.w[f] ?? 0) * (row[f] ?? 0)
      room[f] = x
      mass += x
    }
    if (mass > 0) cost += repairsOnly(problem, from, spot.repairs)
  }
  return cost
}

type Floor = { least: Float64Array; room: Float64Array }

/** The best check behind a step and repairs alone behind that, or repairs alone at once. */
function checkThenRest(problem: Problem, spot: Spot, { least, room }: Floor): number {
  let best = repairsOnly(problem, spot, spot.repairs)
  const mass = massOf(spot.w)
  const floor = dot(spot.w, least)
  for (const index of spot.checks) {
    if (floor + (problem.checks[index]?.price ?? 0) * mass >= best) continue
    best = Math.min(best, checkThenRepairs(problem, spot, index, room))
  }
  return best
}
