'use server'

import type {
  AssignAction,
  CloseAction,
  MergeAction,
  ReopenAction,
  SettleAction,
  UnmergeAction,
} from '@/components/desk/desk-actions'
import { assignForm } from '@/components/desk/hands/assign.schema'
import { closeForm, reopenForm } from '@/components/desk/job/closing.schema'
import { mergeForm, unmergeForm } from '@/components/desk/merge/merge.schema'
import { settleForm } from '@/components/desk/values/settle.schema'
import { moveJobAtDesk } from '@/db/queries/desk-closing'
import { changeAssignment } from '@/db/queries/desk-writes'
import { mergeRows, unmergeRow } from '@/db/queries/merges'
import { actorAction } from '@/lib/auth/actor-action'
import { ENGINE_VERSION } from '@/lib/diag/version'
import { fail } from '@/lib/model/result'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { closingMove, reopeningMove } from '@/lib/shop/closing'
import { stateAfterAssigning } from '@/lib/shop/desk-moves'
import { mayMerge } from '@/lib/shop/merge-rules'
import { may } from '@/lib/shop/permissions'
import { leavesFieldAt } from '@/lib/shop/scope'
import { settleAtDesk } from '@/lib/sync/server/settle-at-desk'

type Answer = ReturnType<AssignAction>

/** Puts a job into a person's hands, or takes it out (rule R13: assignments are a set). */
export const assignPerson = actorAction(assignForm, (actor, input): Answer => {
  if (!may(actor.roles, 'job.assign')) return Promise.resolve(fail({ kind: 'forbidden' }))
  const stamp = { auditId: uuidv7.next(), at: new Date(systemClock.now()).toISOString() }
  return changeAssignment(actor, { ...input, stamp }, (job, person) =>
    stateAfterAssigning(job, person, input.assigned),
  )
})

const manyStamps = () => ({ newId: uuidv7.next, at: new Date(systemClock.now()).toISOString() })

/** Merges a job into another that goes on (rule R13). */
export const mergeJob = actorAction(
  mergeForm,
  (actor, { jobId, intoId }): ReturnType<MergeAction> => {
    if (!may(actor.roles, 'job.merge')) return Promise.resolve(fail({ kind: 'forbidden' }))
    const input = { entity: 'job', id: jobId, intoId, stamp: manyStamps() } as const
    return mergeRows(actor, input, mayMerge)
  },
)

/** Lets a merged job stand for itself again (rule R13). */
export const unmergeJob = actorAction(
  unmergeForm,
  (actor, { jobId }): ReturnType<UnmergeAction> => {
    if (!may(actor.roles, 'job.merge')) return Promise.resolve(fail({ kind: 'forbidden' }))
    const input = { entity: 'job', id: jobId, stamp: manyStamps() } as const
    return unmergeRow(actor, input, { kind: 'notMerged' as const })
  },
)

const stampNow = () => {
  const at = new Date(systemClock.now()).toISOString()
  const stamp = {
    auditId: uuidv7.next(),
    entryId: uuidv7.next(),
    at,
    engineVersion: ENGINE_VERSION,
  }
  return { stamp, leaveFieldAt: leavesFieldAt(at) }
}

/** Closes a job with its cause and how sure that is (rules R13, R25). */
export const closeJobAtDesk = actorAction(closeForm, (actor, input): ReturnType<CloseAction> => {
  const { jobId, from, closing } = input
  const fault = closing.cause?.kind === 'fault' ? closing.cause.fault : null
  return moveJobAtDesk(actor, { jobId, fault, ...stampNow() }, (job, faultName) =>
    closingMove({ actor, job, from }, closing, faultName),
  )
})

/** Opens a closed job again (rule R13); the closing stays in the log and the trail. */
export const reopenJobAtDesk = actorAction(reopenForm, (actor, input): ReturnType<ReopenAction> => {
  const { jobId, from, reason } = input
  return moveJobAtDesk(actor, { jobId, fault: null, ...stampNow() }, (job) =>
    reopeningMove({ actor, job, from }, reason),
  )
})

/** Uses a value that did not stand, or leaves things as they are (docs/spec/sync.md, M4). */
export const settleValue = actorAction(settleForm, (actor, input): ReturnType<SettleAction> => {
  if (!may(actor.roles, 'job.work')) return Promise.resolve(fail({ kind: 'forbidden' }))
  return settleAtDesk(actor, { ...input, stamp: manyStamps() })
})
