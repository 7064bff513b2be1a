/** One invented job, carried through with a policy: the fault and all outcomes come from the seed. */
import type { SearchState, SingleModel } from '@/lib/diag/troubleshoot-model'
import { START } from '@/lib/diag/troubleshoot-model'
import { checkStep, type Place, type Policy, repairStep, stopCost } from '../../diag/tree-walk'
import { randomFrom } from './models'

/** What the job cost in the end. The same seed gives any policy the same fault, and a check the same outcome. */
export function simulatedCost(model: SingleModel, policy: Policy, seed: number): number {
  const fault = drawn(
    model.faults.map((f) => f.prior),
    randomFrom(seed)(),
  )
  const weights = new Map(model.faults.map((f, i) => [f.id, i === fault ? 1 : 0]))
  let state: SearchState | null = START
  let cost = 0
  while (state !== null) {
    const done = carriedOut(model, { place: { state, weights }, action: policy(state), seed })
    cost += done.cost
    state = done.state
  }
  return cost
}

type Doing = { place: Place; action: ReturnType<Policy>; seed: number }

/** One action with the seed's luck: what it cost, and the state it leaves; null when the job is over. */
function carriedOut(
  model: SingleModel,
  { place, action: { type, id }, seed }: Doing,
): { cost: number; state: SearchState | null } {
  if (type === 'stop') return { cost: stopCost(model, place, id), state: null }
  const step = type === 'check' ? checkStep(model, place, id) : repairStep(model, place, id)
  if (step === null) throw new Error(`${type} ${id} may not start`)
  const shares = step.next.map((next) => [...next.weights.values()].reduce((a, b) => a + b, 0))
  const luck = randomFrom(seed * 31 + hash(id))()
  // A check leads to one of its outcomes; a repair that was seen to fail to its only next state.
  const survives = type === 'check' || luck < (shares[0] ?? 0)
  const next = survives ? step.next[type === 'check' ? drawn(shares, luck) : 0] : undefined
  return { cost: step.cost, state: next?.state ?? null }
}

function drawn(shares: readonly number[], luck: number): number {
  const total = shares.reduce((a, b) => a + b, 0)
  let sum = 0
  for (const [i, share] of shares.entries()) {
    sum += share / total
    if (luck < sum) return i
  }
  return shares.length - 1
}

const hash = (text: string): number =>
  [...text].reduce((sum, letter) => (sum * 33 + letter.charCodeAt(0)) >>> 0, 5381)
