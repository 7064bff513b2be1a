import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import type { MachineRow } from '@/lib/model/machine'
import type { PartRequestRow } from '@/lib/model/part-request'
import { assertNever } from '@/lib/model/result'
import { mayMove } from '@/lib/shop/job-states'
import type { Op } from '@/lib/sync/protocol/op'
import { applyToMachine, applyToRequest, jobWith, withoutLooked } from './apply-value'
import type { StoredEntity } from './entities'

/**
 * What an op does to the rows, as the shop will do it (P9): so a screen shows at once what will come
 * back. Where the shop would refuse, the rows stay as they are; its answer says so later.
 */
export type Who = { personId: Id }
export type Touched = { entity: StoredEntity; id: Id; jobId: Id | null }

/** The rows an op may change. */
export function rowsTouched(op: Op): Touched[] {
  switch (op.kind) {
    case 'machine.add':
      return [{ entity: 'machine', id: op.entityId, jobId: null }]
    case 'job.open':
    case 'job.move':
    case 'job.people':
    case 'job.machine':
      return [jobAt(op.entityId)]
    case 'log.add':
      // The way out is worked out from the log where it is shown; that a closed job comes back as open
      // (R13) the shop alone decides.
      return [{ entity: 'logEntry', id: op.entityId, jobId: op.fields.jobId }]
    case 'partRequest.ask':
      return [{ entity: 'partRequest', id: op.entityId, jobId: op.fields.jobId }]
    case 'job.set':
    case 'job.settle':
      return [jobAt(op.entityId)]
    case 'machine.set':
    case 'machine.settle':
    case 'machine.drop':
      return [{ entity: 'machine', id: op.entityId, jobId: null }]
    case 'partLine.add':
    case 'partLine.cancel':
    case 'partLine.quantity':
    case 'partRequest.drop':
      return [{ entity: 'partRequest', id: op.entityId, jobId: op.jobId }]
    case 'book.heard':
      return [{ entity: 'bookWithdrawal', id: op.entityId, jobId: null }]
    case 'advice.keep':
      return []
    default:
      return assertNever(op)
  }
}

const jobAt = (id: Id): Touched => ({ entity: 'job', id, jobId: id })

/** The row after the op: `row` itself when the op does not change it, undefined when there is none. */
export function applyOpLocally(row: unknown, at: Touched, op: Op, who: Who): unknown {
  if (at.entity === 'job') return applyToJob(row as Job | undefined, op, who)
  if (op.entityId !== at.id) return row
  if (at.entity === 'machine') return applyToMachine(row as MachineRow | undefined, op)
  if (op.kind === 'book.heard') {
    return heardBy(row as BookWithdrawal | undefined, { personId: who.personId, at: op.fields.at })
  }
  if (at.entity === 'partRequest') {
    return applyToRequest(row as PartRequestRow | undefined, op, who.personId)
  }
  // Evidence is only ever added: what is there stays.
  return row === undefined && op.kind === 'log.add' ? op.fields : row
}

/** The withdrawal with who acknowledged it; the first time counts. */
function heardBy(
  row: BookWithdrawal | undefined,
  one: BookWithdrawal['heard'][number],
): BookWithdrawal | undefined {
  if (row === undefined || row.heard.some(({ personId }) => personId === one.personId)) return row
  return { ...row, heard: [...row.heard, one] }
}

function applyToJob(job: Job | undefined, op: Op, who: Who): Job | undefined {
  if (op.kind === 'job.open') return job ?? openedJob(op.fields, who)
  if (job === undefined) return undefined
  switch (op.kind) {
    case 'job.move': {
      const { from, to } = op.fields
      return job.state === from && mayMove('job', from, to) ? { ...job, state: to } : job
    }
    case 'job.people': {
      const { from, to } = op.fields
      const moves = job.peopleState === from && mayMove('people', from, to)
      return moves ? { ...job, peopleState: to } : job
    }
    case 'job.machine': {
      const { from, to } = op.fields
      const moves = job.machineState === from && mayMove('machine', from, to)
      return moves ? { ...job, machineState: to } : job
    }
    case 'job.set':
      return jobWith(job, op.fields)
    case 'job.settle':
      return withoutLooked(job, op.fields.history)
    default:
      return job
  }
}

const openedJob = (fields: Extract<Op, { kind: 'job.open' }>['fields'], who: Who): Job => ({
  ...fields,
  number: null,
  state: 'open',
  peopleState: 'withMachine',
  machineState: 'stranded',
  wayOut: null,
  openedBy: who.personId,
  assignedTo: [],
})
