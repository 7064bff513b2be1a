/**
 * Exact belief over independent suspects, given that at least one is present, under any evidence that is a
 * machine: pieces that at most one suspect moves, or of one state (a good outcome), only change the odds; suspects
 * that no other piece touches factor out in closed form; the rest is swept (sweep.ts), exponential in the surprising
 * pieces that touch the same suspects and in nothing else. Odds and what is summed are kept as logs and chances, so
 * that no evidence is too strong for a number.
 */
import { sumsOver } from './all-sets'
import type { Factor } from './factor'
import { type Machine, runMachine } from './machine'
import { orderOf } from './sweep-order'

/** Combinations of states carried at once: 2^16 numbers a suspect. */
export const MOST_STATES = 65_536

/** The sum over all sets of suspects, at least one present. */
export type Summary = {
  /** P(each suspect present | evidence, at least one). */
  marginals: number[]
  /** P(this suspect and no other | evidence, at least one). */
  only: number[]
  twoOrMore: number
  /** Natural log of the relative chance of the evidence; only differences of it mean anything. */
  logEvidence: number
}

/**
 * Marginals and single-fault chances of suspects with these odds (0 or more) under these pieces of evidence; null
 * where more than `mostStates` combinations of states would stand at once over more than sixteen suspects.
 */
export function summarise(
  odds: readonly number[],
  factors: readonly Factor[],
  mostStates = MOST_STATES,
): Summary | null {
  const { machines, logOdds, log } = parted(odds, factors)
  const own = logOdds.map((l) => ({
    absent: 1 / (1 + Math.exp(l)),
    present: 1 / (1 + Math.exp(-l)),
  }))
  const order = orderOf(machines)
  const sums = sumsOver(machines, { order, weights: own, mostStates })
  if (sums === null) return null
  const logNone = logOdds.map((l) => -softplus(l))
  const touched = order.steps.map((step) => step.suspect)
  const isTouched = new Set(touched)
  // What is summed has some of the touched present, or none of them: then one of the others is.
  const anyOther = -Math.expm1(sumOf(logNone.filter((_, f) => !isTouched.has(f))))
  const z = sums.some + anyOther * sums.none
  const share = (x: number) => (z > 0 ? Math.min(1, Math.max(0, x / z)) : 0)
  const marginals = own.map(({ present }) => share((sums.some + sums.none) * present))
  touched.forEach((f, i) => {
    marginals[f] = share(sums.some * (sums.shares[i] ?? 0))
  })
  const scale = sumOf(logNone) - sums.log
  const logAlone = logAloneOf(machines)
  const only = logOdds.map((l, f) => share(Math.exp(l + logAlone(f) + scale)))
  const twoOrMore = Math.max(0, 1 - sumOf(only))
  return { marginals, only, twoOrMore, logEvidence: Math.log(z) + sums.log + log - sumOf(logNone) }
}

const sumOf = (of: readonly number[]): number => of.reduce((total, x) => total + x, 0)

/** ln(1 + e^x), for every x. */
const softplus = (x: number): number => Math.max(0, x) + Math.log1p(Math.exp(-Math.abs(x)))

/** Machines of one state, and those that at most one suspect moves, taken into the log-odds. */
function parted(odds: readonly number[], factors: readonly Factor[]) {
  const logOdds = odds.map(Math.log)
  const machines: Machine[] = []
  let log = 0
  for (const { machine } of factors) {
    const none = runMachine(machine, [])
    if (none === 0 || (machine.end.length > 1 && machine.moves.size > 1)) {
      machines.push(machine)
      continue
    }
    log += Math.log(none)
    for (const f of machine.moves.keys())
      logOdds[f] = (logOdds[f] ?? 0) + Math.log(runMachine(machine, [f])) - Math.log(none)
  }
  return { machines, logOdds, log }
}

/** The natural log of what the machines say with just one suspect present. */
function logAloneOf(machines: readonly Machine[]): (suspect: number) => number {
  const nones = machines.map((m) => Math.log(runMachine(m, [])))
  return (suspect) =>
    sumOf(
      machines.map((m, i) =>
        m.moves.has(suspect) ? Math.log(runMachine(m, [suspect])) : (nones[i] ?? 0),
      ),
    )
}
