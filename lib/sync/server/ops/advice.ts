import { mayRecord } from '@/lib/shop/may-record'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, reject, waitFor } from '../draft'
import type { Outcome } from '../known'

/** advice.keep: a recommendation followed or overridden, kept whole (R23). */
export function planAdviceKeep(op: Extract<Op, { kind: 'advice.keep' }>, draft: Draft): Outcome {
  const advice = op.fields
  if (op.entityId !== advice.id) return reject('invalid', 'entityId')
  if (op.jobId !== null && op.jobId !== advice.jobId) return reject('invalid', 'jobId')
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  if (draft.hasAdvice(advice.id)) return reject('id_reuse', 'fields.id')
  if (!draft.job(advice.jobId)) return waitFor(advice.jobId)
  draft.addAdvice(advice)
  return ACCEPTED
}
