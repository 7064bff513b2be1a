/**
 * What a point costs at least and at most. At least: one action further than "the fault is known from here
 * on", which is admissible, since knowing more never costs more. At most: repairs without checks.
 */
import type { KnownCosts } from './known-cost'
import { repairsOnlyOf } from './repairs-only'
import { type Check, opening, type Point, type Problem, type Repair } from './search-problem'
import { dot, massOf } from './search-steps'

/** Prices and minutes of every check and repair, with the set-ups that are not open yet. */
export type Prices = { checks: Priced; repairs: Priced }
type Priced = { price: Float64Array; minutes: Float64Array }

export type Bounds = {
  problem: Problem
  known: KnownCosts
  /** By the set-ups that are open. */
  prices: Map<number, Prices>
}

/** Prices with these set-ups open. */
export function pricesAt({ problem, prices }: Bounds, open: number): Prices {
  const present = prices.get(open)
  if (present !== undefined) return present
  const priced = (actions: readonly (Check | Repair)[]): Priced => {
    const more = actions.map((a) => opening(problem, a.setups, open))
    return {
      price: Float64Array.from(actions, (a, i) => a.price + (more[i]?.price ?? 0)),
      minutes: Float64Array.from(actions, (a, i) => a.minutes + (more[i]?.minutes ?? 0)),
    }
  }
  const made = { checks: priced(problem.checks), repairs: priced(problem.repairs) }
  prices.set(open, made)
  return made
}

/** True when something of these minutes may still start (rule 5 of engine.md 2.1). */
export const inTime = ({ daylight }: Problem, elapsed: number, minutes: number): boolean =>
  elapsed + minutes <= daylight + 1e-9

/** What a repair done here costs at least; `price` and `minutes` with its set-ups. */
export function repairBound(
  { problem, known }: Bounds,
  point: Point,
  at: { index: number; price: number; minutes: number },
): number {
  const repair = problem.repairs[at.index]
  if (repair === undefined) return Number.POSITIVE_INFINITY
  const { w } = point
  const open = (point.open | repair.setups) & ~problem.closed
  const costs = known(open, point.repairs & ~(1 << at.index), point.elapsed + at.minutes)
  let total = 0
  for (let f = 0; f < w.length; f++) {
    const x = w[f] ?? 0
    if (x <= 0) continue
    total += at.price * x
    const stays = x * (repair.fails[f] ?? 1)
    if (stays <= 0) continue
    const wrong = stays * (problem.falsePass[f] ?? 0)
    total += wrong * problem.comeback
    if (stays > wrong) total += (stays - wrong) * (costs[f] ?? 0)
  }
  return total
}

/** What all checks of a point share: its mass, and what the known fault costs when nothing new is opened. */
export type Common = { mass: number; known: number | null }

/** The common part of a point's checks. */
export function commonOf({ known, problem }: Bounds, point: Point): Common {
  const { w, open, repairs, elapsed } = point
  const timeless = problem.daylight === Number.POSITIVE_INFINITY
  return { mass: massOf(w), known: timeless ? dot(w, known(open, repairs, elapsed)) : null }
}

/** What a check done here costs at least. */
export function checkBound(
  { problem, known }: Bounds,
  point: Point,
  at: { index: number; price: number; minutes: number; common: Common },
): number {
  const { common, price } = at
  const setups = problem.checks[at.index]?.setups ?? 0
  if (common.known !== null && (setups & ~point.open) === 0)
    return price * common.mass + common.known
  const costs = known(point.open | setups, point.repairs, point.elapsed + at.minutes)
  return price * common.mass + dot(point.w, costs)
}

/** The least over the actions of a point. */
export function lowerBound(bounds: Bounds, point: Point): number {
  let stop = Number.POSITIVE_INFINITY
  for (const { byFault } of bounds.problem.stops) stop = Math.min(stop, dot(point.w, byFault))
  const common = commonOf(bounds, point)
  return leastRepair(bounds, point, {
    common,
    least: leastCheck(bounds, point, { common, least: stop }),
  })
}

type SoFar = { common: Common; least: number }

function leastCheck(bounds: Bounds, point: Point, { common, least }: SoFar): number {
  const { price: prices, minutes: times } = pricesAt(bounds, point.open).checks
  let best = least
  for (let index = 0, left = point.checks; left !== 0; index++, left >>>= 1) {
    const [price, minutes] = [prices[index] ?? 0, times[index] ?? 0]
    if ((left & 1) === 0 || price * common.mass >= best) continue
    if (inTime(bounds.problem, point.elapsed, minutes))
      best = Math.min(best, checkBound(bounds, point, { index, price, minutes, common }))
  }
  return best
}

function leastRepair(bounds: Bounds, point: Point, { common, least }: SoFar): number {
  const { price: prices, minutes: times } = pricesAt(bounds, point.open).repairs
  let best = least
  for (let index = 0, left = point.repairs; left !== 0; index++, left >>>= 1) {
    const [price, minutes] = [prices[index] ?? 0, times[index] ?? 0]
    if ((left & 1) === 0 || price * common.mass >= best) continue
    if (inTime(bounds.problem, point.elapsed, minutes))
      best = Math.min(best, repairBound(bounds, point, { index, price, minutes }))
  }
  return best
}

/** Repairs without checks from a point on. */
export const upperBound = ({ problem }: Bounds, point: Point): number =>
  repairsOnlyOf(problem, point, point.repairs)
