/** One action from a belief: its own cost and what it leaves. */
import { type Check, opening, type Problem, type Repair } from './search-problem'

/** A state that is reached less often than this costs nothing: what is left is rounding. */
export const NO_MASS = 1e-15

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

/** The whole of some weights: the chance of having come here. */
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
