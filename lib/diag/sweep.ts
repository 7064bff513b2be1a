/**
 * Sums over all sets of suspects at once, through the machines of the evidence: forward, the weight of every
 * combination of their states after some suspects; backward, what each combination is still worth. Exponential in
 * the evidence that is open at a time, never in the suspects: a machine's states are there from the first suspect
 * that moves it to the last. Nothing is subtracted anywhere.
 */
import type { Machine, Move } from './machine'
import { type Order, type Step, statesOf } from './sweep-order'

/** How a suspect weighs in every sum: absent and present, both 0 or more (1 and the odds, or the two chances). */
export type Weights = readonly { absent: number; present: number }[]

/** The two sums over sets of suspects, and the share of each suspect in the first. */
export type Sums = {
  /** The weight of no suspect being present, and of all other sets together, both over e^log. */
  none: number
  some: number
  log: number
  /** The share of `some` that has each suspect, by its place among the order's steps. */
  shares: readonly number[]
}

/** The sums over all sets of the suspects in the order; machines that nobody moves are taken in as they stand. */
export function sweep(machines: readonly Machine[], order: Order, weights: Weights): Sums {
  const still = machines.filter((m) => m.moves.size === 0).map((m) => inner(m.start, m.end))
  const isPossible = still.every((x) => x > 0)
  const { steps } = order
  const stride = strideOf(order)
  let at: Front = { some: grid([0]), none: grid([isPossible ? 1 : 0]), log: sumOfLogs(still) }
  const kept: Front[] = []
  const whole: Front[] = []
  steps.forEach((step, i) => {
    if (i % stride === 0) kept.push(at)
    const pass = passed(machines, step, { front: at, weights })
    if (stride === 1) whole.push(pass.opened)
    at = pass.after
  })
  const openedFrom = (first: Front, of: readonly Step[]): Front[] => {
    let front = first
    return of.map((step) => {
      const pass = passed(machines, step, { front, weights })
      front = pass.after
      return pass.opened
    })
  }
  const shares = steps.map(() => 0)
  const total = Math.log(at.some.values[0] ?? 0) + at.log
  let worth: Worth = { grid: grid([1]), log: 0 }
  for (let block = kept.length - 1; block >= 0; block--) {
    const from = block * stride
    const opened =
      stride === 1
        ? whole.slice(from, from + 1)
        : openedFrom(kept[block] as Front, steps.slice(from, from + stride))
    for (let i = opened.length - 1; i >= 0; i--) {
      const step = steps[from + i] as Step
      const back = backward(machines, step, { front: opened[i] as Front, worth, weights })
      shares[from + i] = back.having > 0 ? Math.exp(Math.log(back.having) + back.log - total) : 0
      worth = back.worth
    }
  }
  return { some: at.some.values[0] ?? 0, none: at.none.values[0] ?? 0, log: at.log, shares }
}

/** Numbers kept of the way forward: above that only every so many steps are kept, and the rest reckoned again. */
const MOST_KEPT = 2 ** 22

function strideOf({ steps, mostStates }: Order): number {
  const all = 3 * mostStates * steps.length
  return all <= MOST_KEPT ? 1 : Math.max(1, Math.ceil(Math.sqrt(steps.length)))
}

/** The weights so far, of no suspect present and of all other sets, both over e^log. */
type Front = { some: Grid; none: Grid; log: number }

function passed(
  machines: readonly Machine[],
  { suspect, opens, closes }: Step,
  { front, weights }: { front: Front; weights: Weights },
): { opened: Front; after: Front } {
  const { absent, present } = weights[suspect] ?? ABSENT
  const { log } = front
  let { some, none } = front
  for (const m of opens) {
    some = spread(machines, some, { m, at: some.open.length, by: 'start' })
    none = spread(machines, none, { m, at: none.open.length, by: 'start' })
  }
  const opened = { some, none, log }
  const set = moveAll(machines, sum(some, none), { suspect, back: false })
  some = mix(some, absent, { more: set, times: present })
  none = mix(none, absent, null)
  let after = scaled({ some, none, log })
  for (const m of closes)
    after = scaled({
      some: fold(machines, after.some, { m, by: 'end' }),
      none: fold(machines, after.none, { m, by: 'end' }),
      log: after.log,
    })
  return { opened, after }
}

/** Sums that have become small are scaled up, so that long rows of unlikely evidence do not run out of digits. */
function scaled({ some, none, log }: Front): Front {
  const most = Math.max(largest(some), largest(none))
  if (!(most > 0 && most < SMALL)) return { some, none, log }
  return {
    some: mix(some, 1 / most, null),
    none: mix(none, 1 / most, null),
    log: log + Math.log(most),
  }
}

const sumOfLogs = (of: readonly number[]): number =>
  of.reduce((total, x) => total + (x > 0 ? Math.log(x) : 0), 0)

const ABSENT = { absent: 1, present: 0 }
const SMALL = 1e-120

/** What each combination of states is still worth, over e^log. */
type Worth = { grid: Grid; log: number }

function backward(
  machines: readonly Machine[],
  step: Step,
  { front, worth, weights }: { front: Front; worth: Worth; weights: Weights },
): { having: number; log: number; worth: Worth } {
  const { absent, present } = weights[step.suspect] ?? ABSENT
  let next = worth.grid
  for (const m of [...step.closes].reverse())
    next = spread(machines, next, { m, at: seatIn(step, next.open, m), by: 'end' })
  const set = moveAll(machines, next, { suspect: step.suspect, back: true })
  const having = present * inner(sum(front.some, front.none).values, set.values)
  next = mix(next, absent, { more: set, times: present })
  for (const m of [...step.opens].reverse()) next = fold(machines, next, { m, by: 'start' })
  const most = largest(next)
  const isSmall = most > 0 && most < SMALL
  return {
    having,
    log: front.log + worth.log,
    worth: isSmall
      ? { grid: mix(next, 1 / most, null), log: worth.log + Math.log(most) }
      : { grid: next, log: worth.log },
  }
}

/** Where a machine stands among the open ones of a step when only `open` of them are there yet. */
const seatIn = (step: Step, open: readonly number[], m: number): number =>
  step.open.filter((other) => other === m || open.includes(other)).indexOf(m)

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
  for (let from = 0, to = 0; from < values.length; from += behind, to += behind * n)
    for (let s = 0; s < n; s++) {
      const share = vector[s] ?? 0
      if (share > 0)
        for (let i = 0; i < behind; i++) next[to + s * behind + i] = (values[from + i] ?? 0) * share
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
  for (let to = 0, from = 0; to < next.length; to += behind, from += behind * n)
    for (let s = 0; s < n; s++) {
      const share = vector[s] ?? 0
      if (share > 0)
        for (let i = 0; i < behind; i++)
          next[to + i] = (next[to + i] ?? 0) + (values[from + s * behind + i] ?? 0) * share
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

const grid = (values: readonly number[]): Grid => ({ open: [], values: new Float64Array(values) })

// Loops and no callbacks from here on: an outlook of a big book comes through some hundred thousand times.
function sum({ open, values }: Grid, other: Grid): Grid {
  const both = new Float64Array(values.length)
  for (let s = 0; s < both.length; s++) both[s] = (values[s] ?? 0) + (other.values[s] ?? 0)
  return { open, values: both }
}

function mix(of: Grid, factor: number, add: { more: Grid; times: number } | null): Grid {
  if (add === null && factor === 1) return of
  const { open, values } = of
  const next = new Float64Array(values.length)
  if (add === null) for (let s = 0; s < next.length; s++) next[s] = factor * (values[s] ?? 0)
  else {
    const { values: more } = add.more
    for (let s = 0; s < next.length; s++)
      next[s] = factor * (values[s] ?? 0) + add.times * (more[s] ?? 0)
  }
  return { open, values: next }
}

function largest({ values }: Grid): number {
  let most = 0
  for (let s = 0; s < values.length; s++) most = Math.max(most, values[s] ?? 0)
  return most
}

function inner(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let total = 0
  for (let s = 0; s < a.length; s++) total += (a[s] ?? 0) * (b[s] ?? 0)
  return total
}
