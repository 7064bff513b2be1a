/**
 * The order in which a sweep (sweep.ts) takes the suspects: a machine is open from the first suspect that moves it
 * to the last, and the states of all open ones multiply. The best order is hard to find (it is a path-width); a
 * greedy one leaves few of them open on a book where each check is about a handful of suspects.
 */
import type { Machine } from './machine'

/** The suspects in the order they are taken, and how many combinations of states stand at once at most. */
export type Order = { steps: readonly Step[]; mostStates: number }

/** One suspect's turn: machines it opens, those open in its turn (in order), and those it closes. */
export type Step = {
  suspect: number
  opens: readonly number[]
  open: readonly number[]
  closes: readonly number[]
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
  let best = { suspect: -1, first: Number.POSITIVE_INFINITY, second: 0 }
  const standing = statesOf(machines, open)
  const turn = (suspect: number): [after: number, during: number] => {
    let during = standing
    let closing = 1
    for (let m = 0; m < machines.length; m++) {
      const waits = left[m]
      if (waits?.has(suspect) !== true) continue
      const states = machines[m]?.end.length ?? 1
      if (isOpen[m] !== true) during *= states
      if (waits.size === 1) closing *= states
    }
    return [during / closing, during]
  }
  for (const suspect of waiting) {
    const [after, during] = turn(suspect)
    const [first, second] = [cost(after, during), after + during]
    if (first < best.first || (first === best.first && second < best.second))
      best = { suspect, first, second }
  }
  const { suspect } = best
  const opens = machines.flatMap((_, m) =>
    isOpen[m] !== true && left[m]?.has(suspect) === true ? [m] : [],
  )
  return { suspect, opens }
}

/** How many combinations of states these machines have together. */
export const statesOf = (machines: readonly Machine[], of: readonly number[]): number =>
  of.reduce((product, m) => product * (machines[m]?.end.length ?? 1), 1)
