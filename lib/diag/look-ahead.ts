/**
 * Two-step look-ahead, for models too large to search exactly: every action, then the best one after it, then
 * repairs in p/c order with the cheapest stop behind them (optimal without checks and set-ups: Heckerman,
 * Breese and Rommelse 1995). Its answer is the cost of a plan that can really be carried out, so an upper bound.
 */

import { repairsOnly } from './repairs-only'
import type { ActionType, Problem, Repair } from './search-problem'
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

const rest = (problem: Problem, spot: Spot): number => repairsOnly(problem, spot, spot.repairs)

function oneStep(problem: Problem, spot: Spot, action: Action): number {
  return stepCost(problem, spot, action, rest)
}

function twoSteps(
  problem: Problem,
  spot: Spot,
  { action, least }: { action: Action; least: Float64Array },
): number {
  return stepCost(problem, spot, action, (p, next) => {
    let best = rest(p, next)
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
