import { mayRecord } from '@/lib/shop/may-record'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, reject, waitFor } from '../draft'
import { hadSeen, stamped } from '../field-merge'
import type { Outcome } from '../known'
import { writeOf } from './setting'

/** machine.add: a stranger's machine, or one of the fleet taken down in the field. */
export function planMachineAdd(op: Extract<Op, { kind: 'machine.add' }>, draft: Draft): Outcome {
  const machine = op.fields
  if (op.entityId !== machine.id) return reject('invalid', 'entityId')
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  if (draft.machine(machine.id)) return reject('id_reuse', 'fields.id')
  if (machine.modelId !== null && !draft.known.models.has(machine.modelId)) {
    return reject('no_parent', 'fields.modelId')
  }
  draft.addMachine(machine)
  return ACCEPTED
}

/**
 * machine.drop: a stranger's machine taken down by mistake. Once a job stands on it, or somebody wrote
 * into it without the writer of this knowing, it stays, marked, and the taking back is kept (M8).
 */
export function planMachineDrop(op: Extract<Op, { kind: 'machine.drop' }>, draft: Draft): Outcome {
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  const machine = draft.machine(op.entityId)
  if (!machine) return waitFor(op.entityId)
  if (machine.isPurged) return reject('no_parent', 'entityId')
  if (machine.isFleet) return reject('forbidden', null, 'A machine of the fleet')
  if (machine.isDropped) return ACCEPTED
  const openers = draft.openersOn(op.entityId)
  if (openers.includes(op.dev)) return reject('stale_status', null, 'inUse')
  const write = writeOf(op, 'takenBack', draft)
  const edits = draft.editsOf(op.entityId)
  const isBeaten = openers.length > 0 || edits.some((edit) => !hadSeen(write, edit))
  const drop = stamped(write, [], draft.known.at)
  draft.keepWrites({ entity: 'machine', entityId: op.entityId, field: 'row' }, [
    isBeaten ? { ...drop, state: 'lost', lostAfter: draft.known.at.seq } : drop,
  ])
  draft.dropMachine(op.entityId, { isDropped: !isBeaten, revived: isBeaten })
  return isBeaten ? { kind: 'merged', loser: { field: 'row', value: 'takenBack' } } : ACCEPTED
}
