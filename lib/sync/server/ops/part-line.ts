import type { RequestStand } from '@/db/queries/part-lines'
import { mayRecord } from '@/lib/shop/may-record'
import { cancelLine, countLine } from '@/lib/shop/part-count'
import { seesJob } from '@/lib/shop/scope'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, reject, waitFor } from '../draft'
import { hadSeen, stamped } from '../field-merge'
import type { Outcome } from '../known'
import { loseDrop, writeOf } from './setting'

type OpOf<K extends Op['kind']> = Extract<Op, { kind: K }>
type LineOp = OpOf<'partLine.add' | 'partLine.cancel' | 'partLine.quantity'>
type Found = { request: RequestStand } | { refusal: Outcome }

/** The request an op is about: there, of a job in this person's hands, and not long gone. */
function requestOf(op: LineOp | OpOf<'partRequest.drop'>, draft: Draft): Found {
  const request = draft.request(op.entityId)
  if (!mayRecord(op, draft.writer)) return { refusal: reject('forbidden') }
  if (!request) return { refusal: waitFor(op.entityId) }
  if (op.jobId !== null && op.jobId !== request.jobId) {
    return { refusal: reject('invalid', 'jobId') }
  }
  const job = draft.lead(request.jobId)
  if (!job) return { refusal: waitFor(request.jobId) }
  if (!seesJob(draft.known.actor, job)) return { refusal: reject('forbidden') }
  // Gone so long that phones were told to forget it: nothing brings it back (P10).
  return request.isPurged ? { refusal: reject('no_parent', 'entityId') } : { request }
}

/** A request that was taken back stands again, as somebody wrote into it meanwhile (M8). */
function keepEdit(op: LineOp, request: RequestStand, draft: Draft): void {
  const write = writeOf(op, op.fields, draft)
  const edit = { ...stamped(write, [], draft.known.at), state: 'replaced' as const }
  draft.keepWrites({ entity: 'partRequest', entityId: request.id, field: 'lines' }, [edit])
  if (!draft.request(request.id)?.isDropped) return
  draft.dropRequest(request, { isDropped: false, revived: true })
  loseDrop({ entity: 'partRequest', entityId: request.id }, draft)
}

/** partLine.add: one more line; lines are a set, so nobody's takes away another's (M6). */
export function planLineAdd(op: OpOf<'partLine.add'>, draft: Draft): Outcome {
  if (op.fields.requestId !== op.entityId) return reject('invalid', 'fields.requestId')
  const found = requestOf(op, draft)
  if ('refusal' in found) return found.refusal
  const { line } = op.fields
  if (draft.hasLine(line.id)) return reject('id_reuse', 'fields.line.id')
  if (line.condemnedBy !== null) {
    const jobId = draft.jobOfEntry(line.condemnedBy)
    if (jobId === undefined) return waitFor(line.condemnedBy)
    if (draft.leadOf(jobId) !== draft.leadOf(found.request.jobId)) {
      return reject('no_parent', 'fields.line.condemnedBy')
    }
  }
  draft.addLine(found.request, line)
  keepEdit(op, found.request, draft)
  return ACCEPTED
}

/** partLine.cancel and partLine.quantity: what is ordered is a question to the parts desk (M7). */
export function planLineChange(
  op: OpOf<'partLine.cancel' | 'partLine.quantity'>,
  draft: Draft,
): Outcome {
  const { requestId, lineId } = op.fields
  if (requestId !== op.entityId) return reject('invalid', 'fields.requestId')
  const found = requestOf(op, draft)
  if ('refusal' in found) return found.refusal
  const line = found.request.lines.get(lineId)
  if (!line) return waitFor(lineId)
  const next = op.kind === 'partLine.cancel' ? cancelLine(line) : countLine(line, op.fields.by)
  if (next === undefined) return reject('stale_status', 'fields.lineId', line.state)
  draft.changeLine(found.request, lineId, next)
  if (op.kind === 'partLine.quantity') keepEdit(op, found.request, draft)
  return ACCEPTED
}

/**
 * partRequest.drop: a request made by mistake, on which nobody has worked. If somebody wrote into it
 * without the writer of this knowing, it stays, marked, and the taking back is kept (M8).
 */
export function planRequestDrop(op: OpOf<'partRequest.drop'>, draft: Draft): Outcome {
  const found = requestOf(op, draft)
  if ('refusal' in found) return found.refusal
  const { request } = found
  if (request.isDropped) return ACCEPTED
  const moved = [...request.lines.values()].find(
    ({ state }) => state !== 'asked' && state !== 'cancelled',
  )
  if (moved) return reject('stale_status', null, moved.state)
  const write = writeOf(op, 'takenBack', draft)
  const edits = draft.writesOf(request.id, 'lines')
  const isBeaten = edits.some((edit) => !hadSeen(write, edit))
  const drop = stamped(write, [], draft.known.at)
  const at = { entity: 'partRequest', entityId: request.id, field: 'row' } as const
  draft.keepWrites(at, [
    isBeaten ? { ...drop, state: 'lost', lostAfter: draft.known.at.seq } : drop,
  ])
  draft.dropRequest(request, { isDropped: !isBeaten, revived: isBeaten })
  return isBeaten ? { kind: 'merged', loser: { field: 'row', value: 'takenBack' } } : ACCEPTED
}
