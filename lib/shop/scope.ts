import type { Id } from '@/lib/model/id'
import type { JobState } from '@/lib/model/job'
import type { Actor } from '@/lib/model/person'
import type { Instant } from '@/lib/model/time'
import { may } from './permissions'

/** Days after which a closed job leaves the phones (R22). */
export const FIELD_DAYS = 60

/** Days for which the shop remembers what was taken back (a choice); a phone away for longer pulls anew. */
export const TOMBSTONE_DAYS = 180

/** When to forget what was taken back at `at`: a day after it is due. */
export const forgottenAt = (at: Instant): Instant =>
  new Date(Date.parse(at) + (TOMBSTONE_DAYS + 1) * DAY_MS).toISOString()

/** What decides whose job it is. `alsoOpenedBy`: who opened the jobs that were merged into it. */
export type JobHands = {
  state: JobState
  openedBy: Id
  assignedTo: readonly Id[]
  alsoOpenedBy?: readonly Id[] | undefined
}
const DAY_MS = 24 * 3_600_000

/** When to look whether a job closed at `at` leaves the phones: a day after it is due. */
export const leavesFieldAt = (at: Instant): Instant =>
  new Date(Date.parse(at) + (FIELD_DAYS + 1) * DAY_MS).toISOString()

/**
 * True when the job belongs on this person's phone or desk (R22: own and open jobs). Own: opened by or
 * assigned to them. Open: in nobody's hands and not closed. The desk roles see every job of the shop.
 * Of jobs that were merged, ask of the one that goes on.
 */
export function seesJob(actor: Pick<Actor, 'personId' | 'roles'>, job: JobHands): boolean {
  if (may(actor.roles, 'job.seeAll')) return true
  if (isOwn(actor.personId, job)) return true
  return job.assignedTo.length === 0 && job.state !== 'closed' && may(actor.roles, 'field.see')
}

/** True when the person opened the job, or one that was merged into it, or is assigned to it. */
export function isOwn(personId: Id, job: JobHands): boolean {
  const { openedBy, assignedTo, alsoOpenedBy = [] } = job
  return openedBy === personId || assignedTo.includes(personId) || alsoOpenedBy.includes(personId)
}
