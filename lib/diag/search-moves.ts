/** Moves of a search: what can be done at a point, and the points that doing it leads to. */
import { repairsOnlyOf } from './repairs-only'
import {
  actionBound,
  type Bounds,
  levelAt,
  lowerBound,
  rowCost,
  type Side,
  sharedOf,
} from './search-bounds'
import { addKid, addNode, addOption, findNode, type Pool, type Wanted } from './search-nodes'
import type { ActionType, Problem } from './search-problem'
import { NO_MASS } from './search-steps'

/** A search under way: what it looks at, within which count of expansions. */
export type Search = {
  problem: Problem
  bounds: Bounds
  pool: Pool
  expanded: number
  limit: number
  /** Bounds this near each other have met. */
  slack: number
}

/** An option as an action of the problem. */
export type Action = { type: ActionType; index: number }

const TYPES = ['stop', 'repair', 'check'] as const
const codeOf = (type: ActionType, index: number): number =>
  index * TYPES.length + TYPES.indexOf(type)

/** The action of an option. */
export function actionOf({ pool }: Search, option: number): Action {
  const code = pool.options.action[option] ?? 0
  const index = Math.floor(code / TYPES.length)
  return { type: TYPES[code - index * TYPES.length] ?? 'stop', index }
}

/** The point of what is in the pool's room: known already, or new with its bounds. */
export function nodeAt({ problem, bounds, pool }: Search, wanted: Wanted): number {
  const found = findNode(pool, wanted)
  if (found >= 0) return found
  const node = addNode(pool, wanted)
  const { open, repairs, elapsed } = wanted
  const row = { w: pool.nodes.w, at: node * pool.width, open, elapsed }
  const high = repairsOnlyOf(problem, row, repairs)
  pool.nodes.high[node] = high
  pool.nodes.begins[node] = problem.room.first
  pool.nodes.low[node] = lowerBound(levelAt(bounds, open, repairs, elapsed), row, wanted, high)
  return node
}

/** Lists the actions of a point whose lower bound is no more than `most`, and the one its plan begins with. */
export function expand(search: Search, node: number, most: number): void {
  search.expanded++
  const { problem, bounds, pool } = search
  const { nodes, options } = pool
  const open = nodes.open[node] ?? 0
  const repairs = nodes.repairs[node] ?? 0
  const elapsed = nodes.elapsed[node] ?? 0
  const row = { w: nodes.w, at: node * pool.width, open, elapsed }
  const plan = nodes.high[node] ?? 0
  const begins = nodes.begins[node] ?? -1
  const first = options.count
  problem.stops.forEach(({ byFault }, index) => {
    const cost = rowCost(row, byFault)
    const option = addOption(pool, codeOf('stop', index), cost, cost)
    options.fixed[option] = cost
    options.kid[option] = 0
  })
  const level = levelAt(bounds, open, repairs, elapsed)
  const shared = sharedOf(level, row)
  const offer = (type: 'check' | 'repair', side: Side, left: number): void => {
    for (let i = 0, mask = left & side.fit; mask !== 0; i++, mask >>>= 1) {
      if ((mask & 1) === 0) continue
      const isPlan = type === 'repair' && i === begins
      const low = actionBound(side, i, row, shared)
      const high = isPlan ? plan : Number.POSITIVE_INFINITY
      if (low <= most || isPlan) addOption(pool, codeOf(type, i), Math.min(low, high), high)
    }
  }
  offer('repair', level.repairs, repairs)
  offer('check', level.checks, nodes.checks[node] ?? 0)
  nodes.first[node] = first
  nodes.many[node] = options.count - first
}

/** Carries an option out: the points it leads to. */
export function deepen(search: Search, node: number, option: number): void {
  const { options, kids } = search.pool
  const { type, index } = actionOf(search, option)
  const first = kids.count
  if (type === 'check') options.fixed[option] = checkDone(search, node, index)
  if (type === 'repair') options.fixed[option] = repairDone(search, node, index)
  options.kid[option] = first
  options.many[option] = kids.count - first
  refreshOption(search, option)
}

/** One point per outcome that can come up; what the check costs. */
function checkDone(search: Search, node: number, index: number): number {
  const { problem, bounds, pool } = search
  const { nodes, room } = pool
  const check = problem.checks[index]
  const place = pool.places[index]
  if (check === undefined || place === undefined) return 0
  const open = nodes.open[node] ?? 0
  const elapsed = nodes.elapsed[node] ?? 0
  const repairs = nodes.repairs[node] ?? 0
  const { price, minutes } = levelAt(bounds, open, repairs, elapsed).checks
  const wanted = {
    checks: (nodes.checks[node] ?? 0) & ~(1 << index),
    repairs,
    open: open | check.setups,
    elapsed: elapsed + (minutes[index] ?? 0),
  }
  for (let o = 0; o < check.p.length; o++) {
    if (!fillRow(pool, node, check.p[o] ?? NO_ROW)) continue
    copyCode(pool, node)
    room.code[place.word] = (room.code[place.word] ?? 0) + (o + 1) * place.value
    addKid(pool, nodeAt(search, wanted))
  }
  return (price[index] ?? 0) * massAt(pool, node)
}

const NO_ROW = new Float64Array(0)

/** The room's weights: those of a point times a row; false when nothing is left of them. */
function fillRow({ nodes, room, width }: Pool, node: number, row: Float64Array): boolean {
  let mass = 0
  for (let f = 0; f < width; f++) {
    const x = (nodes.w[node * width + f] ?? 0) * (row[f] ?? 0)
    room.w[f] = x
    mass += x
  }
  return mass > 0
}

function copyCode({ nodes, room, words }: Pool, node: number): void {
  for (let i = 0; i < words; i++) room.code[i] = nodes.code[node * words + i] ?? 0
}

/** The point where the test run failed for all to see; what the repair and comebacks cost. */
function repairDone(search: Search, node: number, index: number): number {
  const { problem, bounds, pool } = search
  const { nodes, room, width } = pool
  const repair = problem.repairs[index]
  if (repair === undefined) return 0
  const open = nodes.open[node] ?? 0
  const elapsed = nodes.elapsed[node] ?? 0
  const repairs = nodes.repairs[node] ?? 0
  const { price, minutes } = levelAt(bounds, open, repairs, elapsed).repairs
  let fixed = (price[index] ?? 0) * massAt(pool, node)
  let mass = 0
  for (let f = 0; f < width; f++) {
    const stays = (nodes.w[node * width + f] ?? 0) * (repair.fails[f] ?? 1)
    const wrong = stays * (problem.falsePass[f] ?? 0)
    fixed += problem.comeback * wrong
    room.w[f] = stays - wrong
    mass += stays - wrong
  }
  if (mass <= NO_MASS) return fixed
  copyCode(pool, node)
  const wanted = {
    checks: nodes.checks[node] ?? 0,
    repairs: repairs & ~(1 << index),
    open: (open | repair.setups) & ~problem.closed,
    elapsed: elapsed + (minutes[index] ?? 0),
  }
  addKid(pool, nodeAt(search, wanted))
  return fixed
}

/** The chance of coming to a point. */
export function massAt({ nodes, width }: Pool, node: number): number {
  let mass = 0
  for (let f = 0; f < width; f++) mass += nodes.w[node * width + f] ?? 0
  return mass
}

/** Brings the bounds of an option up to those of the points it leads to. */
export function refreshOption({ pool: { nodes, options, kids } }: Search, option: number): void {
  let low = options.fixed[option] ?? 0
  let high = low
  const kid = options.kid[option] ?? 0
  for (let k = kid; k < kid + (options.many[option] ?? 0); k++) {
    const node = kids.list[k] ?? 0
    low += nodes.low[node] ?? 0
    high += nodes.high[node] ?? 0
  }
  high = Math.min(high, options.high[option] ?? 0)
  options.high[option] = high
  options.low[option] = Math.min(high, Math.max(low, options.low[option] ?? 0))
}
