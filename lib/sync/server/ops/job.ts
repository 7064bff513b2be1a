import { leavingLacks } from '@/lib/diag/way-out'
import { mayMove, type StateKind } from '@/lib/shop/job-states'
import { mayRecord } from '@/lib/shop/may-record'
import { seesJob } from '@/lib/shop/scope'
import type { Op } from '@/lib/sync/protocol/op'
import { ACCEPTED, type Draft, reject, waitFor } from '../draft'
import type { JobStand, JobStep, Outcome } from '../known'
import { reviveMachine } from './setting'

type OpOf<K extends Op['kind']> = Extract<Op, { kind: K }>

/** job.open: the opening as written in the field. The number is the server's. */
export function planJobOpen(op: OpOf<'job.open'>, draft: Draft): Outcome {
  const opening = op.fields
  if (op.entityId !== opening.id) return reject('invalid', 'entityId')
  if (op.jobId !== null && op.jobId !== opening.id) return reject('invalid', 'jobId')
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  if (draft.job(opening.id)) return reject('id_reuse', 'fields.id')
  const machine = draft.machine(opening.machineId)
  if (!machine) return waitFor(opening.machineId)
  // Work in the field is always taken: a machine that was taken back stands again for it (M8).
  if (machine.isDropped) reviveMachine(opening.machineId, draft)
  draft.openJob(opening, {
    state: 'open',
    peopleState: 'withMachine',
    machineState: 'stranded',
    wayOut: null,
    place: opening.place,
    openedBy: draft.known.actor.personId,
    assignedTo: [],
  })
  return ACCEPTED
}

/** The job an op moves: known, named alike twice, and in this person's hands; of merged ones that which goes on. */
function jobToMove(op: Move, draft: Draft) {
  if (op.jobId !== null && op.jobId !== op.entityId) return { refusal: reject('invalid', 'jobId') }
  const job = draft.lead(op.entityId)
  if (!job) return { refusal: waitFor(op.entityId) }
  return seesJob(draft.known.actor, job) ? { job } : { refusal: reject('forbidden') }
}

/** What a machine left behind still lacks, as a refusal: position, photo, and the way out that tells the rest (R2). */
function judgeLeaving(op: Move, job: JobStand, draft: Draft): Outcome {
  if (op.kind !== 'job.machine' || op.fields.to !== 'leftBehind') return ACCEPTED
  const entries = draft.decidingOf(draft.leadOf(op.entityId))
  const lacks = leavingLacks({ place: job.place, entries })
  return lacks === null ? ACCEPTED : reject('invalid', 'fields.to', `left behind without ${lacks}`)
}

/** A move is judged by the state the server holds, never by a clock (sync.md 3.4). */
function judgeMove(kind: StateKind, now: string, from: string, to: string): Outcome {
  if (now !== from) return reject('stale_status', 'fields.from', now)
  const legal = mayMove(kind, from as never, to as never)
  return legal ? ACCEPTED : reject('invalid', 'fields.to', `${from} cannot become ${to}`)
}

type Move = OpOf<'job.move' | 'job.people' | 'job.machine'>
type Ways = {
  [K in Move['kind']]: {
    what: JobStep['what']
    field: 'state' | 'peopleState' | 'machineState'
  }
}

const WAYS: Ways = {
  // Along the job's states (R13).
  'job.move': { what: 'job', field: 'state' },
  // Where the people are (R2).
  'job.people': { what: 'people', field: 'peopleState' },
  // Where the machine is and how (R2).
  'job.machine': { what: 'machine', field: 'machineState' },
}

/** job.move, job.people, job.machine: one step along one of the job's three states. */
export function planJobStep(op: Move, draft: Draft): Outcome {
  const { job, refusal } = jobToMove(op, draft)
  if (!job) return refusal
  const { what, field } = WAYS[op.kind]
  const { from, to } = op.fields
  if (!mayRecord(op, draft.writer)) return reject('forbidden')
  const verdict = judgeMove(what, job[field], from, to)
  if (verdict.kind !== 'accepted') return verdict
  const leaving = judgeLeaving(op, job, draft)
  if (leaving.kind !== 'accepted') return leaving
  const lead = draft.leadOf(op.entityId)
  draft.stepJob({ jobId: lead, what, from, to }, { ...job, [field]: to })
  // What was written for the merged job is that job's as well, should it stand for itself again (M10).
  const own = lead === op.entityId ? undefined : draft.job(op.entityId)
  if (own?.[field] === from) {
    draft.stepJob({ jobId: op.entityId, what, from, to }, { ...own, [field]: to })
  }
  return ACCEPTED
}
