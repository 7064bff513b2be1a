import type { Id } from '@/lib/model/id'
import type { JobState } from '@/lib/model/job'
import type { Actor } from '@/lib/model/person'
import { may } from './permissions'

/** Days after which a closed job leaves the phones (R22). */
export const FIELD_DAYS = 60

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
