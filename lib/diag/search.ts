/**
 * The exact search: depth first over the and-or graph with a memo, always into the action that looks cheapest
 * and only as far as it still does (learning depth-first search, Bonet and Geffner 2006, with the threshold of
 * recursive best-first search, Korf 1993). Every value is a lower bound that only rises; a point is solved when
 * the action on top is solved. So the answer is the exact optimum, or, past `limit` expansions, a lower bound.
 */
import { type KnownCosts, knownCosts } from './known-cost'
import type { Point, Problem } from './search-problem'
import {
  afterCheck,
  afterRepair,
  bestStop,
  dot,
  massOf,
  type Priced,
  priceOf,
} from './search-steps'

/** A child is followed this much further than needed: fewer returns for a few expansions more. */
const EAGER = 0.01

export type ActionType = 'check' | 'repair' | 'stop'

/** An action at a point; `bound` is at most its true cost, and equals it when `exact`. */
export type Option = Priced & {
  type: ActionType
  bound: number
  exact: boolean
  fixed: number
  children: Node[] | null
}

export type Node = { point: Point; bound: number; solved: boolean; options: Option[] | null }

export type Search = {
  problem: Problem
  known: KnownCosts
  nodes: Map<number | string, Node>
  /** Whether a point's key fits one number; else it is a string. */
  numeric: boolean
  expanded: number
  limit: number
  /** Cost below which differences do not count. */
  slack: number
}

/** A search over a problem, with a budget of expansions. */
export function startSearch(problem: Problem, limit: number): Search {
  const codes = problem.checks.reduce((n, c) => n * (c.p.length + 1), 1)
  const size = codes * 2 ** (problem.repairs.length + problem.setups.length)
  return {
    problem,
    known: knownCosts(problem),
    nodes: new Map(),
    numeric: size < 2 ** 52 && problem.daylight === Number.POSITIVE_INFINITY,
    expanded: 0,
    limit,
    slack: 0,
  }
}

/** The node of a point: known already, or new with its lower bound. */
export function nodeAt(search: Search, point: Point): Node {
  const key = keyOf(search, point)
  const known = search.nodes.get(key)
  if (known !== undefined) return known
  const node: Node = { point, bound: lowerBound(search, point), solved: false, options: null }
  search.nodes.set(key, node)
  return node
}

/** Raises the node's bound until it is solved, exceeds `upTo`, or the budget is spent. */
export function solve(search: Search, node: Node, upTo: number): void {
  while (!node.solved && node.bound <= upTo) {
    if (node.options === null && !expand(search, node)) return
    const { best, second } = topTwo(node.options ?? [])
    if (best === null) return
    node.bound = Math.max(node.bound, best.bound)
    if (best.exact) {
      node.solved = true
      node.bound = best.bound
      return
    }
    if (best.bound > upTo) return
    const before = search.expanded
    deepen(search, { node, option: best, upTo: Math.min(upTo, second) })
    if (search.expanded >= search.limit && before === search.expanded) return
  }
}

/** The cheapest option by bound, an exact one first among equals, and the bound of the next. */
export function topTwo(options: readonly Option[]): { best: Option | null; second: number } {
  let best: Option | null = null
  let second = Number.POSITIVE_INFINITY
  for (const option of options) {
    if (best === null || better(option, best)) {
      if (best !== null) second = Math.min(second, best.bound)
      best = option
    } else second = Math.min(second, option.bound)
  }
  return { best, second }
}

function keyOf({ problem, numeric }: Search, point: Point): number | string {
  const place =
    (point.code * 2 ** problem.repairs.length + point.repairs) * 2 ** problem.setups.length +
    point.open
  if (numeric) return place
  return `${point.code}|${point.repairs}|${point.open}|${point.elapsed.toFixed(6)}`
}

function expand(search: Search, node: Node): boolean {
  if (search.expanded >= search.limit) return false
  search.expanded++
  node.options = optionsAt(search, node.point)
  return true
}

function better(a: Option, b: Option): boolean {
  return a.bound < b.bound || (a.bound === b.bound && a.exact && !b.exact)
}

function deepen(
  search: Search,
  { node, option, upTo }: { node: Node; option: Option; upTo: number },
): void {
  if (option.children === null) {
    const { problem } = search
    const after = option.type === 'check' ? afterCheck : afterRepair
    const step = after(problem, node.point, option)
    option.fixed = step.fixed
    option.children = step.next.map((p) => nodeAt(search, p))
    refresh(option)
    return
  }
  refresh(option)
  for (const child of option.children) {
    if (child.solved) continue
    if (option.bound > upTo) return
    const room = Math.max(0, upTo - option.bound) + search.slack + EAGER * child.bound
    solve(search, child, child.bound + room)
    refresh(option)
  }
}

function refresh(option: Option): void {
  let bound = option.fixed
  let exact = true
  for (const child of option.children ?? []) {
    bound += child.bound
    exact = exact && child.solved
  }
  option.exact = exact
  option.bound = exact ? bound : Math.max(option.bound, bound)
}

function optionsAt(search: Search, point: Point): Option[] {
  const { problem } = search
  const common = commonOf(search, point)
  const options: Option[] = problem.stops.map(({ byFault }, index) => {
    const cost = dot(point.w, byFault)
    return {
      type: 'stop',
      index,
      price: 0,
      minutes: 0,
      bound: cost,
      fixed: cost,
      exact: true,
      children: [],
    }
  })
  eachLeft(search, point, (type, priced) => {
    const { index, price, minutes } = priced
    const bound = boundOf(search, point, { type, priced, common })
    options.push({ type, index, price, minutes, bound, fixed: 0, exact: false, children: null })
  })
  return options
}

/** Every check and repair that may still start at a point, repairs first. */
function eachLeft(
  { problem }: Search,
  { repairs, checks, open, elapsed }: Point,
  visit: (type: 'check' | 'repair', priced: Priced) => void,
): void {
  problem.repairs.forEach((repair, index) => {
    if ((repairs & (1 << index)) === 0) return
    const priced = priceOf(problem, { open, elapsed, index }, repair)
    if (priced !== null) visit('repair', priced)
  })
  problem.checks.forEach((check, index) => {
    if ((checks & (1 << index)) === 0) return
    const priced = priceOf(problem, { open, elapsed, index }, check)
    if (priced !== null) visit('check', priced)
  })
}

function repairBound({ problem, known }: Search, point: Point, at: Priced): number {
  const repair = problem.repairs[at.index]
  if (repair === undefined) return Number.POSITIVE_INFINITY
  const open = (point.open | repair.setups) & ~problem.closed
  const costs = known(open, point.repairs & ~(1 << at.index), point.elapsed + at.minutes)
  let total = 0
  for (let f = 0; f < point.w.length; f++) {
    const x = point.w[f] ?? 0
    if (x <= 0) continue
    const survives = x * (repair.fails[f] ?? 1)
    const wrong = survives * (problem.falsePass[f] ?? 0)
    total += at.price * x + wrong * problem.comeback
    if (survives > wrong) total += (survives - wrong) * (costs[f] ?? 0)
  }
  return total
}

/** What all checks of a point share: its mass, and the known costs when nothing new is opened. */
type Common = { mass: number; known: number | null }

function commonOf({ known, problem }: Search, { w, open, repairs, elapsed }: Point): Common {
  const timeless = problem.daylight === Number.POSITIVE_INFINITY
  return { mass: massOf(w), known: timeless ? dot(w, known(open, repairs, elapsed)) : null }
}

function boundOf(
  search: Search,
  point: Point,
  { type, priced, common }: { type: 'check' | 'repair'; priced: Priced; common: Common },
): number {
  if (type === 'repair') return repairBound(search, point, priced)
  const setups = search.problem.checks[priced.index]?.setups ?? 0
  const opens = (setups & ~point.open) !== 0
  if (common.known !== null && !opens) return priced.price * common.mass + common.known
  const costs = search.known(point.open | setups, point.repairs, point.elapsed + priced.minutes)
  return priced.price * common.mass + dot(point.w, costs)
}

/** The least bound over the actions of a point: one step further than "the fault is known". */
function lowerBound(search: Search, point: Point): number {
  const common = commonOf(search, point)
  let least = bestStop(search.problem, point.w).cost
  eachLeft(search, point, (type, priced) => {
    const bound = boundOf(search, point, { type, priced, common })
    if (bound < least) least = bound
  })
  return least
}
