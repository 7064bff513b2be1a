/**
 * The points and options of one search in flat arrays, a point found by what was seen and done: thousands of
 * small objects would cost more to make and to clear away than all the sums. A number names a point or an
 * option; it stands at that place in every array of its kind.
 */
import type { Problem } from './search-problem'

/** Points. `first` is the first of its options (-1: not looked at yet), `many` how many there are. */
type Nodes = {
  count: number
  /** Joint weights, one row of `width` per point. */
  w: Float64Array
  /** Outcomes seen so far as digits, one place per check: a row of `words` numbers per point. */
  code: Float64Array
  low: Float64Array
  high: Float64Array
  /** The repair that the plan without checks begins with here; -1 for a stop. */
  begins: Int32Array
  /** Where it is thought to lie; NaN: not asked yet. */
  guess: Float64Array
  elapsed: Float64Array
  checks: Int32Array
  repairs: Int32Array
  open: Int32Array
  first: Int32Array
  many: Int32Array
}

/** Options of points. `kid` is where the points it leads to stand in `kids` (-1: not carried out yet). */
type Options = {
  count: number
  low: Float64Array
  high: Float64Array
  /** What it costs itself, weighted. */
  fixed: Float64Array
  action: Int32Array
  kid: Int32Array
  many: Int32Array
}

/** A point that is looked for; its rows are `w` and `code` of the pool's room. */
export type Wanted = { checks: number; repairs: number; open: number; elapsed: number }

/** All points and options of a search, in arrays that grow. */
export type Pool = {
  /** How many faults there are. */
  width: number
  /** Numbers that a code takes. */
  words: number
  /** What a digit of each check counts for, and in which word of the code. */
  places: readonly { word: number; value: number }[]
  nodes: Nodes
  options: Options
  kids: { count: number; list: Int32Array }
  /** Open addressing: the point at its hash, plus one; 0 where nothing is. */
  table: Int32Array
  /** The rows of the point that is looked for. */
  room: { w: Float64Array; code: Float64Array }
}

const AT_FIRST = 1024
/** Whole numbers up to this are exact. */
const MOST_EXACT = 2 ** 52
/** Minutes this near each other are the same. */
const SAME_MINUTES = 1e-7

/** Room for a search over a problem. */
export function startPool({ checks, faults }: Problem): Pool {
  const places: { word: number; value: number }[] = []
  let [word, value] = [0, 1]
  for (const { p } of checks) {
    const base = p.length + 1
    if (value * base > MOST_EXACT) [word, value] = [word + 1, 1]
    places.push({ word, value })
    value *= base
  }
  const [width, words] = [faults.length, word + 1]
  const reals = (per = 1) => new Float64Array(AT_FIRST * per)
  const whole = () => new Int32Array(AT_FIRST)
  return {
    width,
    words,
    places,
    nodes: {
      count: 0,
      w: reals(width),
      code: reals(words),
      low: reals(),
      high: reals(),
      begins: whole(),
      guess: reals(),
      elapsed: reals(),
      checks: whole(),
      repairs: whole(),
      open: whole(),
      first: whole(),
      many: whole(),
    },
    options: {
      count: 0,
      low: reals(),
      high: reals(),
      fixed: reals(),
      action: whole(),
      kid: whole(),
      many: whole(),
    },
    kids: { count: 0, list: whole() },
    table: new Int32Array(4 * AT_FIRST),
    room: { w: new Float64Array(width), code: new Float64Array(words) },
  }
}

/** The number of the wanted point; -1 when it is not there yet: `addNode` then puts it there. */
export function findNode({ nodes, table, room, words }: Pool, wanted: Wanted): number {
  const mask = table.length - 1
  let slot = hashOf(room.code, 0, words, wanted) & mask
  for (let held = table[slot] ?? 0; held !== 0; held = table[slot] ?? 0) {
    if (isSame(nodes, held - 1, room.code, wanted)) return held - 1
    slot = (slot + 1) & mask
  }
  return -1
}

/** A new point with the rows of the room, without options and with bounds still to set; its number. */
export function addNode(pool: Pool, wanted: Wanted): number {
  const { nodes, room, width, words } = pool
  const node = nodes.count++
  if (node >= nodes.low.length) growNodes(nodes)
  if (nodes.count * 2 > pool.table.length) growTable(pool)
  for (let f = 0; f < width; f++) nodes.w[node * width + f] = room.w[f] ?? 0
  for (let i = 0; i < words; i++) nodes.code[node * words + i] = room.code[i] ?? 0
  nodes.guess[node] = Number.NaN
  nodes.elapsed[node] = wanted.elapsed
  nodes.checks[node] = wanted.checks
  nodes.repairs[node] = wanted.repairs
  nodes.open[node] = wanted.open
  nodes.first[node] = -1
  enter(pool, node)
  return node
}

/** A new option behind the last one; its number. */
export function addOption({ options }: Pool, action: number, low: number, high: number): number {
  const option = options.count++
  if (option >= options.low.length) {
    options.low = larger(options.low)
    options.high = larger(options.high)
    options.fixed = larger(options.fixed)
    options.action = largerInt(options.action)
    options.kid = largerInt(options.kid)
    options.many = largerInt(options.many)
  }
  options.low[option] = low
  options.high[option] = high
  options.fixed[option] = 0
  options.action[option] = action
  options.kid[option] = -1
  options.many[option] = 0
  return option
}

/** One more point behind the last one of `kids`. */
export function addKid({ kids }: Pool, node: number): void {
  if (kids.count >= kids.list.length) kids.list = largerInt(kids.list)
  kids.list[kids.count++] = node
}

function isSame(nodes: Nodes, node: number, code: Float64Array, wanted: Wanted): boolean {
  if (nodes.repairs[node] !== wanted.repairs || nodes.open[node] !== wanted.open) return false
  for (let i = 0; i < code.length; i++)
    if (nodes.code[node * code.length + i] !== code[i]) return false
  return Math.abs((nodes.elapsed[node] ?? 0) - wanted.elapsed) < SAME_MINUTES
}

type Done = Pick<Wanted, 'repairs' | 'open'>

/** Minutes are no part of it: they follow from what was done, but for what was opened twice. */
function hashOf(code: Float64Array, at: number, words: number, { repairs, open }: Done): number {
  let hash = Math.imul(repairs, 0x9e3779b1) ^ Math.imul(open, 0x85ebca77)
  for (let i = at; i < at + words; i++) {
    const word = code[i] ?? 0
    hash = Math.imul(hash ^ word, 0xc2b2ae3d)
    hash = Math.imul(hash ^ (hash >>> 15) ^ (word / 2 ** 32), 0x27d4eb2f)
  }
  return hash ^ (hash >>> 13)
}

function enter({ nodes, table, words }: Pool, node: number): void {
  const mask = table.length - 1
  const done = { repairs: nodes.repairs[node] ?? 0, open: nodes.open[node] ?? 0 }
  let slot = hashOf(nodes.code, node * words, words, done) & mask
  while (table[slot] !== 0) slot = (slot + 1) & mask
  table[slot] = node + 1
}

function growTable(pool: Pool): void {
  pool.table = new Int32Array(2 * pool.table.length)
  for (let node = 0; node < pool.nodes.count - 1; node++) enter(pool, node)
}

function growNodes(nodes: Nodes): void {
  nodes.w = larger(nodes.w)
  nodes.code = larger(nodes.code)
  nodes.low = larger(nodes.low)
  nodes.high = larger(nodes.high)
  nodes.begins = largerInt(nodes.begins)
  nodes.guess = larger(nodes.guess)
  nodes.elapsed = larger(nodes.elapsed)
  nodes.checks = largerInt(nodes.checks)
  nodes.repairs = largerInt(nodes.repairs)
  nodes.open = largerInt(nodes.open)
  nodes.first = largerInt(nodes.first)
  nodes.many = largerInt(nodes.many)
}

function larger(list: Float64Array): Float64Array {
  const twice = new Float64Array(2 * list.length)
  twice.set(list)
  return twice
}

function largerInt(list: Int32Array): Int32Array {
  const twice = new Int32Array(2 * list.length)
  twice.set(list)
  return twice
}
