import type { SearchState, SingleModel } from '@/lib/diag/troubleshoot-model'

/** What to do in a state. */
export type Policy = (state: SearchState) => { type: 'check' | 'repair' | 'stop'; id: string }

/**
 * The exact expected cost of carrying a policy through a `single` model, straight from rules 1 to 6 of the
 * engine's spec and from nothing of the engine: used to price what `nextAction` says, and known trees.
 */
export function treeCost(model: SingleModel, policy: Policy, from?: SearchState): number {
  const state = from ?? { evidence: {}, tried: [], open: [], elapsed: 0 }
  const total = model.faults.reduce((sum, f) => sum + f.prior, 0)
  const weights = new Map(model.faults.map((f) => [f.id, f.prior / total]))
  return walk(model, policy, { state, weights })
}

export type Place = { state: SearchState; weights: ReadonlyMap<string, number> }

const mass = (weights: ReadonlyMap<string, number>) =>
  [...weights.values()].reduce((a, b) => a + b, 0)

function walk(model: SingleModel, policy: Policy, place: Place): number {
  if (mass(place.weights) < 1e-14) return 0
  const { type, id } = policy(place.state)
  if (type === 'stop') return stopCost(model, place, id)
  const step = type === 'check' ? checkStep(model, place, id) : repairStep(model, place, id)
  if (step === null) throw new Error(`${type} ${id} may not start`)
  return step.next.reduce((cost, next) => cost + walk(model, policy, next), step.cost)
}

/** Rule 4. */
export function stopCost(model: SingleModel, { weights }: Place, id: string): number {
  const stop = model.stops.find((s) => s.id === id)
  if (stop === undefined) throw new Error(`no stop ${id}`)
  const base = stop.cost + model.ratePerMinute * (stop.minutes ?? 0)
  return [...weights].reduce((sum, [f, w]) => sum + w * (base + (stop.costByFault?.[f] ?? 0)), 0)
}

/** Rules 1, 3 and 5; null when daylight forbids it or it was done. */
export function checkStep(
  model: SingleModel,
  { state, weights }: Place,
  id: string,
): { cost: number; next: Place[] } | null {
  const check = model.checks.find((c) => c.id === id)
  if (check === undefined || id in state.evidence) return null
  const opened = openFor(model, check.setup, state.open)
  const minutes = check.minutes + opened.minutes
  if (tooLate(model, state.elapsed + minutes)) return null
  const price = check.cost + model.ratePerMinute * check.minutes + opened.price
  const next = check.outcomes.map((outcome, o) => ({
    state: {
      ...state,
      evidence: { ...state.evidence, [id]: outcome },
      open: opened.open,
      elapsed: state.elapsed + minutes,
    },
    weights: new Map([...weights].map(([f, w]) => [f, w * (check.p[f]?.[o] ?? 0)])),
  }))
  return { cost: price * mass(weights), next: next.filter((n) => mass(n.weights) > 0) }
}

/** Rules 2, 3 and 5; null when the part is not on hand, daylight forbids it or it was tried. */
export function repairStep(
  model: SingleModel,
  { state, weights }: Place,
  id: string,
): { cost: number; next: Place[] } | null {
  const repair = repairOf(model, id)
  if (repair === null || state.tried.includes(id)) return null
  if (repair.needsPart !== undefined && !model.parts?.onHand.includes(repair.needsPart)) return null
  const test = model.verify ?? { cost: 0, minutes: 0 }
  const opened = openFor(model, repair.setup, state.open)
  const minutes = repair.minutes + opened.minutes + test.minutes
  if (tooLate(model, state.elapsed + minutes)) return null
  const work = repair.cost + model.ratePerMinute * (repair.minutes + test.minutes)
  let cost = (work + opened.price + test.cost) * mass(weights)
  const left = new Map<string, number>()
  for (const [fault, w] of weights) {
    const stays = w * (1 - (repair.fixes[fault] ?? 0))
    const slips = stays * falsePass(model, fault)
    cost += slips * (model.verify?.comebackCost ?? 0)
    left.set(fault, stays - slips)
  }
  const open = closeAfterTest(model, opened.open)
  const after = { ...state, tried: [...state.tried, id], open, elapsed: state.elapsed + minutes }
  return { cost, next: mass(left) > 1e-15 ? [{ state: after, weights: left }] : [] }
}

function repairOf(model: SingleModel, id: string) {
  const own = model.faults.find((f) => f.id === id)?.repair ?? null
  if (own !== null) return { ...own, fixes: { [id]: own.success ?? 1 } as Record<string, number> }
  return model.extraRepairs?.find((r) => r.id === id) ?? null
}

function falsePass(model: SingleModel, fault: string): number {
  const q = model.verify?.falsePass ?? 0
  return typeof q === 'number' ? q : (q[fault] ?? 0)
}

const tooLate = (model: SingleModel, minutes: number) =>
  minutes > (model.daylight?.minutes ?? Number.POSITIVE_INFINITY) + 1e-9

function openFor(model: SingleModel, needs: readonly string[], open: readonly string[]) {
  const all = new Set(open)
  let price = 0
  let minutes = 0
  const visit = (id: string) => {
    if (all.has(id)) return
    const setup = (model.setups ?? []).find((s) => s.id === id)
    if (setup === undefined) throw new Error(`no set-up ${id}`)
    all.add(id)
    price += (setup.cost ?? 0) + model.ratePerMinute * setup.minutes
    minutes += setup.minutes
    setup.requires.forEach(visit)
  }
  needs.forEach(visit)
  return { open: [...all], price, minutes }
}

function closeAfterTest(model: SingleModel, open: readonly string[]): string[] {
  const setups = model.setups ?? []
  const closes = (id: string, seen: readonly string[] = []): boolean => {
    const setup = setups.find((s) => s.id === id)
    if (setup === undefined || seen.includes(id)) return false
    return setup.closedByTest || setup.requires.some((other) => closes(other, [...seen, id]))
  }
  return open.filter((id) => !closes(id))
}

/** The exact optimum by trying everything, without bounds: for small models, and only with stops that end it. */
export function bruteOptimum(model: SingleModel): number {
  const total = model.faults.reduce((sum, f) => sum + f.prior, 0)
  const weights = new Map(model.faults.map((f) => [f.id, f.prior / total]))
  return least(model, { state: { evidence: {}, tried: [], open: [], elapsed: 0 }, weights })
}

function least(model: SingleModel, place: Place): number {
  if (mass(place.weights) < 1e-15) return 0
  let best = Math.min(
    Number.POSITIVE_INFINITY,
    ...model.stops.map((s) => stopCost(model, place, s.id)),
  )
  const steps = [
    ...model.checks.map((c) => checkStep(model, place, c.id)),
    ...model.faults.map((f) => repairStep(model, place, f.id)),
    ...(model.extraRepairs ?? []).map((r) => repairStep(model, place, r.id)),
  ]
  for (const step of steps) {
    if (step === null) continue
    best = Math.min(
      best,
      step.next.reduce((cost, next) => cost + least(model, next), step.cost),
    )
  }
  return best
}
