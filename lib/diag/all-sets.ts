/**
 * The sums of sweep.ts by walking through all sets of up to sixteen suspects, one by one: for evidence that is wider
 * than its suspects are many. In logs, so that long rows of unlikely evidence do not run out of digits.
 */
import { type Machine, moveOne, worthOf } from './machine'
import { type Sums, sweep, type Weights } from './sweep'
import type { Order } from './sweep-order'

/** So many suspects are walked through: 2^16 sets. */
const MOST_WALKED = 16

/**
 * The sums over all sets of the suspects in the order: swept where no more than `mostStates` combinations of states
 * stand at once, else walked through; null where there are too many suspects for that.
 */
export function sumsOver(
  machines: readonly Machine[],
  { order, weights, mostStates }: { order: Order; weights: Weights; mostStates: number },
): Sums | null {
  if (order.mostStates <= mostStates) return sweep(machines, order, weights)
  const suspects = order.steps.map((step) => step.suspect)
  return suspects.length <= MOST_WALKED ? walk(machines, suspects, weights) : null
}

function walk(machines: readonly Machine[], suspects: readonly number[], weights: Weights): Sums {
  const logs = new Float64Array(2 ** suspects.length)
  const visit = (
    i: number,
    at: { set: number; log: number; states: readonly (readonly number[])[] },
  ) => {
    const suspect = suspects[i]
    if (suspect === undefined) {
      logs[at.set] = machines.reduce(
        (log, m, j) => log + Math.log(worthOf(m, at.states[j] ?? [])),
        at.log,
      )
      return
    }
    const { absent = 1, present = 0 } = weights[suspect] ?? {}
    const states = machines.map((m, j) => moveOne(m, suspect, at.states[j] ?? []))
    visit(i + 1, { ...at, log: at.log + Math.log(absent) })
    visit(i + 1, { set: at.set + 2 ** i, log: at.log + Math.log(present), states })
  }
  visit(0, { set: 0, log: 0, states: machines.map((m) => m.start) })
  const most = logs.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY)
  const log = most === Number.NEGATIVE_INFINITY ? 0 : most
  const shares = suspects.map(() => 0)
  let some = 0
  logs.forEach((l, set) => {
    if (set === 0) return
    const weight = Math.exp(l - log)
    some += weight
    for (const [i, share] of shares.entries()) if ((set >> i) % 2 === 1) shares[i] = share + weight
  })
  return {
    none: Math.exp((logs[0] ?? 0) - log),
    some,
    log,
    shares: shares.map((share) => (some > 0 ? share / some : 0)),
  }
}
