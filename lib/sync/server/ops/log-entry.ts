import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { may, mayLog } from '@/lib/shop/permissions'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, type Outcome, reject, waitFor } from '../draft'

/** The check or swap an entry is about, for the guide's question. */
function subjectOf(body: LogBody): string | null {
  if (body.kind === 'check' || body.kind === 'reading') return body.checkId
  return body.kind === 'swap' ? body.swapId : null
}

/** Who wrote it must be who sends it, from the device that says so (P18). */
function judgeHand(op: Extract<Op, { kind: 'log.add' }>, draft: Draft): Outcome {
  const entry = op.fields
  const { actor, deviceId, guideSafe } = draft.known
  if (op.entityId !== entry.id) return reject('invalid', 'entityId')
  if (op.jobId !== null && op.jobId !== entry.jobId) return reject('invalid', 'jobId')
  if (entry.authorId !== actor.personId) return reject('not_yours', 'fields.authorId')
  if (entry.deviceId !== deviceId) return reject('not_yours', 'fields.deviceId')
  const subject = subjectOf(entry.body)
  const safe = subject !== null && guideSafe.has(subject)
  return mayLog(actor.roles, entry.body.kind, safe) ? ACCEPTED : reject('forbidden')
}

/** An entry points back only within its own job. */
function judgeBacklink(entry: LogEntry, draft: Draft): Outcome {
  if (entry.supersedes === null) return ACCEPTED
  const jobId = draft.jobOfEntry(entry.supersedes)
  if (jobId === undefined) return waitFor(entry.supersedes)
  return jobId === entry.jobId ? ACCEPTED : reject('no_parent', 'fields.supersedes')
}

/**
 * log.add: evidence is only ever added, so neither the job's state nor a wrong clock refuses it, nor
 * that the job passed into other hands meanwhile. A job closed at the desk comes back as open when the
 * field writes on (R13).
 */
export function planLogAdd(op: Extract<Op, { kind: 'log.add' }>, draft: Draft): Outcome {
  const entry = op.fields
  const hand = judgeHand(op, draft)
  if (hand.kind !== 'accepted') return hand
  if (draft.jobOfEntry(entry.id) !== undefined) return reject('id_reuse', 'fields.id')
  const job = draft.job(entry.jobId)
  if (!job) return waitFor(entry.jobId)
  const backlink = judgeBacklink(entry, draft)
  if (backlink.kind !== 'accepted') return backlink
  draft.addEntry(entry)
  if (entry.body.kind === 'wayOut') {
    draft.changeJob(entry.jobId, { ...job, wayOut: entry.body.wayOut })
  }
  reopen(entry, draft)
  return ACCEPTED
}

/** Closed at the desk, or by another phone, while this one was still writing: it is open again. */
function reopen({ jobId }: LogEntry, draft: Draft): void {
  const job = draft.job(jobId)
  const fromField = may(draft.known.actor.roles, 'check.guideSafe')
  if (job?.state !== 'closed' || !fromField || draft.isClosedHere(jobId)) return
  const step = { jobId, what: 'job', from: 'closed', to: 'open' } as const
  draft.stepJob(step, { ...job, state: 'open' })
}
