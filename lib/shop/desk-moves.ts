import type { Id } from '@/lib/model/id'
import type { Job, JobState } from '@/lib/model/job'
import type { Money } from '@/lib/model/money'
import type { PartLine, PartLineState } from '@/lib/model/part-request'
import type { Person } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import { mayMove } from './job-states'

/** What the desk may do with a job's hands and a part line (rules R13, R14), decided without a clock. */
export type AssignProblem = { kind: 'jobClosed' } | { kind: 'cannotTakeJobs' }
export type LineProblem =
  | { kind: 'movedMeanwhile'; now: PartLineState }
  | { kind: 'illegalMove'; now: PartLineState }

/** True for people who work in the field and so can be given a job. */
export const canTakeJobs = ({ roles }: Pick<Person, 'roles'>): boolean =>
  roles.includes('mechanic') || roles.includes('guide')

/**
 * The job's state once `person` has it (`assigned`) or gives it back. The first one assigned makes a
 * called or open job assigned; the last one taken off makes an assigned job open; work under way stays.
 */
export function stateAfterAssigning(
  job: Pick<Job, 'state' | 'assignedTo'>,
  person: Pick<Person, 'id' | 'roles'>,
  assigned: boolean,
): Result<JobState, AssignProblem> {
  if (job.state === 'closed') return fail({ kind: 'jobClosed' })
  if (assigned && !canTakeJobs(person)) return fail({ kind: 'cannotTakeJobs' })
  const left = job.assignedTo.filter((id: Id) => id !== person.id)
  if (assigned && (job.state === 'called' || job.state === 'open')) return ok('assigned')
  if (!assigned && left.length === 0 && job.state === 'assigned') return ok('open')
  return ok(job.state)
}

/** What the parts desk asks of a line; `from` is the state its screen showed. */
export type LineMove =
  | { from: PartLineState; to: 'identified'; number: string }
  | { from: PartLineState; to: 'quoted'; number: string | null; price: Money }
  | { from: PartLineState; to: 'cancelled' }

export type MovedLine = Pick<PartLine, 'number' | 'price'> & { state: PartLineState }

/** The line after the move, or why it is refused: it moved meanwhile, or the move is not one. */
export function moveLine(
  line: Pick<PartLine, 'number' | 'price'> & { state: PartLineState },
  move: LineMove,
): Result<MovedLine, LineProblem> {
  if (line.state !== move.from) return fail({ kind: 'movedMeanwhile', now: line.state })
  if (!mayMove('partLine', line.state, move.to))
    return fail({ kind: 'illegalMove', now: line.state })
  switch (move.to) {
    case 'identified':
      return ok({ state: 'identified', number: move.number, price: line.price })
    case 'quoted':
      return ok({ state: 'quoted', number: move.number ?? line.number, price: move.price })
    case 'cancelled':
      return ok({ state: 'cancelled', number: line.number, price: line.price })
  }
}
