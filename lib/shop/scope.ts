import type { Id } from '@/lib/model/id'
import type { JobState } from '@/lib/model/job'
import type { Actor } from '@/lib/model/person'
import type { Instant } from '@/lib/model/time'
import { may } from './permissions'

/** Days after which a closed job leaves the phones (R22). */
export const FIELD_DAYS = 60

const DAY_MS = 24 * 3_600_000

/** When to look whether a job closed at `at` leaves the phones: a day after it is due. */
export const leavesFieldAt = (at: Instant): Instant =>
  new Date(Date.parse(at) + (FIELD_DAYS + 1) * DAY_MS).toISOString()

/** What decides whose job it is. */
export type JobHands = { state: JobState; openedBy: Id; assignedTo: readonly Id[] }

/**
 * True when the job belongs on this person's phone or desk (R22: own and open jobs). Own: opened by or
 * assigned to them. Open: in nobody's hands and not closed. The desk roles see every job of the shop.
 */
export function seesJob(actor: Pick<Actor, 'personId' | 'roles'>, job: JobHands): boolean {
  if (may(actor.roles, 'job.seeAll')) return true
  if (job.openedBy === actor.personId || job.assignedTo.includes(actor.personId)) return true
  return job.assignedTo.length === 0 && job.state !== 'closed' && may(actor.roles, 'field.see')
}
