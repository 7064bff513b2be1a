import { mayRecord } from '@/lib/shop/may-record'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, type Outcome, reject } from '../draft'

/** machine.add: a stranger's machine, or one of the fleet taken down in the field. */
export function planMachineAdd(op: Extract<Op, { kind: 'machine.add' }>, draft: Draft): Outcome {
  const machine = op.fields
  if (op.entityId !== machine.id) return reject('invalid', 'entityId')
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  if (draft.hasMachine(machine.id)) return reject('id_reuse', 'fields.id')
  if (machine.modelId !== null && !draft.known.models.has(machine.modelId)) {
    return reject('no_parent', 'fields.modelId')
  }
  draft.addMachine(machine)
  return ACCEPTED
}
