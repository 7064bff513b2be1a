/**
 * The plan without checks: repairs in p/c order with the cheapest stop at the best place in the row (optimal
 * without checks and set-ups: Heckerman, Breese and Rommelse 1995). It can always be carried out, so its cost
 * is never below the true one; `room.first` then holds the repair it begins with, -1 for a stop. Asked for every
 * point of a search: no object is made on the way.
 */
import { opening, type Problem, type Repair } from './search-problem'
import { NO_MASS } from './search-steps'

/** Where a plan begins: joint weights (a row of a larger array from `at` on), open set-ups, minutes gone. */
export type From = { w: Float64Array; at?: number; open: number; elapsed: number }

/** Its expected cost, weighted by the mass of its weights; `left` names the repairs that are left, in their order. */
export function repairsOnly(problem: Problem, from: From, left: ArrayLike<number>): number {
  return costOf(problem, from, { left, count: left.length })
}

/** The same with the repairs left as a mask. */
export function repairsOnlyOf(problem: Problem, from: From, repairs: number): number {
  const { left } = problem.room
  let count = 0
  for (let i = 0, rest = repairs; rest !== 0; i++, rest >>>= 1)
    if ((rest & 1) !== 0) left[count++] = i
  return costOf(problem, from, { left, count })
}

/** The repairs that may cure something here, in the order of that plan; the others behind them. */
export function inPlanOrder(problem: Problem, from: From, left: readonly number[]): number[] {
  begin(problem, from)
  const count = inOrder(problem, from, { left, count: left.length })
  const first = [...problem.room.order.subarray(0, count)]
  return [...first, ...left.filter((r) => !first.includes(r))]
}

type Left = { left: ArrayLike<number>; count: number }

function costOf(problem: Problem, from: From, left: Left): number {
  const { room, repairs, daylight, closed, gift } = problem
  let mass = begin(problem, from)
  let best = leastOf(room.stops)
  room.first = -1
  let { open, elapsed } = from
  let spent = 0
  let first = -1
  const count = inOrder(problem, from, left)
  for (let k = 0; k < count && mass > NO_MASS && spent + gift * mass < best; k++) {
    const index = room.order[k] ?? 0
    const repair = repairs[index]
    if (repair === undefined) continue
    const more = (repair.setups & ~open) === 0 ? OPEN : opening(problem, repair.setups, open)
    const minutes = more.minutes + repair.minutes
    if (elapsed + minutes > daylight + 1e-9) continue
    if (first < 0) first = index
    const gone = mend(problem, repair)
    spent += (repair.price + more.price) * mass + gone.wrong * problem.comeback
    mass -= gone.mass
    open = (open | repair.setups) & ~closed
    elapsed += minutes
    const total = spent + (mass > NO_MASS ? leastOf(room.stops) : 0)
    if (total >= best) continue
    best = total
    room.first = first
  }
  return best
}

const OPEN = { price: 0, minutes: 0 }

/** Fills the room with the weights and what each stop would cost; answers the mass. */
function begin({ room, stops, faults }: Problem, { w, at = 0 }: From): number {
  room.stops.fill(0)
  let mass = 0
  for (let f = 0; f < faults.length; f++) {
    const x = w[at + f] ?? 0
    room.w[f] = x
    mass += x
    for (let s = 0; s < stops.length; s++)
      room.stops[s] = (room.stops[s] ?? 0) + x * (stops[s]?.byFault[f] ?? 0)
  }
  return mass
}

function leastOf(costs: Float64Array): number {
  let least = Number.POSITIVE_INFINITY
  for (let i = 0; i < costs.length; i++) if ((costs[i] ?? 0) < least) least = costs[i] ?? 0
  return least
}

const GONE = { mass: 0, wrong: 0 }

/** Takes out what a repair mends and what passes its test run wrongly. */
function mend(problem: Problem, repair: Repair): typeof GONE {
  GONE.mass = 0
  GONE.wrong = 0
  for (const f of repair.ends) mendOne(problem, repair, f)
  return GONE
}

function mendOne({ room, falsePass, stops }: Problem, repair: Repair, f: number): void {
  const x = room.w[f] ?? 0
  if (x === 0) return
  const stays = x * (repair.fails[f] ?? 1)
  const slipped = stays * (falsePass[f] ?? 0)
  const gone = x - stays + slipped
  room.w[f] = stays - slipped
  GONE.mass += gone
  GONE.wrong += slipped
  for (let s = 0; s < stops.length; s++)
    room.stops[s] = (room.stops[s] ?? 0) - gone * (stops[s]?.byFault[f] ?? 0)
}

/** Repairs by what they cure per unit of price, best first, the first of equals in the model's order; how many. */
function inOrder(problem: Problem, { open }: From, { left, count }: Left): number {
  const { ratios, order, w } = problem.room
  let placed = 0
  for (let k = 0; k < count; k++) {
    const index = left[k] ?? 0
    const repair = problem.repairs[index]
    if (repair === undefined) continue
    const cured = curedBy(repair, w)
    if (cured <= 0) continue
    const shut = (repair.setups & ~open) !== 0
    const price = repair.price + (shut ? opening(problem, repair.setups, open).price : 0)
    const ratio = cured / Math.max(price, 1e-12)
    let at = placed++
    while (at > 0 && (ratios[order[at - 1] ?? 0] ?? 0) < ratio) {
      order[at] = order[at - 1] ?? 0
      at--
    }
    order[at] = index
    ratios[index] = ratio
  }
  return placed
}

function curedBy({ cures, fails }: Repair, w: Float64Array): number {
  let cured = 0
  for (const f of cures) cured += (w[f] ?? 0) * (1 - (fails[f] ?? 1))
  return cured
}
