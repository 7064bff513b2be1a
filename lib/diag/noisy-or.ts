/**
 * Exact marginals of independent faults under noisy-OR findings with leaks, at any number of faults: absent
 * findings multiply the odds; each present or virtual one, and "at least one fault", is a bit that faults may
 * set. Forward and backward sums over the bits' states give every marginal in one pass each: exponential only
 * in those findings, all terms positive, so nothing cancels (compare Heckerman 1989, whose sum alternates).
 */
import { AppError } from '@/lib/model/result'
import type { NoisyOrModel } from './troubleshoot-model'

/** Bits that can be carried: 2^20 states. */
export const MOST_POSITIVE = 20

/** A bit of the state: who sets it, how it starts, and what each value is worth in the end. */
type Bit = { links: readonly number[]; leak: number; worth: readonly [number, number] }

/**
 * P(each fault | evidence). With condition `atLeastOne` no-fault is excluded. Throws AppError `tooLarge`
 * above 20 present or virtual findings, and `impossible` when the evidence cannot come about.
 */
export function noisyOrMarginals(model: NoisyOrModel): Record<string, number> {
  const faults = model.faults.map((f) => f.id)
  const stays = model.faults.map(() => 1)
  const bits: Bit[] = []
  for (const finding of model.findings) {
    const seen = model.evidence[finding.id]
    if (seen === undefined) continue
    const links = faults.map((f) => finding.links[f] ?? 0)
    if (seen === 0)
      links.forEach((w, f) => {
        stays[f] = (stays[f] ?? 1) * (1 - w)
      })
    else bits.push({ links, leak: finding.leak, worth: seen === 1 ? [0, 1] : seen.virtual })
  }
  if (model.condition === 'atLeastOne')
    bits.push({ links: faults.map(() => 1), leak: 0, worth: [0, 1] })
  if (bits.length > MOST_POSITIVE)
    throw new AppError('tooLarge', { context: { bits: bits.length } })
  const absent = model.faults.map((f) => 1 - f.prior)
  const present = model.faults.map((f, i) => f.prior * (stays[i] ?? 1))
  const shares = sweep(bits, absent, present)
  return Object.fromEntries(faults.map((id, f) => [id, shares[f] ?? 0]))
}

/** The chance of each fault being present, from forward states before it and backward worths after it. */
function sweep(
  bits: readonly Bit[],
  absent: readonly number[],
  present: readonly number[],
): number[] {
  const size = 2 ** bits.length
  let worth: Float64Array = Float64Array.from({ length: size }, (_, s) =>
    bits.reduce((product, b, i) => product * (b.worth[(s >> i) & 1] ?? 0), 1),
  )
  const after: Float64Array[] = []
  for (let f = absent.length - 1; f >= 0; f--) {
    after[f] = worth
    const set = pull(bits, f, worth)
    const [a, p] = [absent[f] ?? 1, present[f] ?? 0]
    worth = worth.map((x, s) => a * x + p * (set[s] ?? 0))
  }
  let states: Float64Array = Float64Array.from({ length: size }, (_, s) =>
    bits.reduce((product, b, i) => product * (((s >> i) & 1) === 1 ? b.leak : 1 - b.leak), 1),
  )
  return absent.map((_, f) => {
    const set = push(bits, f, states)
    const [a, p] = [absent[f] ?? 1, present[f] ?? 0]
    const without = a * inner(states, after[f])
    const withIt = p * inner(set, after[f])
    if (!(without + withIt > 0)) throw new AppError('impossible')
    states = states.map((x, s) => a * x + p * (set[s] ?? 0))
    return withIt / (without + withIt)
  })
}

/** States after a present fault has set its bits with its chances. */
function push(bits: readonly Bit[], fault: number, states: Float64Array): Float64Array {
  const next = Float64Array.from(states)
  eachPair(bits, fault, next.length, (w, off, on) => {
    const x = next[off] ?? 0
    next[off] = x * (1 - w)
    next[on] = (next[on] ?? 0) + x * w
  })
  return next
}

/** What a state will be worth if the fault is present: the same step looked at backwards. */
function pull(bits: readonly Bit[], fault: number, worth: Float64Array): Float64Array {
  const next = Float64Array.from(worth)
  eachPair(bits, fault, next.length, (w, off, on) => {
    next[off] = (1 - w) * (next[off] ?? 0) + w * (next[on] ?? 0)
  })
  return next
}

function eachPair(
  bits: readonly Bit[],
  fault: number,
  size: number,
  visit: (w: number, off: number, on: number) => void,
): void {
  bits.forEach(({ links }, i) => {
    const w = links[fault] ?? 0
    if (w === 0) return
    const bit = 1 << i
    for (let s = 0; s < size; s++) if ((s & bit) === 0) visit(w, s, s | bit)
  })
}

function inner(a: Float64Array, b: Float64Array | undefined): number {
  let total = 0
  for (let s = 0; s < a.length; s++) total += (a[s] ?? 0) * (b?.[s] ?? 0)
  return total
}
