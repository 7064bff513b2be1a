'use server'

import type { AssignAction } from '@/components/desk/desk-actions'
import { assignForm } from '@/components/desk/hands/assign.schema'
import { changeAssignment } from '@/db/queries/desk-writes'
import { actorAction } from '@/lib/auth/actor-action'
import { fail } from '@/lib/model/result'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { stateAfterAssigning } from '@/lib/shop/desk-moves'
import { may } from '@/lib/shop/permissions'

type Answer = ReturnType<AssignAction>

/** Puts a job into a person's hands, or takes it out (rule R13: assignments are a set). */
export const assignPerson = actorAction(assignForm, (actor, input): Answer => {
  if (!may(actor.roles, 'job.assign')) return Promise.resolve(fail({ kind: 'forbidden' }))
  const stamp = { auditId: uuidv7.next(), at: new Date(systemClock.now()).toISOString() }
  return changeAssignment(actor, { ...input, stamp }, (job, person) =>
    stateAfterAssigning(job, person, input.assigned),
  )
})
