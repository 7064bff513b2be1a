/**
 * Exact marginals of independent faults under noisy-OR findings with leaks, at any number of faults: an absent
 * finding is a product over the faults, a present or virtual one a machine of two states, and the sum over all sets
 * of faults is that of sweep.ts: exponential only in the present findings that share faults, all terms positive, so
 * nothing cancels (compare Heckerman 1989, whose sum alternates).
 */
import { AppError } from '@/lib/model/result'
import { sumsOver } from './all-sets'
import { type Machine, seenMachine } from './machine'
import { orderOf } from './sweep-order'
import type { NoisyOrModel } from './troubleshoot-model'

/** Present and virtual findings that may stand over one another: 2^20 combinations carried at once. */
export const MOST_POSITIVE = 20

type Finding = NoisyOrModel['findings'][number]
type Weight = { absent: number; present: number }

/**
 * P(each fault | evidence). With condition `atLeastOne` no-fault is excluded. Throws AppError `badModel` (with the
 * field) for a number that is no chance, `tooLarge` where more than 2^20 combinations of present findings stand at
 * once over more than sixteen faults, and `impossible` when the evidence cannot come about.
 */
export function noisyOrMarginals(model: NoisyOrModel): Record<string, number> {
  checkChances(model)
  const { machines, weights } = evidenceOf(model)
  const order = orderOf(machines)
  const sums = sumsOver(machines, { order, weights, mostStates: 2 ** MOST_POSITIVE })
  if (sums === null) throw new AppError('tooLarge', { context: { states: order.mostStates } })
  const places = new Map(order.steps.map((step, i) => [step.suspect, i]))
  const free = weights.map((w, f) => (places.has(f) ? 0 : w.present / (w.absent + w.present)))
  const isOneThere = model.condition === 'atLeastOne' ? anyOf(free) : 1
  const total = sums.some + sums.none * isOneThere
  if (!(total > 0)) throw new AppError('impossible')
  const chanceOf = (f: number): number => {
    const place = places.get(f)
    const weight =
      place === undefined
        ? (sums.some + sums.none) * (free[f] ?? 0)
        : sums.some * (sums.shares[place] ?? 0)
    return Math.min(1, weight / total)
  }
  return Object.fromEntries(model.faults.map(({ id }, f) => [id, chanceOf(f)]))
}

/** The chance that one or more of independent ones are there, without loss where all are unlikely. */
const anyOf = (chances: readonly number[]): number =>
  -Math.expm1(chances.reduce((log, p) => log + Math.log1p(-p), 0))

/** Absent findings taken into the weights of the faults, the others as machines. */
function evidenceOf(model: NoisyOrModel): { machines: Machine[]; weights: Weight[] } {
  let weights = model.faults.map(({ prior }) => ({ absent: 1 - prior, present: prior }))
  const machines: Machine[] = []
  for (const finding of model.findings) {
    const seen = own(model.evidence, finding.id)
    if (seen === undefined) continue
    const sets = linksOf(model, finding)
    if (seen === 0) weights = withAbsent(weights, finding.leak, sets)
    else machines.push(machineOf(finding.leak, sets, seen === 1 ? [0, 1] : seen.virtual))
  }
  if (weights.some((w) => !(w.absent + w.present > 0))) throw new AppError('impossible')
  return { machines, weights }
}

function withAbsent(
  weights: readonly Weight[],
  leak: number,
  sets: ReadonlyMap<number, number>,
): Weight[] {
  if (leak === 1) throw new AppError('impossible')
  return weights.map(({ absent, present }, f) => ({
    absent,
    present: present * (1 - (sets.get(f) ?? 0)),
  }))
}

/** The chance that each linked fault sets the finding. */
function linksOf({ faults }: NoisyOrModel, { links }: Finding): Map<number, number> {
  const sets = new Map<number, number>()
  faults.forEach(({ id }, f) => {
    const link = own(links, id) ?? 0
    if (link > 0) sets.set(f, link)
  })
  return sets
}

/** A finding that was seen, or whose two likelihoods (absent, present) are known; only their ratio counts. */
function machineOf(
  leak: number,
  sets: ReadonlyMap<number, number>,
  [ifAbsent, ifPresent]: readonly [number, number],
): Machine {
  const most = Math.max(ifAbsent, ifPresent)
  if (most === 0) throw new AppError('impossible')
  return { ...seenMachine(leak, sets), end: [ifAbsent / most, ifPresent / most] }
}

function checkChances({ faults, findings, evidence }: NoisyOrModel): void {
  for (const { id, prior } of faults) checkChance(prior, `faults.${id}.prior`)
  for (const { id, leak, links } of findings) {
    checkChance(leak, `findings.${id}.leak`)
    for (const [fault, link] of Object.entries(links))
      checkChance(link, `findings.${id}.links.${fault}`)
  }
  for (const [id, seen] of Object.entries(evidence))
    if (typeof seen === 'object' && !seen.virtual.every((x) => x >= 0 && Number.isFinite(x)))
      throw new AppError('badModel', { context: { field: `evidence.${id}.virtual` } })
}

function checkChance(chance: number, field: string): void {
  if (!(chance >= 0 && chance <= 1)) throw new AppError('badModel', { context: { field } })
}

/** A record's own entry: an id may be any word, also one that every object answers to. */
const own = <T>(record: Readonly<Record<string, T>>, id: string): T | undefined =>
  Object.hasOwn(record, id) ? record[id] : undefined
