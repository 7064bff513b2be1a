import type { Job, JobMachineState, JobState, PeopleState } from '@/lib/model/job'
import type { LogBody } from '@/lib/model/log-entry'
import type { Role } from '@/lib/model/role'
import { actionToMoveJob, mayMove, movesFrom } from '@/lib/shop/job-states'
import { mayInField } from '@/lib/shop/may-record'
import { jobStateAfter } from '@/lib/shop/way-out-states'
import type { OpInput } from '@/lib/sync/protocol/op'
import { JOB_STATE_WORDS, MACHINE_WORDS, PEOPLE_WORDS } from '../words'

/** Which of a job's three states is changed. */
export type Which = 'people' | 'machine' | 'job'

/** The states that may follow. Closing asks for cause and grade and is the desk's work. */
export function optionsOf(
  which: Which,
  job: Job,
  roles: readonly Role[],
): { value: string; label: string }[] {
  switch (which) {
    case 'people':
      return movesFrom('people', job.peopleState).map((s) => ({ value: s, label: PEOPLE_WORDS[s] }))
    case 'machine':
      return movesFrom('machine', job.machineState).map((s) => ({
        value: s,
        label: MACHINE_WORDS[s],
      }))
    case 'job':
      return movesFrom('job', job.state)
        .filter((s) => s !== 'closed' && mayInField(roles, actionToMoveJob(s)))
        .map((s) => ({ value: s, label: JOB_STATE_WORDS[s] }))
  }
}

/** The move, and the end of the wait for a machine that is no longer left behind (rule R2). */
export function movesTo(which: Which, job: Job, to: string, reason: string | null): OpInput[] {
  const jobId = job.id
  switch (which) {
    case 'people':
      return [
        { kind: 'job.people', jobId, fields: { from: job.peopleState, to: to as PeopleState } },
      ]
    case 'machine':
      return [
        {
          kind: 'job.machine',
          jobId,
          fields: { from: job.machineState, to: to as JobMachineState },
        },
        ...fetched(job, to as JobMachineState),
      ]
    case 'job':
      return [{ kind: 'job.move', jobId, fields: { from: job.state, to: to as JobState, reason } }]
  }
}

function fetched({ id, state }: Job, machine: JobMachineState): OpInput[] {
  if (state !== 'waitingRetrieval') return []
  const after = jobStateAfter(state, machine)
  return mayMove('job', state, after)
    ? [{ kind: 'job.move', jobId: id, fields: { from: state, to: after, reason: null } }]
    : []
}

/** What the job log says of the move; the job's own moves carry their reason themselves. */
export function lineOf(which: Which, to: string, words: string | null): LogBody | null {
  switch (which) {
    case 'people':
      return { kind: 'people', to: to as PeopleState, words }
    case 'machine': {
      const state = MACHINE_WORDS[to as JobMachineState].toLowerCase()
      return { kind: 'note', words: `Machine: ${state}.${words === null ? '' : ` ${words}`}` }
    }
    case 'job':
      return null
  }
}
