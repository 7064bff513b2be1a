/**
 * The search: best-first trials over the and-or graph with a memo, between a lower and an upper bound of every
 * point (bounded real-time dynamic programming, McMahan, Likhachev and Gordon 2005; heuristic search value
 * iteration, Smith and Simmons 2004). Each trial goes into the action that could be cheapest and there to the
 * outcome about which least is known. When the bounds of the start meet, the answer is the exact optimum; past
 * `limit` expansions it is the action that is thought to cost least (guessOf), and its upper bound is the cost
 * of a plan that can be carried out.
 */
import { boundsOf } from './search-bounds'
import { deepen, expand, nodeAt, refreshOption, type Search } from './search-moves'
import { startPool, type Wanted } from './search-nodes'
import type { Problem } from './search-problem'

/** Where a search begins: weights that sum to 1, checks and repairs left and set-ups open as masks. */
export type Start = Wanted & { w: Float64Array }

/** A trial ends where less than this share of what is unknown at the start is unknown. */
const WORTH = 0.02
/** Trials in a row that expand nothing, after which bounds that have not met are left so. */
const MOST_IDLE = 200
/** Bounds that differ by less than this share of the cost have met: what is left is rounding. */
const SLACK = 1e-12
/**
 * How far above its lower bound a point at the edge is thought to lie, as a share of the gap (a choice: of 0.1 to
 * 0.7 it lost least against the optimum over 100 invented models of 8 faults and 8 checks).
 */
const OF_GAP = 0.45
/** A search over a problem with at most 30 checks and 30 repairs, with a budget of expansions, and its first point. */
export function startSearch(
  problem: Problem,
  start: Start,
  limit: number,
): { search: Search; root: number } {
  const pool = startPool(problem)
  const search = { problem, bounds: boundsOf(problem), pool, expanded: 0, limit, slack: 0 }
  pool.room.w.set(start.w)
  const root = nodeAt(search, start)
  const { low, high } = pool.nodes
  const size = [high[root] ?? 0, low[root] ?? 0].find(Number.isFinite) ?? 0
  search.slack = SLACK * Math.max(1, Math.abs(size))
  return { search, root }
}

/** Brings the bounds of a point together until they meet or the budget is spent; every action of it is looked at. */
export function solve(search: Search, node: number): void {
  const { nodes, options } = search.pool
  if ((nodes.first[node] ?? 0) < 0) expand(search, node, Number.POSITIVE_INFINITY)
  const first = nodes.first[node] ?? 0
  for (let o = first; o < first + (nodes.many[node] ?? 0); o++)
    if ((options.kid[o] ?? 0) < 0) deepen(search, node, o)
  refreshNode(search, node)
  for (let idle = 0; idle < MOST_IDLE && isOpen(search, node); ) {
    const before = search.expanded
    trial(search, node, idle > 0 ? 0 : gapOf(search, node) * WORTH)
    idle = search.expanded === before ? idle + 1 : 0
  }
}

function isOpen(search: Search, node: number): boolean {
  return search.expanded < search.limit && !(gapOf(search, node) <= search.slack)
}

/** The options of a point in their order: stops, repairs, checks, each as in the model. */
export function optionsOf({ pool: { nodes } }: Search, node: number): number[] {
  const first = nodes.first[node] ?? -1
  return first < 0 ? [] : Array.from({ length: nodes.many[node] ?? 0 }, (_, i) => first + i)
}

/** The points an option leads to. */
export function pointsAfter({ pool: { options, kids } }: Search, option: number): Int32Array {
  const kid = options.kid[option] ?? 0
  return kids.list.subarray(kid, kid + (options.many[option] ?? 0))
}

/** Solves a point as if one of its options were not there; its bounds without it. The point is left as it was. */
export function solveWithout(
  search: Search,
  node: number,
  option: number,
): { low: number; high: number } {
  const { nodes, options } = search.pool
  const kept = [nodes.low[node], nodes.high[node], options.low[option], options.high[option]]
  nodes.low[node] = Number.NEGATIVE_INFINITY
  for (const [list, at] of [
    [nodes.high, node],
    [options.low, option],
    [options.high, option],
  ] as const)
    list[at] = Number.POSITIVE_INFINITY
  solve(search, node)
  const found = { low: nodes.low[node] ?? 0, high: nodes.high[node] ?? 0 }
  const [low = 0, high = 0, optionLow = 0, optionHigh = 0] = kept
  nodes.low[node] = low
  nodes.high[node] = high
  options.low[option] = optionLow
  options.high[option] = optionHigh
  return found
}

/**
 * Where an option is thought to lie: a share of the way between the bounds of every point at the edge of what was
 * looked at. The lower bound is too low by the checks that it leaves out and the upper one too high by those
 * that its plan leaves out; of two options neither alone says which is better. Ask once
 * the search is over: points keep their guesses.
 */
export function guessOf(search: Search, option: number): number {
  const { options } = search.pool
  const high = options.high[option] ?? 0
  if ((options.kid[option] ?? 0) < 0) return high
  let sum = options.fixed[option] ?? 0
  for (const node of pointsAfter(search, option)) sum += guessAt(search, node)
  return Math.min(high, Math.max(options.low[option] ?? 0, sum))
}

function guessAt(search: Search, node: number): number {
  const { nodes, options } = search.pool
  const known = nodes.guess[node] ?? 0
  if (!Number.isNaN(known)) return known
  const low = nodes.low[node] ?? 0
  const high = nodes.high[node] ?? 0
  let guess = high > low ? low + OF_GAP * (high - low) : high
  const first = nodes.first[node] ?? 0
  if (first >= 0 && high > low) {
    let least = Number.POSITIVE_INFINITY
    for (let o = first; o < first + (nodes.many[node] ?? 0); o++)
      if ((options.kid[o] ?? 0) >= 0) least = Math.min(least, guessOf(search, o))
    guess = Math.min(high, Math.max(low, least))
  }
  nodes.guess[node] = guess
  return guess
}

/** One way down, and the bounds on it anew on the way up. */
function trial(search: Search, node: number, need: number): void {
  const { nodes, options } = search.pool
  if (gapOf(search, node) <= Math.max(need, search.slack * 1e-3)) return
  if ((nodes.first[node] ?? 0) < 0) {
    if (search.expanded >= search.limit) return
    expand(search, node, nodes.high[node] ?? 0)
  }
  let option = cheapest(search, node)
  while (option >= 0 && (options.kid[option] ?? 0) < 0) {
    deepen(search, node, option)
    refreshNode(search, node)
    option = cheapest(search, node)
  }
  if (option < 0) return
  const child = widest(search, option)
  if (child >= 0) trial(search, child, need)
  refreshOption(search, option)
  refreshNode(search, node)
}

/** The option that could be cheapest, by upper bound among equals; -1 where there is none. */
function cheapest({ pool: { nodes, options } }: Search, node: number): number {
  const { low, high } = options
  const first = nodes.first[node] ?? 0
  const end = first + (nodes.many[node] ?? 0)
  let best = -1
  let leastLow = Number.POSITIVE_INFINITY
  let leastHigh = Number.POSITIVE_INFINITY
  for (let o = first; o < end; o++) {
    const x = low[o] ?? 0
    if (x > leastLow || (x === leastLow && (high[o] ?? 0) >= leastHigh)) continue
    best = o
    leastLow = x
    leastHigh = high[o] ?? 0
  }
  return best
}

/** The point of which least is known; weights are joint, so that gaps add up as they stand. -1: all is known. */
function widest(search: Search, option: number): number {
  const { kids, options } = search.pool
  const kid = options.kid[option] ?? 0
  let pick = -1
  let most = 0
  for (let k = kid; k < kid + (options.many[option] ?? 0); k++) {
    const gap = gapOf(search, kids.list[k] ?? 0)
    if (gap > most) {
      most = gap
      pick = kids.list[k] ?? 0
    }
  }
  return pick
}

function refreshNode({ pool: { nodes, options } }: Search, node: number): void {
  let low = Number.POSITIVE_INFINITY
  let high = nodes.high[node] ?? 0
  const first = nodes.first[node] ?? 0
  const end = first + (nodes.many[node] ?? 0)
  for (let o = first; o < end; o++) {
    low = Math.min(low, options.low[o] ?? 0)
    high = Math.min(high, options.high[o] ?? 0)
  }
  nodes.high[node] = high
  nodes.low[node] = Math.min(high, Math.max(nodes.low[node] ?? 0, low))
}

/** How far the bounds of a point are apart. */
export function gapOf({ pool: { nodes } }: Search, node: number): number {
  const low = nodes.low[node] ?? 0
  const high = nodes.high[node] ?? 0
  return high > low ? high - low : 0
}
