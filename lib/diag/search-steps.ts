/**
 * One action from one point: its own cost and what it leaves, and the lower bound every search here leans on.
 * The bound is what the job would cost if the fault were known from here on: admissible, since knowing more
 * never costs more. Plain loops over typed arrays: this is the engine's innermost ring.
 */
import { type Check, opening, type Point, type Problem, type Repair } from './search-problem'

/** A step: what it costs in all (weighted by the point's mass) and the points it may lead to. */
export type Step = { fixed: number; next: Point[] }

/** An action with its place, its price per unit of mass and its minutes, set-ups included. */
export type Priced = { index: number; price: number; minutes: number }

/** Price and minutes of a check or repair here; null when daylight forbids it (rule 5 of engine.md 2.1). */
export function priceOf(
  problem: Problem,
  at: { open: number; elapsed: number; index: number },
  action: Check | Repair,
): Priced | null {
  const open =
    (action.setups & ~at.open) === 0 ? NO_SETUP : opening(problem, action.setups, at.open)
  const minutes = action.minutes + open.minutes
  if (at.elapsed + minutes > problem.daylight + 1e-9) return null
  return { index: at.index, price: action.price + open.price, minutes }
}
const NO_SETUP = { price: 0, minutes: 0 }

/** The check done: one point per outcome that can come up. */
export function afterCheck(problem: Problem, point: Point, at: Priced): Step {
  const check = problem.checks[at.index]
  if (check === undefined) return { fixed: 0, next: [] }
  const next: Point[] = []
  let place = 1
  for (let c = 0; c < at.index; c++) place *= (problem.checks[c]?.p.length ?? 0) + 1
  check.p.forEach((row, o) => {
    const w = new Float64Array(point.w.length)
    let mass = 0
    for (let f = 0; f < w.length; f++) {
      const x = (point.w[f] ?? 0) * (row[f] ?? 0)
      w[f] = x
      mass += x
    }
    if (mass <= 0) return
    next.push({
      w,
      checks: point.checks & ~(1 << at.index),
      repairs: point.repairs,
      open: point.open | check.setups,
      elapsed: point.elapsed + at.minutes,
      code: point.code + place * (o + 1),
    })
  })
  return { fixed: at.price * massOf(point.w), next }
}

/** The repair done and its test run failed for all to see; a wrong pass ends the job and costs the comeback. */
export function afterRepair(problem: Problem, point: Point, at: Priced): Step {
  const repair = problem.repairs[at.index]
  if (repair === undefined) return { fixed: 0, next: [] }
  const { w, fixed, mass } = survive(problem, repair, { w: point.w, price: at.price })
  if (mass <= 1e-15) return { fixed, next: [] }
  const next: Point = {
    w,
    checks: point.checks,
    repairs: point.repairs & ~(1 << at.index),
    open: (point.open | repair.setups) & ~problem.closed,
    elapsed: point.elapsed + at.minutes,
    code: point.code,
  }
  return { fixed, next: [next] }
}

/** Weights that live on after a repair that was seen to fail, with what trying it cost. */
export function survive(
  problem: Problem,
  repair: Repair,
  before: { w: Float64Array; price: number },
): { w: Float64Array; fixed: number; mass: number } {
  const w = new Float64Array(before.w.length)
  let fixed = 0
  let mass = 0
  for (let f = 0; f < w.length; f++) {
    const x = before.w[f] ?? 0
    const left = x * (repair.fails[f] ?? 1)
    const wrong = left * (problem.falsePass[f] ?? 0)
    fixed += before.price * x + problem.comeback * wrong
    mass += left - wrong
    w[f] = left - wrong
  }
  return { w, fixed, mass }
}

/** The whole weight of a point: the chance of having come here. */
export function massOf(w: Float64Array): number {
  let mass = 0
  for (let f = 0; f < w.length; f++) mass += w[f] ?? 0
  return mass
}

/** Weighted cost; a fault without weight costs nothing, even where its cost is infinite. */
export function dot(w: Float64Array, costs: Float64Array): number {
  let total = 0
  for (let f = 0; f < w.length; f++) {
    const x = w[f] ?? 0
    if (x > 0) total += x * (costs[f] ?? 0)
  }
  return total
}
