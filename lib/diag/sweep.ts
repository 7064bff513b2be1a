/**
 * Sums over all sets of suspects at once, through the machines of the evidence: forward, the weight of every
 * combination of their states after some suspects; backward, what each combination is still worth. Exponential in
 * the evidence that is open at a time, never in the suspects: a machine's states are there from the first suspect
 * that moves it to the last. Nothing is subtracted anywhere.
 */
import type { Machine, Move } from './machine'

/** The suspects in the order they are taken, and how many combinations of states stand at once at most. */
export type Order = { steps: readonly Step[]; mostStates: number }

/** One suspect's turn: machines it opens, those open in its turn (in order), and those it closes. */
type Step = {
  suspect: number
  opens: readonly number[]
  open: readonly number[]
  closes: readonly number[]
}

export type Sums = {
  /** The weight of no suspect being present, and of all other sets together. */
  none: number
  some: number
  /** The weight of all sets with this suspect, by its place among the order's steps. */
  present: readonly number[]
}

/** An order with few states open at once: the better of two greedy ones where the first leaves many. */
export function orderOf(machines: readonly Machine[]): Order {
  const first = greedyOrder(machines, (after) => after)
  if (first.mostStates <= MANY_STATES) return first
  const second = greedyOrder(machines, (_, during) => during)
  return second.mostStates < first.mostStates ? second : first
}

/** From here on a second order is tried. */
const MANY_STATES = 256

/** Always the suspect that costs least next, by the states that stand during its turn and after it. */
function greedyOrder(
  machines: readonly Machine[],
  cost: (after: number, during: number) => number,
): Order {
  const left = machines.map((m) => new Set(m.moves.keys()))
  const waiting = new Set(left.flatMap((suspects) => [...suspects]))
  const isOpen = machines.map(() => false)
  const steps: Step[] = []
  let open: number[] = []
  let mostStates = 1
  while (waiting.size > 0) {
    const { suspect, opens } = nextSuspect({ machines, left, waiting, isOpen, open, cost })
    waiting.delete(suspect)
    for (const m of opens) isOpen[m] = true
    const standing = [...open, ...opens]
    const closes = standing.filter((m) => left[m]?.delete(suspect) === true && left[m]?.size === 0)
    mostStates = Math.max(mostStates, statesOf(machines, standing))
    steps.push({ suspect, opens, open: standing, closes })
    open = standing.filter((m) => !closes.includes(m))
  }
  return { steps, mostStates }
}

/** The sums over all sets of the suspects in the order, with these odds. */
export function sweep(machines: readonly Machine[], order: Order, odds: readonly number[]): Sums {
  const still = machines.filter((m) => m.moves.size === 0)
  const fixed = still.reduce((product, m) => product * inner(m.start, m.end), 1)
  let some: Grid = { open: [], values: Float64Array.of(0) }
  let none: Grid = { open: [], values: Float64Array.of(fixed) }
  const before: Float64Array[] = []
  for (const { suspect, opens, closes } of order.steps) {
    for (const m of opens) {
      some = spread(machines, some, { m, at: some.open.length, by: 'start' })
      none = spread(machines, none, { m, at: none.open.length, by: 'start' })
    }
    const weights = some.values.map((x, s) => x + (none.values[s] ?? 0))
    before.push(weights)
    const set = moveAll(machines, { open: some.open, values: weights }, { suspect, back: false })
    some = plus(some, set, odds[suspect] ?? 0)
    for (const m of closes) {
      some = fold(machines, some, { m, by: 'end' })
      none = fold(machines, none, { m, by: 'end' })
    }
  }
  return {
    some: some.values[0] ?? 0,
    none: none.values[0] ?? 0,
    present: backward(machines, order, { odds, before }),
  }
}

function backward(
  machines: readonly Machine[],
  order: Order,
  { odds, before }: { odds: readonly number[]; before: readonly Float64Array[] },
): number[] {
  const present = order.steps.map(() => 0)
  let worth: Grid = { open: [], values: Float64Array.of(1) }
  for (let i = order.steps.length - 1; i >= 0; i--) {
    const step = order.steps[i]
    const was = before[i]
    if (step === undefined || was === undefined) continue
    for (const m of [...step.closes].reverse())
      worth = spread(machines, worth, { m, at: seatIn(step, worth.open, m), by: 'end' })
    const set = moveAll(machines, worth, { suspect: step.suspect, back: true })
    const own = odds[step.suspect] ?? 0
    present[i] = own * inner(was, set.values)
    worth = plus(worth, set, own)
    for (const m of [...step.opens].reverse()) worth = fold(machines, worth, { m, by: 'start' })
  }
  return present
}

/** Where a machine stands among the open ones of a step when only `open` of them are there yet. */
const seatIn = (step: Step, open: readonly number[], m: number): number =>
  step.open.filter((other) => other === m || open.includes(other)).indexOf(m)

type Waiting = {
  machines: readonly Machine[]
  left: readonly ReadonlySet<number>[]
  waiting: ReadonlySet<number>
  isOpen: readonly boolean[]
  open: readonly number[]
  cost: (after: number, during: number) => number
}

function nextSuspect({ machines, left, waiting, isOpen, open, cost }: Waiting): {
  suspect: number
  opens: number[]
} {
  let best = { suspect: -1, opens: [] as number[], first: Number.POSITIVE_INFINITY, second: 0 }
  for (const suspect of waiting) {
    const opens = machines.flatMap((_, m) =>
      isOpen[m] !== true && left[m]?.has(suspect) === true ? [m] : [],
    )
    const standing = [...open, ...opens]
    const during = statesOf(machines, standing)
    const closing = standing.filter((m) => left[m]?.size === 1 && left[m]?.has(suspect) === true)
    const after = during / statesOf(machines, closing)
    const [first, second] = [cost(after, during), after + during]
    if (first < best.first || (first === best.first && second < best.second))
      best = { suspect, opens, first, second }
  }
  return best
}

const statesOf = (machines: readonly Machine[], of: readonly number[]): number =>
  of.reduce((product, m) => product * (machines[m]?.end.length ?? 1), 1)

/** Values by the states of the open machines, the last one's changing fastest. */
type Grid = { open: readonly number[]; values: Float64Array }

/** The product with one more machine's vector, at a place among the open ones. */
function spread(
  machines: readonly Machine[],
  { open, values }: Grid,
  { m, at, by }: { m: number; at: number; by: 'start' | 'end' },
): Grid {
  const vector = machines[m]?.[by] ?? []
  const [n, behind] = [vector.length, statesOf(machines, open.slice(at))]
  const next = new Float64Array(values.length * n)
  for (let i = 0; i < values.length; i++) {
    const front = Math.floor(i / behind)
    const base = front * behind * n + (i - front * behind)
    for (let s = 0; s < n; s++) next[base + s * behind] = (values[i] ?? 0) * (vector[s] ?? 0)
  }
  return { open: [...open.slice(0, at), m, ...open.slice(at)], values: next }
}

/** The sum over one machine's states, each times the vector's own. */
function fold(
  machines: readonly Machine[],
  { open, values }: Grid,
  { m, by }: { m: number; by: 'start' | 'end' },
): Grid {
  const vector = machines[m]?.[by] ?? []
  const at = open.indexOf(m)
  const [n, behind] = [vector.length, statesOf(machines, open.slice(at + 1))]
  const next = new Float64Array(values.length / n)
  for (let i = 0; i < next.length; i++) {
    const front = Math.floor(i / behind)
    const base = front * behind * n + (i - front * behind)
    let sum = 0
    for (let s = 0; s < n; s++) sum += (values[base + s * behind] ?? 0) * (vector[s] ?? 0)
    next[i] = sum
  }
  return { open: [...open.slice(0, at), ...open.slice(at + 1)], values: next }
}

/** The grid after a suspect has moved every machine it moves; `back`: the same looked at from behind. */
function moveAll(
  machines: readonly Machine[],
  grid: Grid,
  { suspect, back }: { suspect: number; back: boolean },
): Grid {
  let { values } = grid
  grid.open.forEach((m, at) => {
    const moves = machines[m]?.moves.get(suspect)
    if (moves === undefined) return
    const n = machines[m]?.end.length ?? 1
    values = move(values, { moves, n, behind: statesOf(machines, grid.open.slice(at + 1)), back })
  })
  return { open: grid.open, values }
}

function move(
  values: Float64Array,
  { moves, n, behind, back }: { moves: readonly Move[]; n: number; behind: number; back: boolean },
): Float64Array {
  const next = new Float64Array(values.length)
  const block = n * behind
  for (const [a, b, weight] of moves) {
    const [from, to] = back ? [b * behind, a * behind] : [a * behind, b * behind]
    for (let base = 0; base < values.length; base += block)
      for (let s = base; s < base + behind; s++)
        next[s + to] = (next[s + to] ?? 0) + weight * (values[s + from] ?? 0)
  }
  return next
}

const plus = (grid: Grid, more: Grid, times: number): Grid => ({
  open: grid.open,
  values: grid.values.map((x, s) => x + times * (more.values[s] ?? 0)),
})

function inner(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let total = 0
  for (let s = 0; s < a.length; s++) total += (a[s] ?? 0) * (b[s] ?? 0)
  return total
}
