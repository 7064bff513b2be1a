import type { Job, JobMachineState, PeopleState } from '@/lib/model/job'
import type { Role } from '@/lib/model/role'
import { actionToMoveJob, mayMove, wayBetween } from '@/lib/shop/job-states'
import { mayInField } from '@/lib/shop/may-record'
import { jobStateAfter } from '@/lib/shop/way-out-states'
import type { OpInput } from '@/lib/sync/protocol/op'

type Stand = Pick<Job, 'machineState' | 'peopleState' | 'state'>

/** The moves of machine, people and job that follow from a way out, those that change something. */
export function movesOf(
  job: Pick<Job, 'id' | 'machineState' | 'peopleState' | 'state'>,
  to: { machine: JobMachineState; people: PeopleState },
): OpInput[] {
  const ops: OpInput[] = []
  const jobId = job.id
  if (to.machine !== job.machineState)
    ops.push({ kind: 'job.machine', jobId, fields: { from: job.machineState, to: to.machine } })
  if (to.people !== job.peopleState)
    ops.push({ kind: 'job.people', jobId, fields: { from: job.peopleState, to: to.people } })
  const state = jobStateAfter(job.state, to.machine)
  if (state !== job.state && mayMove('job', job.state, state))
    ops.push({ kind: 'job.move', jobId, fields: { from: job.state, to: state, reason: null } })
  return ops
}

/**
 * The moves that take a way out back: machine, people and job from where it put them (`now`, only what still
 * stands there) to where they were `before`, by lawful steps. A job that may not go back to what it was, as
 * from under way to assigned for who may not assign, stays under way: work has begun on it.
 */
export function movesBack(
  of: { jobId: Job['id']; before: Stand; now: Stand; roles: readonly Role[] } & {
    put: { machine: JobMachineState; people: PeopleState }
  },
): OpInput[] {
  const { jobId, before, now, put } = of
  const ops: OpInput[] = []
  if (now.machineState === put.machine) {
    let from = now.machineState
    for (const to of wayBetween('machine', from, before.machineState) ?? []) {
      ops.push({ kind: 'job.machine', jobId, fields: { from, to } })
      from = to
    }
  }
  if (now.peopleState === put.people) {
    let from = now.peopleState
    for (const to of wayBetween('people', from, before.peopleState) ?? []) {
      ops.push({ kind: 'job.people', jobId, fields: { from, to } })
      from = to
    }
  }
  const to = jobBack(of)
  if (to !== null)
    ops.push({ kind: 'job.move', jobId, fields: { from: now.state, to, reason: null } })
  return ops
}

function jobBack({ before, now, put, roles }: Parameters<typeof movesBack>[0]) {
  const went = jobStateAfter(before.state, put.machine)
  if (now.state !== went || now.state === before.state) return null
  const goes = (to: Stand['state']) =>
    mayMove('job', now.state, to) && mayInField(roles, actionToMoveJob(to))
  if (goes(before.state)) return before.state
  return now.state === 'waitingRetrieval' && goes('underWay') ? ('underWay' as const) : null
}
