import { mayRecord } from '@/lib/shop/may-record'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, reject } from '../draft'
import type { Outcome } from '../known'

/** book.heard: somebody acknowledged a withdrawal from the code book (R23); a second time changes nothing. */
export function planBookHeard(op: Extract<Op, { kind: 'book.heard' }>, draft: Draft): Outcome {
  const { withdrawalId, at } = op.fields
  if (op.entityId !== withdrawalId) return reject('invalid', 'entityId')
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  if (!draft.known.withdrawals.has(withdrawalId)) return reject('no_parent', 'entityId')
  draft.effects.heard.push({ withdrawalId, at })
  return ACCEPTED
}
