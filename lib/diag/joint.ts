/**
 * Exact belief over independent suspects, given that at least one is present. Suspects that no table factor
 * touches factor out in closed form; the touched ones are enumerated: all subsets up to EXACT of them, above
 * that all subsets of at most FEW (what is left out has chance about c^5/120 of the prior: below 1e-6 at the
 * usual 5 of 100 calls with two things wrong; tested against the full sum).
 */
import type { Factor } from './factor'

export const EXACT = 16
export const FEW = 4

/** A weighted set of unary multipliers on the odds: evidence that is a sum of products over suspects. */
export type Term = { weight: number; odds: readonly number[] }

export type Summary = {
  /** P(each suspect present | evidence, at least one). */
  marginals: number[]
  /** P(this suspect and no other | evidence, at least one). */
  only: number[]
  twoOrMore: number
  /** Relative chance of the evidence; only ratios of it mean anything. */
  evidence: number
}

/** Enumerated subsets of the touched suspects with the product of their factors' likelihoods so far. */
export type Joint = {
  touched: readonly number[]
  members: readonly (readonly number[])[]
  likelihood: Float64Array
}

/** A joint with no evidence yet over the suspects that `factors` touch; `exact` bounds the full enumeration. */
export function startJoint(factors: readonly Factor[], exact = EXACT): Joint {
  const touched = [...new Set(factors.flatMap((f) => f.scope))].sort((a, b) => a - b)
  const members = subsets(touched, touched.length <= exact ? touched.length : FEW)
  return { touched, members, likelihood: new Float64Array(members.length).fill(1) }
}

/** Multiplies a factor in, in place. Its scope must be among those the joint was started with. */
export function absorb(joint: Joint, factor: Factor): void {
  const bit = new Map(factor.scope.map((f, i) => [f, 2 ** i]))
  const known = new Map<number, number>()
  joint.members.forEach((present, state) => {
    let key = 0
    for (const f of present) key += bit.get(f) ?? 0
    let value = known.get(key)
    if (value === undefined) {
      value = factor.at(present.filter((f) => bit.has(f)))
      known.set(key, value)
    }
    joint.likelihood[state] = (joint.likelihood[state] ?? 0) * value
  })
}

/** Marginals and single-fault chances under the joint; `terms` carry the odds with their unary evidence. */
export function summarise(joint: Joint, terms: readonly Term[]): Summary {
  const n = terms[0]?.odds.length ?? 0
  const sums = { z: 0, marginals: new Array<number>(n).fill(0), only: new Array<number>(n).fill(0) }
  for (const term of terms) addTerm(joint, term, sums)
  const share = (x: number) => Math.min(1, Math.max(0, x / sums.z))
  const only = sums.only.map(share)
  return {
    marginals: sums.marginals.map(share),
    only,
    twoOrMore: Math.max(0, 1 - only.reduce((sum, p) => sum + p, 0)),
    evidence: sums.z,
  }
}

type Sums = { z: number; marginals: number[]; only: number[] }

function addTerm(joint: Joint, { weight, odds }: Term, sums: Sums): void {
  const isTouched = new Set(joint.touched)
  const untouched = odds.map((_, f) => f).filter((f) => !isTouched.has(f))
  const logQ = untouched.reduce((sum, f) => sum + Math.log1p(odds[f] ?? 0), 0)
  const q = Math.exp(logQ)
  const inside = insideSums(joint, odds)
  const none = joint.likelihood[0] ?? 0
  sums.z += weight * (q * inside.some + Math.expm1(logQ) * none)
  for (const f of joint.touched) {
    add(sums.marginals, f, weight * q * (inside.present[f] ?? 0))
    add(sums.only, f, weight * (inside.alone[f] ?? 0))
  }
  const all = inside.some + none
  for (const f of untouched) {
    const o = odds[f] ?? 0
    add(sums.marginals, f, (weight * q * all * o) / (1 + o))
    add(sums.only, f, weight * none * o)
  }
}

function insideSums(joint: Joint, odds: readonly number[]) {
  const present: number[] = new Array<number>(odds.length).fill(0)
  const alone: number[] = new Array<number>(odds.length).fill(0)
  let some = 0
  joint.members.forEach((members, state) => {
    if (members.length === 0) return
    let w = joint.likelihood[state] ?? 0
    for (const f of members) w *= odds[f] ?? 0
    some += w
    for (const f of members) add(present, f, w)
    if (members.length === 1) add(alone, members[0] ?? 0, w)
  })
  return { present, alone, some }
}

function add(to: number[], at: number, value: number): void {
  to[at] = (to[at] ?? 0) + value
}

/** All subsets of `items` of at most `most` members, the empty one first. */
function subsets(items: readonly number[], most: number): number[][] {
  const all: number[][] = [[]]
  for (const item of items) {
    const before = all.length
    for (let i = 0; i < before; i++) {
      const set = all[i]
      if (set !== undefined && set.length < most) all.push([...set, item])
    }
  }
  return all
}
