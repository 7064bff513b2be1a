import { nextAction } from '@/lib/diag/troubleshoot'
import type { SearchState, SingleModel } from '@/lib/diag/troubleshoot-model'
import type { Policy } from '../diag/tree-walk'

/** The engine as a policy, asked once for each state. */
export function enginePolicy(model: SingleModel): Policy {
  const known = new Map<string, ReturnType<Policy>>()
  return (state: SearchState) => {
    const key = JSON.stringify(state)
    const answer = known.get(key) ?? nextAction(model, state)
    known.set(key, answer)
    return answer
  }
}
