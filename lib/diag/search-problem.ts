/**
 * A `single` model with numbers for names: what one step costs and what it leaves. From where a search begins,
 * beliefs are carried as joint weights (chance x likelihood x chance of having failed so far), never normalised:
 * the cost of a plan is then linear in them, and a state is worth the same whichever way it was reached.
 */
import { AppError } from '@/lib/model/result'
import type { SearchState, SingleModel } from './troubleshoot-model'

/**
 * A repair: `fails[f]` is the chance that fault f survives it; `cures` lists the faults it may mend, `ends` those for
 * which it may end the job, by mending them or by a test run that passes wrongly.
 */
export type Repair = {
  id: string
  cures: readonly number[]
  ends: readonly number[]
  price: number
  minutes: number
  setups: number
  fails: Float64Array
}
/** A check: `p[o][f]` is the chance of outcome o given fault f. */
export type Check = {
  id: string
  price: number
  minutes: number
  setups: number
  outcomes: readonly string[]
  p: readonly Float64Array[]
}

/** The model in numbers; money and minutes as in the model, set-ups as bits of a mask. */
export type Problem = {
  faults: readonly string[]
  repairs: readonly Repair[]
  checks: readonly Check[]
  /** Cost of each stop per fault. */
  stops: readonly { id: string; byFault: Float64Array }[]
  setups: readonly { price: number; minutes: number }[]
  /** Set-ups closed by a test run, as a mask: those that say so and all that require them. */
  closed: number
  /** Chance that the test run passes wrongly, per fault, and what a comeback then costs. */
  falsePass: Float64Array
  /** Whether any test run can pass wrongly. */
  slips: boolean
  comeback: number
  /** What the cheapest stop costs for its cheapest fault, where that is below 0; else 0. */
  gift: number
  /** Minutes in all; infinite without daylight. */
  daylight: number
  /** Room to reckon in. */
  room: Room
}

/** Room in which the plan without checks is reckoned (repairs-only.ts), so that it makes nothing on the way. */
export type Room = {
  /** The repair the plan begins with; -1 for a stop. */
  first: number
  w: Float64Array
  stops: Float64Array
  ratios: Float64Array
  order: Int32Array
  left: Int32Array
}

const roomOf = (size: { faults: number; repairs: number; stops: number }): Room => ({
  first: -1,
  w: new Float64Array(size.faults),
  stops: new Float64Array(size.stops),
  ratios: new Float64Array(size.repairs),
  order: new Int32Array(size.repairs),
  left: new Int32Array(size.repairs),
})

/** The three kinds of action. */
export type ActionType = 'check' | 'repair' | 'stop'

/** Checks and repairs up to this many are searched exactly; above it a mask no longer holds them. */
export const MOST_IN_MASK = 30

/** The model as a problem; throws AppError `badModel` on names that do not exist or more than 30 set-ups. */
export function problemOf(model: SingleModel): Problem {
  const faults = model.faults.map((f) => f.id)
  if ((model.setups?.length ?? 0) > 30) throw strange('setups')
  const closure = closureOf(model)
  const maskOf = (ids: readonly string[]) => ids.reduce((mask, id) => mask | closure(id), 0)
  const rate = model.ratePerMinute
  const test = model.verify ?? { cost: 0, minutes: 0 }
  const testPrice = test.cost + rate * test.minutes
  const onHand = new Set(model.parts?.onHand ?? [])
  const repairs = repairsOf(model)
    .filter((r) => r.needsPart === undefined || onHand.has(r.needsPart))
    .map((r) => ({
      id: r.id,
      cures: faults.flatMap((f, i) => ((r.fixes[f] ?? 0) > 0 ? [i] : [])),
      ends: faults.flatMap((f, i) =>
        (r.fixes[f] ?? 0) > 0 || falsePassOf(test.falsePass, f) > 0 ? [i] : [],
      ),
      price: r.cost + rate * r.minutes + testPrice,
      minutes: r.minutes + test.minutes,
      setups: maskOf(r.setup),
      fails: Float64Array.from(faults, (f) => 1 - (r.fixes[f] ?? 0)),
    }))
  const checks = model.checks.map((c) => ({
    id: c.id,
    price: c.cost + rate * c.minutes,
    minutes: c.minutes,
    setups: maskOf(c.setup),
    outcomes: c.outcomes,
    p: c.outcomes.map((_, o) =>
      Float64Array.from(faults, (f) => c.p[f]?.[o] ?? 1 / c.outcomes.length),
    ),
  }))
  const stops = model.stops.map((s) => ({
    id: s.id,
    byFault: Float64Array.from(
      faults,
      (f) => s.cost + rate * (s.minutes ?? 0) + (s.costByFault?.[f] ?? 0),
    ),
  }))
  return {
    faults,
    repairs,
    checks,
    stops,
    gift: stops.reduce((least, { byFault }) => Math.min(least, ...byFault), 0),
    setups: (model.setups ?? []).map((s) => ({
      price: (s.cost ?? 0) + rate * s.minutes,
      minutes: s.minutes,
    })),
    closed: closedMask(model, closure),
    falsePass: Float64Array.from(faults, (f) => falsePassOf(test.falsePass, f)),
    slips: faults.some((f) => falsePassOf(test.falsePass, f) > 0),
    comeback: test.comebackCost ?? 0,
    daylight: model.daylight?.minutes ?? Number.POSITIVE_INFINITY,
    room: roomOf({
      faults: faults.length,
      repairs: repairs.length,
      stops: model.stops.length,
    }),
  }
}

/**
 * The chance of each fault in a state: prior x likelihood of its outcomes x chance that its repairs failed. Sums to
 * 1; all zero when the state cannot come about. Throws AppError `badModel` for names that the model has not.
 */
export function weightsOf(model: SingleModel, problem: Problem, state: SearchState): Float64Array {
  checkNames(model, state)
  const w = Float64Array.from(model.faults, (f) => f.prior)
  normalise(w)
  for (const check of problem.checks) {
    const outcome = Object.hasOwn(state.evidence, check.id) ? state.evidence[check.id] : undefined
    if (outcome === undefined) continue
    const row = check.p[check.outcomes.indexOf(outcome)]
    if (row === undefined) throw strange(`state.evidence.${check.id}`)
    for (let f = 0; f < w.length; f++) w[f] = (w[f] ?? 0) * (row[f] ?? 0)
    normalise(w)
  }
  for (const { id, fixes } of repairsOf(model)) {
    if (!state.tried.includes(id)) continue
    problem.faults.forEach((fault, f) => {
      const stays = (1 - (fixes[fault] ?? 0)) * (1 - (problem.falsePass[f] ?? 0))
      w[f] = (w[f] ?? 0) * stays
    })
    normalise(w)
  }
  return w
}

/** After each piece, so that much unlikely evidence does not run out of digits. */
function normalise(w: Float64Array): void {
  let mass = 0
  for (let f = 0; f < w.length; f++) mass += w[f] ?? 0
  if (mass > 0) for (let f = 0; f < w.length; f++) w[f] = (w[f] ?? 0) / mass
}

function checkNames(model: SingleModel, { evidence, tried }: SearchState): void {
  for (const id of Object.keys(evidence))
    if (!model.checks.some((c) => c.id === id)) throw strange(`state.evidence.${id}`)
  for (const id of tried)
    if (![...model.faults, ...(model.extraRepairs ?? [])].some((r) => r.id === id))
      throw strange('state.tried')
}

const strange = (field: string): AppError => new AppError('badModel', { context: { field } })

/** What is left of checks and repairs in a state, by place. */
export function leftOf(
  problem: Problem,
  state: SearchState,
): { checks: number[]; repairs: number[] } {
  return {
    checks: problem.checks.flatMap((c, i) => (Object.hasOwn(state.evidence, c.id) ? [] : [i])),
    repairs: problem.repairs.flatMap((r, i) => (state.tried.includes(r.id) ? [] : [i])),
  }
}

/** The set-ups a state holds open, with what they require. */
export function openOf(model: SingleModel, state: SearchState): number {
  const closure = closureOf(model)
  return state.open.reduce((mask, id) => mask | closure(id), 0)
}

/** Price and minutes of opening what `need` asks for beyond what is open. */
export function opening(
  problem: Problem,
  need: number,
  open: number,
): { price: number; minutes: number } {
  let missing = need & ~open
  let price = 0
  let minutes = 0
  for (let i = 0; missing !== 0; i++, missing >>>= 1) {
    if ((missing & 1) === 0) continue
    price += problem.setups[i]?.price ?? 0
    minutes += problem.setups[i]?.minutes ?? 0
  }
  return { price, minutes }
}

function repairsOf(model: SingleModel) {
  const own = model.faults.flatMap(({ id, repair }) =>
    repair === null
      ? []
      : [{ ...repair, id, fixes: { [id]: repair.success ?? 1 } as Record<string, number> }],
  )
  return [...own, ...(model.extraRepairs ?? [])]
}

const falsePassOf = (
  falsePass: number | Readonly<Record<string, number>> | undefined,
  fault: string,
): number => (typeof falsePass === 'number' ? falsePass : (falsePass?.[fault] ?? 0))

/** A set-up with all that it requires, as a mask. */
function closureOf(model: SingleModel): (id: string) => number {
  const setups = model.setups ?? []
  const at = new Map(setups.map((s, i) => [s.id, i]))
  const placeOf = (id: string): number => {
    const i = at.get(id)
    if (i === undefined) throw strange(`setup ${id}`)
    return i
  }
  const masks = setups.map(({ requires }, i) =>
    requires.reduce((m, other) => m | (1 << placeOf(other)), 1 << i),
  )
  // Once round adds what is required one step further; a ring of set-ups that require each other settles too.
  for (let round = 0; round < setups.length; round++)
    masks.forEach((mask, i) => {
      masks[i] = masks.reduce((m, other, j) => ((mask & (1 << j)) === 0 ? m : m | other), mask)
    })
  return (id) => masks[placeOf(id)] ?? 0
}

function closedMask(model: SingleModel, closure: (id: string) => number): number {
  const setups = model.setups ?? []
  const closing = setups.reduce((m, s, i) => (s.closedByTest ? m | (1 << i) : m), 0)
  return setups.reduce((m, s, i) => ((closure(s.id) & closing) !== 0 ? m | (1 << i) : m), 0)
}
