import { decidedWayOut } from '@/lib/diag/way-out'
import type { Id } from '@/lib/model/id'
import type { LogEntry } from '@/lib/model/log-entry'
import { mayRecord } from '@/lib/shop/may-record'
import { may } from '@/lib/shop/permissions'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, reject, waitFor } from '../draft'
import type { Outcome } from '../known'

/** Who wrote it must be who sends it, from the device that says so (P18), and may write and strike that. */
function judgeHand(op: Extract<Op, { kind: 'log.add' }>, draft: Draft): Outcome {
  const entry = op.fields
  const { actor, deviceId } = draft.known
  if (op.entityId !== entry.id) return reject('invalid', 'entityId')
  if (op.jobId !== null && op.jobId !== entry.jobId) return reject('invalid', 'jobId')
  if (entry.authorId !== actor.personId) return reject('not_yours', 'fields.authorId')
  if (entry.deviceId !== deviceId) return reject('not_yours', 'fields.deviceId')
  const target = entry.supersedes === null ? undefined : draft.entry(entry.supersedes)
  return mayRecord(op, draft.writer, target) ? ACCEPTED : reject('forbidden')
}

/** An entry points back only within its own job, or one merged with it. */
function judgeBacklink(entry: LogEntry, draft: Draft): Outcome {
  if (entry.supersedes === null) return ACCEPTED
  const jobId = draft.jobOfEntry(entry.supersedes)
  if (jobId === undefined) return waitFor(entry.supersedes)
  const isOfIt = draft.leadOf(jobId) === draft.leadOf(entry.jobId)
  return isOfIt ? ACCEPTED : reject('no_parent', 'fields.supersedes')
}

/** A job's way out is what the living entries of its log say last. */
function decideAgain(jobId: Id, draft: Draft): void {
  const job = draft.job(jobId)
  const wayOut = decidedWayOut(draft.decidingOf(jobId))?.body.wayOut ?? null
  if (job && wayOut !== job.wayOut) draft.changeJob(jobId, { ...job, wayOut })
}

/**
 * log.add: evidence is only ever added, so neither the job's state nor a wrong clock refuses it, nor
 * that the job passed into other hands meanwhile. A job closed at the desk comes back as open when the
 * field writes on (R13). An entry of a merged job stays that job's; what it moves is the one that goes on.
 */
export function planLogAdd(op: Extract<Op, { kind: 'log.add' }>, draft: Draft): Outcome {
  const entry = op.fields
  const hand = judgeHand(op, draft)
  if (hand.kind !== 'accepted') return hand
  if (draft.jobOfEntry(entry.id) !== undefined) return reject('id_reuse', 'fields.id')
  if (!draft.job(entry.jobId)) return waitFor(entry.jobId)
  const backlink = judgeBacklink(entry, draft)
  if (backlink.kind !== 'accepted') return backlink
  draft.addEntry(entry)
  if (entry.body.kind === 'wayOut' || entry.supersedes !== null) {
    for (const id of new Set([entry.jobId, draft.leadOf(entry.jobId)])) decideAgain(id, draft)
  }
  return reopen(draft.leadOf(entry.jobId), draft) ? REOPENED : ACCEPTED
}

/** The entry is in; what did not stand is that the job was closed, and the phone says so (R13). */
const REOPENED: Outcome = { kind: 'merged', loser: { field: 'state', value: 'closed' } }

/** Closed at the desk, or by another phone, while this one was still writing: it is open again. True then. */
function reopen(jobId: Id, draft: Draft): boolean {
  const job = draft.job(jobId)
  const fromField = may(draft.known.actor.roles, 'check.guideSafe')
  if (job?.state !== 'closed' || !fromField || draft.isClosedHere(jobId)) return false
  const step = { jobId, what: 'job', from: 'closed', to: 'open' } as const
  draft.stepJob(step, { ...job, state: 'open' })
  return true
}
