import type { Id } from '@/lib/model/id'
import { actionToMoveJob, mayMove, type StateKind } from '@/lib/shop/job-states'
import { may } from '@/lib/shop/permissions'
import { seesJob } from '@/lib/shop/scope'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, type JobStand, type Outcome, reject, waitFor } from '../draft'

type OpOf<K extends Op['kind']> = Extract<Op, { kind: K }>

/** job.open: the opening as written in the field. The number is the server's. */
export function planJobOpen(op: OpOf<'job.open'>, draft: Draft): Outcome {
  const opening = op.fields
  if (op.entityId !== opening.id) return reject('invalid', 'entityId')
  if (op.jobId !== null && op.jobId !== opening.id) return reject('invalid', 'jobId')
  if (!may(draft.known.actor.roles, 'job.open')) return reject('forbidden')
  if (draft.job(opening.id)) return reject('id_reuse', 'fields.id')
  if (!draft.hasMachine(opening.machineId)) return waitFor(opening.machineId)
  draft.openJob(opening, {
    state: 'open',
    peopleState: 'withMachine',
    machineState: 'stranded',
    wayOut: null,
    openedBy: draft.known.actor.personId,
    assignedTo: [],
  })
  return ACCEPTED
}

/** The job an op moves: known, named alike twice, and in this person's hands. */
function jobToMove(op: OpOf<'job.move' | 'job.people' | 'job.machine'>, draft: Draft) {
  if (op.jobId !== null && op.jobId !== op.entityId) return { refusal: reject('invalid', 'jobId') }
  const job = draft.job(op.entityId)
  if (!job) return { refusal: waitFor(op.entityId) }
  return seesJob(draft.known.actor, job) ? { job } : { refusal: reject('forbidden') }
}

/** A move is judged by the state the server holds, never by a clock (sync.md 3.4). */
function judgeMove(kind: StateKind, now: string, from: string, to: string): Outcome {
  if (now !== from) return reject('stale_status', 'fields.from', now)
  const legal = mayMove(kind, from as never, to as never)
  return legal ? ACCEPTED : reject('invalid', 'fields.to', `${from} cannot become ${to}`)
}

function move(draft: Draft, id: Id, verdict: Outcome, next: JobStand): Outcome {
  if (verdict.kind === 'accepted') draft.changeJob(id, next)
  return verdict
}

/** job.move: along the job's states (R13). */
export function planJobMove(op: OpOf<'job.move'>, draft: Draft): Outcome {
  const { job, refusal } = jobToMove(op, draft)
  if (!job) return refusal
  const { from, to } = op.fields
  if (!may(draft.known.actor.roles, actionToMoveJob(to))) return reject('forbidden')
  return move(draft, op.entityId, judgeMove('job', job.state, from, to), { ...job, state: to })
}

/** job.people: where the people are (R2). */
export function planJobPeople(op: OpOf<'job.people'>, draft: Draft): Outcome {
  const { job, refusal } = jobToMove(op, draft)
  if (!job) return refusal
  if (!may(draft.known.actor.roles, 'job.work')) return reject('forbidden')
  const { from, to } = op.fields
  const verdict = judgeMove('people', job.peopleState, from, to)
  return move(draft, op.entityId, verdict, { ...job, peopleState: to })
}

/** job.machine: where the machine is and how (R2). */
export function planJobMachine(op: OpOf<'job.machine'>, draft: Draft): Outcome {
  const { job, refusal } = jobToMove(op, draft)
  if (!job) return refusal
  if (!may(draft.known.actor.roles, 'job.work')) return reject('forbidden')
  const { from, to } = op.fields
  const verdict = judgeMove('machine', job.machineState, from, to)
  return move(draft, op.entityId, verdict, { ...job, machineState: to })
}
