/**
 * Exact belief over independent suspects, given that at least one is present, under any evidence that is a
 * machine: pieces with one state (a good outcome) only change the odds; suspects that no other piece touches factor
 * out in closed form; the rest is swept (sweep.ts), exponential in the surprising pieces that touch the same
 * suspects and in nothing else. Where more than MOST_STATES combinations would stand at once (some eighteen such
 * pieces over one another), the heaviest sets are summed instead, and `isExact` is false (heaviest-sets.ts).
 */
import type { Factor } from './factor'
import { heaviestSets } from './heaviest-sets'
import { type Machine, runMachine } from './machine'
import { type Sums, sweep } from './sweep'
import { orderOf } from './sweep-order'

/** Combinations of states carried at once: 2^18 numbers a suspect. */
export const MOST_STATES = 262_144

export type Summary = {
  /** P(each suspect present | evidence, at least one). */
  marginals: number[]
  /** P(this suspect and no other | evidence, at least one). */
  only: number[]
  twoOrMore: number
  /** Natural log of the relative chance of the evidence; only differences of it mean anything. */
  logEvidence: number
  /** False where only the heaviest sets of suspects were summed. */
  isExact: boolean
}

/** Marginals and single-fault chances of suspects with these odds (0 or more) under these pieces of evidence. */
export function summarise(
  odds: readonly number[],
  factors: readonly Factor[],
  mostStates = MOST_STATES,
): Summary {
  const { machines, own, log } = parted(odds, factors)
  const order = orderOf(machines)
  const touched = order.steps.map((s) => s.suspect)
  const isExact = order.mostStates <= mostStates
  const sums = isExact
    ? sweep(
        machines,
        order,
        own.map((present) => ({ absent: 1, present })),
      )
    : heaviestSets(machines, { suspects: touched, odds: own })
  const isTouched = new Set(touched)
  const logQ = own.reduce((sum, o, f) => (isTouched.has(f) ? sum : sum + Math.log1p(o)), 0)
  const q = Math.exp(logQ)
  const z = q * sums.some + Math.expm1(logQ) * sums.none
  const share = (x: number) => (z > 0 ? Math.min(1, Math.max(0, x / z)) : 0)
  const inAll = q * (sums.some + sums.none)
  const marginals = own.map((o) => share((inAll * o) / (1 + o)))
  touched.forEach((f, i) => {
    marginals[f] = share(q * sums.some * (sums.shares[i] ?? 0))
  })
  const alone = aloneOf(machines, sums)
  const only = own.map((o, f) => share(o * alone(f)))
  const twoOrMore = Math.max(0, 1 - only.reduce((sum, p) => sum + p, 0))
  return { marginals, only, twoOrMore, logEvidence: Math.log(z) + sums.log + log, isExact }
}

/** Machines of one state taken into the odds; `log` is that of their constant part. */
function parted(
  odds: readonly number[],
  factors: readonly Factor[],
): { machines: Machine[]; own: number[]; log: number } {
  const own = [...odds]
  const machines: Machine[] = []
  let log = 0
  for (const { machine } of factors) {
    if (machine.end.length > 1) {
      machines.push(machine)
      continue
    }
    log += Math.log((machine.start[0] ?? 0) * (machine.end[0] ?? 0))
    for (const [f, moves] of machine.moves)
      own[f] = (own[f] ?? 0) * moves.reduce((sum, [, , weight]) => sum + weight, 0)
  }
  return { machines, own, log }
}

/** The weight of the evidence with just one suspect present, its odds left out, on the scale of the sums. */
function aloneOf(
  machines: readonly Machine[],
  { none, log }: Pick<Sums, 'none' | 'log'>,
): (suspect: number) => number {
  const nones = machines.map((m) => runMachine(m, []))
  const scale = Math.exp(-log)
  return (suspect) => {
    if (machines.every((m) => !m.moves.has(suspect))) return none
    return machines.reduce(
      (product, m, i) =>
        product * (m.moves.has(suspect) ? runMachine(m, [suspect]) : (nones[i] ?? 0)),
      scale,
    )
  }
}
