/**
 * The search: best-first trials over the and-or graph with a memo, between a lower and an upper bound of every
 * point (bounded real-time dynamic programming, McMahan, Likhachev and Gordon 2005; heuristic search value
 * iteration, Smith and Simmons 2004). Each trial goes into the action that could be cheapest and there to the
 * outcome about which least is known. When the bounds of the start meet, the answer is the exact optimum; past
 * `limit` expansions it is the action that is thought to cost least (guessOf), and its upper bound is the cost
 * of a plan that can be carried out.
 */
import { knownCosts } from './known-cost'
import {
  type Bounds,
  checkBound,
  commonOf,
  inTime,
  lowerBound,
  pricesAt,
  repairBound,
  upperBound,
} from './search-bounds'
import type { Point, Problem } from './search-problem'
import { afterCheck, afterRepair, dot } from './search-steps'

export type ActionType = 'check' | 'repair' | 'stop'

/** An action at a point; its true cost lies between `low` and `high`. */
export type Option = {
  type: ActionType
  index: number
  price: number
  minutes: number
  low: number
  high: number
  fixed: number
  children: Node[] | null
}

export type Node = {
  point: Point
  low: number
  high: number
  options: Option[] | null
  /** Where it is thought to lie, while its bounds are apart; null: not asked yet. */
  guess: number | null
}

export type Search = Bounds & {
  nodes: Map<number | string, Node>
  /** Whether a point's key fits one number; else it is a string. */
  numeric: boolean
  expanded: number
  limit: number
  /** Bounds this near each other have met. */
  slack: number
}

/** A trial ends where less than this share of what is unknown at the start is unknown. */
const WORTH = 0.02
/** Trials in a row that expand nothing, after which bounds that have not met are left so. */
const MOST_IDLE = 200

/** A search over a problem, with a budget of expansions. */
export function startSearch(problem: Problem, limit: number): Search {
  const codes = problem.checks.reduce((n, c) => n * (c.p.length + 1), 1)
  const size = codes * 2 ** (problem.repairs.length + problem.setups.length)
  return {
    problem,
    known: knownCosts(problem),
    prices: new Map(),
    nodes: new Map(),
    numeric: size < 2 ** 52 && problem.daylight === Number.POSITIVE_INFINITY,
    expanded: 0,
    limit,
    slack: 0,
  }
}

/** The node of a point: known already, or new with its bounds. */
export function nodeAt(search: Search, point: Point): Node {
  const key = keyOf(search, point)
  const known = search.nodes.get(key)
  if (known !== undefined) return known
  const high = upperBound(search, point)
  const low = Math.min(high, lowerBound(search, point))
  const node = { point, low, high, options: null, guess: null }
  search.nodes.set(key, node)
  return node
}

/** Brings the bounds of a node together until they meet or the budget is spent; every action of it is looked at. */
export function solve(search: Search, node: Node): void {
  if (node.options === null) expand(search, node, Number.POSITIVE_INFINITY)
  for (const option of node.options ?? []) deepen(search, node, option)
  refreshNode(node)
  for (let idle = 0; idle < MOST_IDLE && isOpen(search, node); ) {
    const before = search.expanded
    trial(search, node, idle > 0 ? 0 : (node.high - node.low) * WORTH)
    idle = search.expanded === before ? idle + 1 : 0
  }
}

const isOpen = ({ slack, expanded, limit }: Search, { low, high }: Node): boolean =>
  high - low > slack && expanded < limit

/** The two options least by a measure; the first of equals in the order of the options. */
export function topTwo(
  options: readonly Option[],
  measure: (option: Option) => number,
): { best: Option | null; second: Option | null } {
  let best: [Option, number] | null = null
  let second: [Option, number] | null = null
  for (const option of options) {
    const x = measure(option)
    if (best === null || x < best[1]) {
      second = best
      best = [option, x]
    } else if (second === null || x < second[1]) second = [option, x]
  }
  return { best: best?.[0] ?? null, second: second?.[0] ?? null }
}

/**
 * Where an option is thought to lie: the middle between the bounds of every point at the edge of what was
 * looked at. The lower bound is too low by the checks that it leaves out and the upper one too high by those
 * that its plan leaves out; of two options neither alone says which is better. Ask once
 * the search is over: points keep their guesses.
 */
export function guessOf(option: Option): number {
  if (option.children === null) return option.high
  let sum = option.fixed
  for (const child of option.children) sum += guessAt(child)
  return Math.min(option.high, Math.max(option.low, sum))
}

function guessAt(node: Node): number {
  if (node.guess !== null) return node.guess
  let guess = (node.low + node.high) / 2
  if (node.options !== null && node.high > node.low) {
    let least = Number.POSITIVE_INFINITY
    for (const option of node.options)
      if (option.children !== null) least = Math.min(least, guessOf(option))
    guess = Math.min(node.high, Math.max(node.low, least))
  }
  node.guess = guess
  return guess
}

function keyOf({ problem, numeric }: Search, point: Point): number | string {
  const place =
    (point.code * 2 ** problem.repairs.length + point.repairs) * 2 ** problem.setups.length +
    point.open
  if (numeric) return place
  return `${point.code}|${point.repairs}|${point.open}|${point.elapsed.toFixed(6)}`
}

/** One way down, and the bounds on it anew on the way up. */
function trial(search: Search, node: Node, need: number): void {
  if (node.high - node.low <= Math.max(need, search.slack * 1e-3)) return
  if (node.options === null) {
    if (search.expanded >= search.limit) return
    expand(search, node)
  }
  let option = cheapest(node.options ?? [])
  while (option !== null && option.children === null) {
    deepen(search, node, option)
    refreshNode(node)
    option = cheapest(node.options ?? [])
  }
  if (option === null) return
  const child = widest(option.children ?? [])
  if (child !== null) trial(search, child, need)
  refreshOption(option)
  refreshNode(node)
}

/** The option that could be cheapest, by upper bound among equals. */
function cheapest(options: readonly Option[]): Option | null {
  let best: Option | null = null
  for (const option of options)
    if (
      best === null ||
      option.low < best.low ||
      (option.low === best.low && option.high < best.high)
    )
      best = option
  return best
}

/** The child of which least is known; weights are joint, so that gaps add up as they stand. */
function widest(children: readonly Node[]): Node | null {
  let pick: Node | null = null
  let gap = 0
  for (const child of children)
    if (child.high - child.low > gap) {
      gap = child.high - child.low
      pick = child
    }
  return pick
}

function deepen(search: Search, { point }: Node, option: Option): void {
  if (option.children !== null) return
  const after = option.type === 'check' ? afterCheck : afterRepair
  const step = after(search.problem, point, option)
  option.fixed = step.fixed
  option.children = step.next.map((next) => nodeAt(search, next))
  refreshOption(option)
}

function refreshOption(option: Option): void {
  let low = option.fixed
  let high = option.fixed
  for (const child of option.children ?? []) {
    low += child.low
    high += child.high
  }
  if (high < option.high) option.high = high
  option.low = Math.min(option.high, Math.max(option.low, low))
}

function refreshNode(node: Node): void {
  let low = Number.POSITIVE_INFINITY
  for (const option of node.options ?? []) {
    if (option.low < low) low = option.low
    if (option.high < node.high) node.high = option.high
  }
  node.low = Math.min(node.high, Math.max(node.low, low))
}

/** Lists the actions of a node whose lower bound is no more than `most`. */
function expand(search: Search, node: Node, most = node.high): void {
  search.expanded++
  const { problem } = search
  const { point } = node
  const prices = pricesAt(search, point.open)
  const common = commonOf(search, point)
  const options: Option[] = problem.stops.map(({ byFault }, index) => {
    const cost = dot(point.w, byFault)
    const free = { price: 0, minutes: 0, fixed: cost, children: [] }
    return { type: 'stop', index, low: cost, high: cost, ...free }
  })
  const offer = (type: 'check' | 'repair', index: number, bound: typeof repairBound): void => {
    const { price: all, minutes: times } = type === 'check' ? prices.checks : prices.repairs
    const [price, minutes] = [all[index] ?? 0, times[index] ?? 0]
    if (!inTime(problem, point.elapsed, minutes)) return
    const low = bound(search, point, { index, price, minutes })
    const high = Number.POSITIVE_INFINITY
    if (low <= most)
      options.push({ type, index, price, minutes, low, high, fixed: 0, children: null })
  }
  for (let i = 0, left = point.repairs; left !== 0; i++, left >>>= 1)
    if ((left & 1) !== 0) offer('repair', i, repairBound)
  for (let i = 0, left = point.checks; left !== 0; i++, left >>>= 1)
    if ((left & 1) !== 0) offer('check', i, (b, p, at) => checkBound(b, p, { ...at, common }))
  node.options = options
}
