/**
 * What each fault would cost from here if it were known, per unit of mass: its stops, and the repairs that can
 * cure it in the best order. Never more than the true cost, whatever else may be done: an action that does not
 * cure the fault brings the end nearer only by a wrong pass, and so the comeback's cost is promised beside the
 * stops wherever a test run can pass wrongly.
 */
import { opening, type Problem } from './search-problem'

/** Cost of one known fault with these set-ups open, these repairs left (masks) and these minutes gone. */
export type KnownCost = (fault: number, at: Where) => number

type Where = { open: number; repairs: number; elapsed: number }

/** Cures of one fault that are tried in every order; of more, one at the least price is promised. */
const MOST_ORDERED = 6
/** By the clock every order may end at another minute, and nothing can be remembered. */
const MOST_ORDERED_BY_CLOCK = 4

type Fault = {
  fault: number
  /** What an end without a cure costs at least. */
  end: number
  cures: readonly number[]
  /** By open set-ups and cures left. */
  memo: Map<number, Map<number, number>>
}

/** The known costs of a problem. */
export function knownCosts(problem: Problem): KnownCost {
  const faults = problem.faults.map((_, fault) => ({
    fault,
    end: endCost(problem, fault),
    cures: problem.repairs.flatMap((r, i) => ((r.fails[fault] ?? 1) < 1 ? [i] : [])),
    memo: new Map(),
  }))
  return (f, at) => {
    const fault = faults[f]
    return fault === undefined ? 0 : known(problem, fault, at)
  }
}

/** Where a wrong pass ends the job for less than a stop, only the comeback's cost is promised. */
export function endCost({ stops, falsePass, comeback }: Problem, fault: number): number {
  let least = (falsePass[fault] ?? 0) > 0 ? comeback : Number.POSITIVE_INFINITY
  for (const { byFault } of stops) least = Math.min(least, byFault[fault] ?? 0)
  return least
}

function known(problem: Problem, fault: Fault, at: Where): number {
  let count = 0
  let left = 0
  for (const r of fault.cures)
    if ((at.repairs & (1 << r)) !== 0) {
      count++
      left |= 1 << r
    }
  if (count === 0) return fault.end
  const isTimeless = problem.daylight === Number.POSITIVE_INFINITY
  if (count > (isTimeless ? MOST_ORDERED : MOST_ORDERED_BY_CLOCK))
    return oneCure(problem, fault, left)
  if (count === 1 || !isTimeless) return leastOf(problem, fault, { ...at, repairs: left })
  let byLeft = fault.memo.get(at.open)
  if (byLeft === undefined) {
    byLeft = new Map()
    fault.memo.set(at.open, byLeft)
  }
  const cost = byLeft.get(left) ?? leastOf(problem, fault, { ...at, repairs: left })
  byLeft.set(left, cost)
  return cost
}

function oneCure({ repairs }: Problem, { cures, end }: Fault, left: number): number {
  let least = end
  for (const r of cures)
    if ((left & (1 << r)) !== 0) least = Math.min(least, repairs[r]?.price ?? least)
  return least
}

function leastOf(problem: Problem, fault: Fault, at: Where): number {
  let least = fault.end
  for (const r of fault.cures)
    if ((at.repairs & (1 << r)) !== 0)
      least = Math.min(least, cureFirst(problem, fault, { at, r, least }))
  return least
}

type Try = { at: Where; r: number; least: number }

function cureFirst(problem: Problem, fault: Fault, { at, r, least }: Try): number {
  const repair = problem.repairs[r]
  if (repair === undefined) return least
  const isShut = (repair.setups & ~at.open) !== 0
  const more = isShut ? opening(problem, repair.setups, at.open) : OPEN
  const elapsed = at.elapsed + repair.minutes + more.minutes
  const price = repair.price + more.price
  if (price + Math.min(0, fault.end) >= least || elapsed > problem.daylight + 1e-9) return least
  const fails = repair.fails[fault.fault] ?? 1
  if (fails === 0) return price
  const slip = problem.falsePass[fault.fault] ?? 0
  const open = (at.open | repair.setups) & ~problem.closed
  const then =
    slip === 1 ? 0 : known(problem, fault, { open, repairs: at.repairs & ~(1 << r), elapsed })
  return price + fails * (slip * problem.comeback + (1 - slip) * then)
}
const OPEN = { price: 0, minutes: 0 }
