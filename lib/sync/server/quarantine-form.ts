import type { Actor } from '@/lib/model/person'
import type { DecideForm } from '@/lib/model/phones'
import { ok, type Result } from '@/lib/model/result'
import {
  acceptAll,
  acceptItem,
  type Decided,
  type DecideProblem,
  type Deciding,
  refuseAll,
  refuseItem,
} from './quarantine-decide'

/** Does what the owner's form says; answers what became of each item. */
export async function decide(
  owner: Actor,
  form: DecideForm,
  with_: Deciding,
): Promise<Result<Decided[], DecideProblem>> {
  const { phoneId: deviceId, opId } = form
  if (form.decision === 'accept') {
    if (opId === null) return ok(await acceptAll(owner, deviceId, with_))
    return listed(await acceptItem(owner, opId, with_))
  }
  const { reason } = form
  if (opId === null) return ok(await refuseAll(owner, { deviceId, reason }, with_))
  return listed(await refuseItem(owner, { opId, reason }, with_))
}

const listed = (answer: Result<Decided, DecideProblem>): Result<Decided[], DecideProblem> =>
  answer.ok ? ok([answer.value]) : answer
