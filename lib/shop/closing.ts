import type { CauseGrade, Closing } from '@/lib/model/closing'
import type { Job, JobState } from '@/lib/model/job'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import { mayMove } from './job-states'
import { may } from './permissions'
import { seesJob } from './scope'

/** Closing and reopening at the desk (rules R13, R25), decided without a clock. */
export type ClosingProblem =
  | { kind: 'forbidden' | 'causeMissing' | 'causeTooMuch' }
  | { kind: 'jobMovedMeanwhile'; now: JobState }

type Standing = Pick<Job, 'state' | 'openedBy' | 'assignedTo'>
/** `from`: the state the screen showed. */
type Asked = { actor: Pick<Actor, 'personId' | 'roles'>; job: Standing; from: JobState }

/** The grade in the words of rule R25. */
export const GRADE_WORDS: Readonly<Record<CauseGrade, string>> = {
  proved: 'Proved',
  likely: 'Likely',
  unknown: 'Unknown',
  noFaultFound: 'No fault found',
}

/** True for the grades that name a cause. */
export const namesCause = (grade: CauseGrade): boolean => grade === 'proved' || grade === 'likely'

/** What a closing or reopening writes: the state, a line of the job log, and figures for the trail. */
export type ClosingMove = { to: JobState; words: string; detail: Record<string, string | null> }

/**
 * The job closed, or why not: not theirs to close, moved meanwhile, or cause and grade do not go together.
 * `faultName`: the code book's name of the fault that is the cause; null for own words or none.
 */
export function closingMove(
  asked: Asked,
  closing: Closing,
  faultName: string | null,
): Result<ClosingMove, ClosingProblem> {
  const { cause, grade } = closing
  const stands = mayStep(asked, 'closed')
  if (!stands.ok) return stands
  if (namesCause(grade) && cause === null) return fail({ kind: 'causeMissing' })
  if (!namesCause(grade) && cause !== null) return fail({ kind: 'causeTooMuch' })
  const named = cause?.kind === 'words' ? cause.words : faultName
  const fault = cause?.kind === 'fault' ? cause.fault : null
  return ok({ to: stands.value, words: closedWords(closing, named), detail: { fault, grade } })
}

/** The job open again, with the closing kept in log and trail; whoever may close may reopen. */
export function reopeningMove(asked: Asked, reason: string): Result<ClosingMove, ClosingProblem> {
  const stands = mayStep(asked, 'open')
  if (!stands.ok) return stands
  const now = asked.job.state
  if (now !== 'closed') return fail({ kind: 'jobMovedMeanwhile', now })
  return ok({ to: stands.value, words: `Job reopened. ${reason}`, detail: {} })
}

function mayStep<S extends JobState>(
  { actor, job, from }: Asked,
  to: S,
): Result<S, ClosingProblem> {
  if (!may(actor.roles, 'job.close') || !seesJob(actor, job)) return fail({ kind: 'forbidden' })
  const moved = job.state !== from || !mayMove('job', job.state, to)
  return moved ? fail({ kind: 'jobMovedMeanwhile', now: job.state }) : ok(to)
}

function closedWords({ grade, reason }: Closing, named: string | null): string {
  const graded = GRADE_WORDS[grade].toLowerCase()
  const cause = grade === 'noFaultFound' ? 'No fault found' : `Cause ${graded}`
  return `Job closed. ${cause}${named === null ? '' : `: ${named}`}. ${reason}`
}
