import type { FieldWrite } from '@/db/queries/field-history'
import type { Id } from '@/lib/model/id'
import { mayRecord } from '@/lib/shop/may-record'
import { seesJob } from '@/lib/shop/scope'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, reject, waitFor } from '../draft'
import { type Merged, mergeWrite, type NewWrite } from '../field-merge'
import type { Outcome, Standing } from '../known'

type OpOf<K extends Op['kind']> = Extract<Op, { kind: K }>

/** What a writer hears of the value that did not stand, and what the row shows of it (M2). */
const told = (field: string, { id, value, personId, writtenAt, clockOdd }: FieldWrite) => ({
  id,
  field,
  value,
  by: personId,
  at: writtenAt,
  clockOdd,
})

/** An op as a write of a value into the row it names, or into one the writer had not (`hasRow` false). */
export const writeOf = (op: Op, value: unknown, draft: Draft, hasRow = true): NewWrite => ({
  id: op.id,
  value,
  hlc: op.hlc,
  base: hasRow ? op.base : null,
  hasRow,
  deviceId: op.dev,
  dseq: op.dseq,
  personId: draft.known.actor.personId,
})

/** Puts a value among those of its field, and into the row when it stands. */
function setValue(standing: Standing, write: NewWrite, draft: Draft): Merged {
  const { entity, entityId, setting } = standing
  const held = draft.writesOf(entityId, setting.field)
  const merged = mergeWrite(held, write, { field: setting.field, at: draft.known.at })
  draft.keepWrites({ entity, entityId, field: setting.field }, [...held, ...merged.changed])
  if (merged.stands) draft.letStand(standing)
  return merged
}

/** The row the op names and the one that goes on for it; what counts is the latter (M10). */
function setInBoth(
  op: OpOf<'job.set' | 'machine.set'>,
  { lead, draft }: { lead: Id; draft: Draft },
): Outcome {
  const at = (entityId: Id): Standing =>
    op.kind === 'job.set'
      ? { entity: 'job', entityId, setting: op.fields }
      : { entity: 'machine', entityId, setting: op.fields }
  const { field, value } = op.fields
  const own = setValue(at(op.entityId), writeOf(op, value, draft), draft)
  const merged =
    lead === op.entityId ? own : setValue(at(lead), writeOf(op, value, draft, false), draft)
  const { loser } = merged
  return loser === null ? ACCEPTED : { kind: 'merged', loser: told(field, loser) }
}

/** job.set: one value of a job; of two written without knowing of each other the later one stands. */
export function planJobSet(op: OpOf<'job.set'>, draft: Draft): Outcome {
  const refusal = refuseJob(op, draft)
  return refusal ?? setInBoth(op, { lead: draft.leadOf(op.entityId), draft })
}

function refuseJob(op: OpOf<'job.set' | 'job.settle'>, draft: Draft): Outcome | null {
  if (op.jobId !== null && op.jobId !== op.entityId) return reject('invalid', 'jobId')
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  const lead = draft.lead(op.entityId)
  if (!lead) return waitFor(op.entityId)
  return seesJob(draft.known.actor, lead) ? null : reject('forbidden')
}

/** machine.set: one value of a machine; one that was taken back stands again, as it is written into. */
export function planMachineSet(op: OpOf<'machine.set'>, draft: Draft): Outcome {
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  const machine = draft.machine(op.entityId)
  if (!machine) return waitFor(op.entityId)
  if (machine.isPurged) return reject('no_parent', 'entityId')
  if (machine.isDropped) reviveMachine(op.entityId, draft)
  return setInBoth(op, { lead: machine.mergedInto ?? op.entityId, draft })
}

/** What was taken back stands again, as somebody wrote into it meanwhile (M8); the taking back lost. */
export function reviveMachine(machineId: Id, draft: Draft): void {
  draft.dropMachine(machineId, { isDropped: false, revived: true })
  loseDrop({ entity: 'machine', entityId: machineId }, draft)
}

/** The taking back of a row that did not stand; it is kept in the history. */
export function loseDrop(
  at: { entity: 'machine' | 'partRequest'; entityId: Id },
  draft: Draft,
): void {
  const lost = draft
    .writesOf(at.entityId, 'row')
    .filter((write) => write.state === 'current')
    .map((write) => ({ ...write, state: 'lost' as const, lostAfter: draft.known.at.seq }))
  if (lost.length > 0) draft.keepWrites({ ...at, field: 'row' }, lost)
}

/** job.settle and machine.settle: somebody looked at values that did not stand (M4). */
export function planSettle(op: OpOf<'job.settle' | 'machine.settle'>, draft: Draft): Outcome {
  const refusal = op.kind === 'job.settle' ? refuseJob(op, draft) : refuseMachine(op, draft)
  if (refusal !== null) return refusal
  // Also one that was given up meanwhile, e.g. by the new value that uses it: then there is nothing to do.
  const known = draft.writeIdsOf(op.entityId)
  if (op.fields.history.some((id) => !known.has(id))) return reject('no_parent', 'fields.history')
  const entity = op.kind === 'job.settle' ? 'job' : 'machine'
  draft.effects.looked.push({ entity, entityId: op.entityId, ids: op.fields.history })
  return ACCEPTED
}

function refuseMachine(op: OpOf<'machine.settle'>, draft: Draft): Outcome | null {
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  return draft.machine(op.entityId) ? null : waitFor(op.entityId)
}
