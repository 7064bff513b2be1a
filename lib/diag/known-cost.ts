/**
 * What each fault would cost from here if it were known, per unit of mass: its stops, and the repairs that can
 * cure it in the best order. Remembered by open set-ups, repairs left and (with daylight) minutes gone.
 */
import { opening, type Problem } from './search-problem'

export type KnownCosts = (open: number, repairs: number, elapsed: number) => Float64Array

/** A memo of known costs for one problem. */
export function knownCosts(problem: Problem): KnownCosts {
  const memo = new Map<number | string, Float64Array>()
  const timeless = problem.daylight === Number.POSITIVE_INFINITY
  const cures = problem.faults.map((_, f) =>
    problem.repairs.flatMap((r, i) => ((r.fails[f] ?? 1) < 1 ? [i] : [])),
  )
  const least = problem.faults.map((_, f) =>
    Math.min(Number.POSITIVE_INFINITY, ...problem.stops.map((s) => s.byFault[f] ?? 0)),
  )
  return (open, repairs, elapsed) => {
    const place = open * 2 ** 31 + repairs
    const key = timeless ? place : `${place}|${elapsed.toFixed(6)}`
    let costs = memo.get(key)
    if (costs === undefined) {
      costs = Float64Array.from(problem.faults, (_, fault) =>
        knownCost(
          { problem, fault, cures: cures[fault] ?? [], least: least[fault] ?? 0 },
          { open, repairs, elapsed },
        ),
      )
      memo.set(key, costs)
    }
    return costs
  }
}

type Fault = { problem: Problem; fault: number; cures: readonly number[]; least: number }
type Where = { open: number; repairs: number; elapsed: number }

/** Where a wrong pass ends the job for less than curing it, only the comeback's cost is promised. */
function knownCost(at: Fault, where: Where): number {
  const best = cureOrStop(at, where)
  const slips = (at.problem.falsePass[at.fault] ?? 0) > 0
  return slips ? Math.min(best, at.problem.comeback) : best
}

function cureOrStop(at: Fault, where: Where): number {
  let best = at.least
  for (const r of at.cures) {
    if ((where.repairs & (1 << r)) === 0) continue
    const cost = cure(at, where, { r, best })
    if (cost < best) best = cost
  }
  return best
}

function cure(at: Fault, where: Where, { r, best }: { r: number; best: number }): number {
  const { problem, fault } = at
  const repair = problem.repairs[r]
  if (repair === undefined) return best
  const open = opening(problem, repair.setups, where.open)
  const elapsed = where.elapsed + repair.minutes + open.minutes
  const price = repair.price + open.price
  if (price >= best || elapsed > problem.daylight + 1e-9) return best
  const fails = repair.fails[fault] ?? 1
  const slip = problem.falsePass[fault] ?? 0
  const left = fails * (1 - slip)
  const after = {
    open: (where.open | repair.setups) & ~problem.closed,
    repairs: where.repairs & ~(1 << r),
    elapsed,
  }
  const rest = left > 0 ? left * cureOrStop(at, after) : 0
  return price + fails * slip * problem.comeback + rest
}
