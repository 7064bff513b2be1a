/**
 * Two-step look-ahead, for models too large to search exactly: every action, then the best one after it, then
 * repairs in p/c order with the cheapest stop behind them (optimal without checks and set-ups: Heckerman,
 * Breese and Rommelse 1995). Its answer is the cost of a plan that can really be carried out, so an upper bound.
 */

import type { ActionType } from './search'
import { opening, type Problem, type Repair } from './search-problem'
import { dot, massOf, priceOf, survive } from './search-steps'

/** A state by lists, for any number of checks and repairs. */
export type Spot = {
  w: Float64Array
  checks: readonly number[]
  repairs: readonly number[]
  open: number
  elapsed: number
}

/** A first action with the cost of the plan found behind it (weighted by the spot's mass). */
export type Candidate = { type: ActionType; index: number; cost: number }

/** How many of the best first actions by one step are looked at two steps deep. */
const DEEP = 10

/** All first actions, cheapest first; those not worth a second step carry their one-step cost. */
export function lookAhead(problem: Problem, spot: Spot, steps: 1 | 2 = 2): Candidate[] {
  const first = actions(problem, spot).map((a) => ({ ...a, cost: oneStep(problem, spot, a) }))
  first.sort((a, b) => a.cost - b.cost)
  if (steps === 1) return first
  const least = leastCosts(problem)
  const deeper = first.map((a, rank) => {
    if (a.type === 'stop' || rank >= DEEP) return a
    return { ...a, cost: Math.min(a.cost, twoSteps(problem, spot, { action: a, least })) }
  })
  return deeper.sort((a, b) => a.cost - b.cost)
}

/** Cost of repairs in p/c order with the cheapest stop at the best place in the row. */
export function repairsOnly(problem: Problem, spot: Spot): number {
  const running = {
    w: Float64Array.from(spot.w),
    mass: massOf(spot.w),
    stops: problem.stops.map((s) => dot(spot.w, s.byFault)),
  }
  let best = Math.min(Number.POSITIVE_INFINITY, ...running.stops)
  let here = { open: spot.open, elapsed: spot.elapsed }
  let spent = 0
  for (const index of inOrder(problem, spot)) {
    const repair = problem.repairs[index]
    const priced = repair === undefined ? null : priceOf(problem, { ...here, index }, repair)
    if (repair === undefined || priced === null) continue
    spent += priced.price * running.mass
    if (spent >= best) break
    spent += mend(problem, repair, running)
    here = {
      open: (here.open | repair.setups) & ~problem.closed,
      elapsed: here.elapsed + priced.minutes,
    }
    if (running.mass <= 1e-15) return Math.min(best, spent)
    for (const stop of running.stops) best = Math.min(best, spent + Math.max(0, stop))
  }
  return best
}

type Running = { w: Float64Array; mass: number; stops: number[] }

/** Takes out what a repair mends (and what passes its test run wrongly); answers what the wrong passes cost. */
function mend(problem: Problem, repair: Repair, running: Running): number {
  let wrong = 0
  const faults = problem.slips ? problem.faults.keys() : repair.cures
  for (const f of faults) {
    const x = running.w[f] ?? 0
    const left = x * (repair.fails[f] ?? 1)
    const slipped = left * (problem.falsePass[f] ?? 0)
    wrong += slipped
    const gone = x - left + slipped
    running.w[f] = left - slipped
    running.mass -= gone
    problem.stops.forEach((s, i) => {
      running.stops[i] = (running.stops[i] ?? 0) - gone * (s.byFault[f] ?? 0)
    })
  }
  return wrong * problem.comeback
}

/** A lower bound at any size: each fault at its stop or its cheapest cure alone, per unit of mass. */
export function leastCosts(problem: Problem): Float64Array {
  return Float64Array.from(problem.faults, (_, f) => {
    const stop = Math.min(Number.POSITIVE_INFINITY, ...problem.stops.map((s) => s.byFault[f] ?? 0))
    const cures = problem.repairs.flatMap((r) => ((r.fails[f] ?? 1) < 1 ? [r.price] : []))
    const slip = (problem.falsePass[f] ?? 0) > 0 ? [problem.comeback] : []
    return Math.min(stop, ...cures, ...slip)
  })
}

type Action = { type: ActionType; index: number }

function actions(problem: Problem, spot: Spot): Action[] {
  const list: Action[] = problem.stops.map((_, index) => ({ type: 'stop', index }))
  for (const index of spot.repairs) list.push({ type: 'repair', index })
  for (const index of spot.checks) list.push({ type: 'check', index })
  return list
}

function oneStep(problem: Problem, spot: Spot, action: Action): number {
  return stepCost(problem, spot, action, repairsOnly)
}

function twoSteps(
  problem: Problem,
  spot: Spot,
  { action, least }: { action: Action; least: Float64Array },
): number {
  return stepCost(problem, spot, action, (p, next) => {
    let best = repairsOnly(p, next)
    const mass = massOf(next.w)
    const floor = dot(next.w, least)
    for (const index of next.checks) {
      if (floor + (p.checks[index]?.price ?? 0) * mass >= best) continue
      best = Math.min(best, oneStep(p, next, { type: 'check', index }))
    }
    return best
  })
}

function stepCost(
  problem: Problem,
  spot: Spot,
  action: Action,
  then: (problem: Problem, next: Spot) => number,
): number {
  const stop = action.type === 'stop' ? problem.stops[action.index] : undefined
  if (stop !== undefined) return dot(spot.w, stop.byFault)
  const step =
    action.type === 'check'
      ? checked(problem, spot, action.index)
      : repaired(problem, spot, action.index)
  if (step === null) return Number.POSITIVE_INFINITY
  return step.next.reduce((cost, next) => cost + then(problem, next), step.fixed)
}

function checked(
  problem: Problem,
  spot: Spot,
  index: number,
): { fixed: number; next: Spot[] } | null {
  const check = problem.checks[index]
  const priced = check === undefined ? null : priceOf(problem, { ...spot, index }, check)
  if (check === undefined || priced === null) return null
  const mass = massOf(spot.w)
  const next = check.p.map((row) => ({
    w: spot.w.map((x, f) => x * (row[f] ?? 0)),
    checks: spot.checks.filter((c) => c !== index),
    repairs: spot.repairs,
    open: spot.open | check.setups,
    elapsed: spot.elapsed + priced.minutes,
  }))
  return { fixed: priced.price * mass, next: next.filter((n) => n.w.some((x) => x > 0)) }
}

function repaired(
  problem: Problem,
  spot: Spot,
  index: number,
): { fixed: number; next: Spot[] } | null {
  const repair = problem.repairs[index]
  const priced = repair === undefined ? null : priceOf(problem, { ...spot, index }, repair)
  if (repair === undefined || priced === null) return null
  const after = survive(problem, repair, { w: spot.w, price: priced.price })
  if (after.mass <= 1e-15) return { fixed: after.fixed, next: [] }
  const next = {
    w: after.w,
    checks: spot.checks,
    repairs: spot.repairs.filter((r) => r !== index),
    open: openAfter(problem, spot, repair),
    elapsed: spot.elapsed + priced.minutes,
  }
  return { fixed: after.fixed, next: [next] }
}

const openAfter = (problem: Problem, spot: Spot, repair: Repair): number =>
  (spot.open | repair.setups) & ~problem.closed

/** Repairs by what they cure per unit of price, best first; the first of equals in the model's order. */
function inOrder(problem: Problem, spot: Spot): number[] {
  const ratios = new Float64Array(problem.repairs.length)
  const order: number[] = []
  for (const index of spot.repairs) {
    const repair = problem.repairs[index]
    if (repair === undefined) continue
    let cured = 0
    for (const f of repair.cures) cured += (spot.w[f] ?? 0) * (1 - (repair.fails[f] ?? 1))
    if (cured <= 0) continue
    const shut = (repair.setups & ~spot.open) !== 0
    const setups = shut ? opening(problem, repair.setups, spot.open).price : 0
    ratios[index] = cured / Math.max(repair.price + setups, 1e-12)
    order.push(index)
  }
  return order.sort((a, b) => (ratios[b] ?? 0) - (ratios[a] ?? 0) || a - b)
}
