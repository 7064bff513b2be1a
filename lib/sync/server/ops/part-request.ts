import type { PartRequest } from '@/lib/model/part-request'
import { mayRecord } from '@/lib/shop/may-record'
import { seesJob } from '@/lib/shop/scope'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, reject, waitFor } from '../draft'
import type { Outcome } from '../known'

/** The entries that condemned the old parts must have landed, and be of this job or one merged with it. */
function judgeReasons(request: PartRequest, draft: Draft): Outcome {
  for (const [index, line] of request.lines.entries()) {
    if (line.condemnedBy === null) continue
    const jobId = draft.jobOfEntry(line.condemnedBy)
    if (jobId === undefined) return waitFor(line.condemnedBy)
    if (draft.leadOf(jobId) !== draft.leadOf(request.jobId)) {
      return reject('no_parent', `fields.lines.${index}.condemnedBy`)
    }
  }
  return ACCEPTED
}

/** partRequest.ask: what the field asks the parts desk for; its lines start as asked (R14). */
export function planPartRequestAsk(
  op: Extract<Op, { kind: 'partRequest.ask' }>,
  draft: Draft,
): Outcome {
  const request = op.fields
  if (op.entityId !== request.id) return reject('invalid', 'entityId')
  if (op.jobId !== null && op.jobId !== request.jobId) return reject('invalid', 'jobId')
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  if (draft.request(request.id)) return reject('id_reuse', 'fields.id')
  if (new Set(request.lines.map((line) => line.id)).size !== request.lines.length) {
    return reject('id_reuse', 'fields.lines')
  }
  const job = draft.lead(request.jobId)
  if (!job) return waitFor(request.jobId)
  if (!seesJob(draft.known.actor, job)) return reject('forbidden')
  const reasons = judgeReasons(request, draft)
  if (reasons.kind === 'accepted') draft.addPartRequest(request)
  return reasons
}
