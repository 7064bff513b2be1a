/**
 * What a point costs at least. An action costs at least its price, and after it what the fault would cost if it
 * were known: knowing more never costs more. That is a plain sum over the weights, with one coefficient per
 * fault, the same at every point with these set-ups open, these repairs left and these minutes gone: a level.
 */
import { type KnownCost, knownCosts } from './known-cost'
import { type Check, opening, type Problem, type Repair } from './search-problem'

/** Actions of one kind at a level. `fit` is a mask of those that may still start (rule 5 of engine.md 2.1). */
export type Side = {
  fit: number
  /** Price per unit of mass and minutes, with the set-ups that are not open yet. */
  price: Float64Array
  minutes: Float64Array
  /** The few faults that would be known to cost more after the action, and by how much: from `from[i]` to `from[i + 1]`. */
  from: Int32Array
  fault: Int32Array
  more: Float64Array
}

/** `known` is what a unit of each fault costs when it is known here. */
export type Level = { known: Float64Array; checks: Side; repairs: Side }

/** The lower bounds of a problem, made as levels are come by. */
export type Bounds = {
  problem: Problem
  known: KnownCost
  /** By open set-ups, repairs left, and minutes gone where there is a clock. */
  levels: Map<number, Map<number, Map<number, Level>>>
}

/** Bounds of a problem with at most 30 checks and 30 repairs. */
export function boundsOf(problem: Problem): Bounds {
  return { problem, known: knownCosts(problem), levels: new Map() }
}

type Where = { open: number; repairs: number; elapsed: number }

/** The level of a point. */
export function levelAt(bounds: Bounds, open: number, repairs: number, elapsed: number): Level {
  const minutes = bounds.problem.daylight === Number.POSITIVE_INFINITY ? 0 : elapsed
  const byMinutes = inner(inner(bounds.levels, open), repairs)
  let level = byMinutes.get(minutes)
  if (level === undefined) {
    level = makeLevel(bounds, { open, repairs, elapsed: minutes })
    byMinutes.set(minutes, level)
  }
  return level
}

function inner<V>(map: Map<number, Map<number, V>>, key: number): Map<number, V> {
  let found = map.get(key)
  if (found === undefined) {
    found = new Map()
    map.set(key, found)
  }
  return found
}

function makeLevel({ problem, known }: Bounds, at: Where): Level {
  const { falsePass, comeback, closed, faults } = problem
  const here = Float64Array.from(faults, (_, f) => known(f, at))
  const checks = sideOf({ problem, at, here }, problem.checks, ({ setups }, minutes) => {
    const then = { open: at.open | setups, repairs: at.repairs, elapsed: at.elapsed + minutes }
    return (f) => known(f, then)
  })
  const repairs = sideOf(
    { problem, at, here },
    problem.repairs,
    ({ setups, fails }, minutes, r) => {
      const then = {
        open: (at.open | setups) & ~closed,
        repairs: at.repairs & ~(1 << r),
        elapsed: at.elapsed + minutes,
      }
      return (f) => {
        const stays = fails[f] ?? 1
        const slips = stays * (falsePass[f] ?? 0)
        return slips * comeback + (stays > slips ? (stays - slips) * known(f, then) : 0)
      }
    },
  )
  return { known: here, checks, repairs }
}

type Here = { problem: Problem; at: Where; here: Float64Array }
/** What a unit of a fault costs at least once an action is done. */
type After<A> = (action: A, minutes: number, index: number) => (fault: number) => number

function sideOf<A extends Check | Repair>(
  { problem, at, here }: Here,
  actions: readonly A[],
  after: After<A>,
): Side {
  const price = new Float64Array(actions.length)
  const times = new Float64Array(actions.length)
  const from = new Int32Array(actions.length + 1)
  const fault: number[] = []
  const more: number[] = []
  let fit = 0
  actions.forEach((action, i) => {
    const shut = opening(problem, action.setups, at.open)
    const minutes = action.minutes + shut.minutes
    price[i] = action.price + shut.price
    times[i] = minutes
    if (at.elapsed + minutes <= problem.daylight + 1e-9) {
      fit |= 1 << i
      const costs = after(action, minutes, i)
      here.forEach((known, f) => {
        const cost = costs(f)
        // Where no end is in sight there is none after the action either.
        if (cost === known || known === Number.POSITIVE_INFINITY) return
        fault.push(f)
        more.push(cost - known)
      })
    }
    from[i + 1] = fault.length
  })
  return {
    fit,
    price,
    minutes: times,
    from,
    fault: Int32Array.from(fault),
    more: Float64Array.from(more),
  }
}

/** Weights, in a row of a larger array that begins at `at`. */
export type Row = { w: Float64Array; at: number }

/** What a point costs when its fault is known, and its mass: what the bounds of all its actions share. */
export type Shared = { known: number; mass: number }

/** The shared part of a point. */
export function sharedOf(level: Level, row: Row): Shared {
  const width = level.known.length
  let mass = 0
  for (let f = 0; f < width; f++) mass += row.w[row.at + f] ?? 0
  return { known: rowCost(row, level.known), mass }
}

/** What an action costs at least at a point. */
export function actionBound(side: Side, index: number, row: Row, { known, mass }: Shared): number {
  let cost = known + mass * (side.price[index] ?? 0)
  const end = side.from[index + 1] ?? 0
  for (let k = side.from[index] ?? 0; k < end; k++) {
    const x = row.w[row.at + (side.fault[k] ?? 0)] ?? 0
    if (x > 0) cost += x * (side.more[k] ?? 0)
  }
  return cost
}

type Left = { checks: number; repairs: number }

/** The least over the checks and repairs (masks) left at a point, and `most`: the cost of a plan, stops among them. */
export function lowerBound(level: Level, row: Row, left: Left, most: number): number {
  const shared = sharedOf(level, row)
  return leastOf(level.checks, row, shared, {
    left: left.checks,
    most: leastOf(level.repairs, row, shared, { left: left.repairs, most }),
  })
}

function leastOf(
  side: Side,
  row: Row,
  shared: Shared,
  { left, most }: { left: number; most: number },
): number {
  let least = most
  for (let i = 0, mask = left & side.fit; mask !== 0; i++, mask >>>= 1)
    if ((mask & 1) !== 0) least = Math.min(least, actionBound(side, i, row, shared))
  return least
}

/** Weights times costs; a fault without weight costs nothing, even where no end is in sight. */
export function rowCost({ w, at }: Row, costs: Float64Array): number {
  let total = 0
  for (let f = 0; f < costs.length; f++) {
    const x = w[at + f] ?? 0
    if (x > 0) total += x * (costs[f] ?? 0)
  }
  return total
}
