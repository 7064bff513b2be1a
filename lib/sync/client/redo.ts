import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import { fail, ok, type Result } from '@/lib/model/result'
import { mayMove } from '@/lib/shop/job-states'
import type { Op, OpInput } from '@/lib/sync/protocol/op'
import type { Core } from './core'
import { type OutboxRecord, rowKey } from './phone-db'
import { stateWords } from './unsent'

type Again = { record: OutboxRecord; input: OpInput }
type Why = { words: string }

/**
 * A step that the shop refused because things had moved on (`stale_status`), made anew from where they
 * stand now. Where that is no step any more, one sentence says why.
 */
export async function redoOf(core: Core, opId: Id): Promise<Result<Again, Why>> {
  const record = await core.db.outbox.where('opId').equals(opId).first()
  if (record?.state !== 'stuck' || record.reason !== 'stale_status') {
    return fail({ words: 'It is not stuck any more. Look at the list again.' })
  }
  const op = await core.cache.op(core.keys.outbox, record)
  if (op.kind === 'partLine.cancel' || op.kind === 'partLine.quantity') {
    return fail({ words: 'The parts desk has ordered it already. Call them, or write a note.' })
  }
  const held = await core.db.row.get(rowKey('job', op.jobId ?? ''))
  if (held === undefined || op.jobId === null) {
    return fail({ words: 'The job is not on this phone any more.' })
  }
  const job = (await core.cache.row(core.keys, held)) as Job
  const input = stepOf(op, job)
  return input.ok ? ok({ record, input: input.value }) : input
}

function stepOf(op: Op, job: Job): Result<OpInput, Why> {
  switch (op.kind) {
    case 'job.move': {
      const { to, reason } = op.fields
      const from = job.state
      return mayMove('job', from, to)
        ? ok({ kind: 'job.move', jobId: job.id, fields: { from, to, reason } })
        : fail(noStep(from, to))
    }
    case 'job.people': {
      const { to } = op.fields
      const from = job.peopleState
      return mayMove('people', from, to)
        ? ok({ kind: 'job.people', jobId: job.id, fields: { from, to } })
        : fail(noStep(from, to))
    }
    case 'job.machine': {
      const { to } = op.fields
      const from = job.machineState
      return mayMove('machine', from, to)
        ? ok({ kind: 'job.machine', jobId: job.id, fields: { from, to } })
        : fail(noStep(from, to))
    }
    default:
      return fail({ words: 'This cannot be done again by one key. Record it anew.' })
  }
}

const noStep = (from: string, to: string): Why => ({
  words:
    from === to
      ? `It stands at “${stateWords(to)}” already. You can let this go.`
      : `It now stands at “${stateWords(from)}”, and from there it cannot go to “${stateWords(to)}”.`,
})
