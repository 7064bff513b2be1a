import type { Id } from '@/lib/model/id'
import type { Job, JobState } from '@/lib/model/job'
import type { PartLine, PartLineState } from '@/lib/model/part-request'
import type { Actor, Person } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import type { Shop } from '@/lib/model/shop'
import type { Instant } from '@/lib/model/time'
import { asShop } from '../client'
import { appendAudit } from './audit'
import { lockShop, takeChanges } from './changes'
import { assignJob, findJob, setJobStand, unassignJob } from './jobs'
import { findPartRequest, movePartLine, setPartLine } from './part-requests'
import { peopleById } from './people'
import { getShop } from './shop'

/**
 * What the desk writes: the row, its change number and its audit entry in one transaction. The shop's
 * counter is locked before the row is read, so that `decide` judges what will still be true at commit.
 */
export type Stamp = { auditId: Id; at: Instant }
export type NotThere = { kind: 'notFound' }

/** Puts a job into a person's hands or takes it out, when `decide` answers the job's state after it. */
export function changeAssignment<P>(
  actor: Actor,
  input: { jobId: Id; personId: Id; assigned: boolean; stamp: Stamp },
  decide: (job: Job, person: Person) => Result<JobState, P>,
): Promise<Result<null, P | NotThere>> {
  const { jobId, personId, assigned, stamp } = input
  return asShop(actor.shopId, async (tx) => {
    await lockShop(tx)
    const job = await findJob(tx, jobId)
    const [person] = await peopleById(tx, [personId])
    if (!job || job.mergedInto !== undefined || !person) return fail({ kind: 'notFound' as const })
    const decided = decide(job, person)
    if (!decided.ok) return decided
    if (job.assignedTo.includes(personId) === assigned) return ok(null)
    await (assigned ? assignJob : unassignJob)(tx, { jobId, personId })
    if (decided.value !== job.state) {
      const { peopleState, machineState, wayOut } = job
      const stand = { state: decided.value, peopleState, machineState, wayOut }
      await setJobStand(tx, { id: jobId, stand, by: { deviceId: null, at: stamp.at } })
    }
    await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole: true }])
    const detail = { personId, from: job.state, to: decided.value }
    const action = assigned ? 'job.assign' : 'job.unassign'
    await appendAudit(tx, [
      auditOf(actor, { stamp, jobId, action, entity: 'job', id: jobId, detail }),
    ])
    return ok(null)
  })
}

type Line = PartLine & { state: PartLineState }
type Moved = Pick<Line, 'state' | 'number' | 'price'>

/** Moves a part line on, when `decide` answers how it stands after it. */
export function changePartLine<P>(
  actor: Actor,
  input: { requestId: Id; lineId: Id; stamp: Stamp },
  decide: (line: Line, shop: Shop) => Result<Moved, P>,
): Promise<Result<null, P | NotThere>> {
  const { requestId, lineId, stamp } = input
  return asShop(actor.shopId, async (tx) => {
    await lockShop(tx)
    const request = await findPartRequest(tx, requestId)
    const line = request?.lines.find(({ id }) => id === lineId)
    if (!request || !line) return fail({ kind: 'notFound' as const })
    const decided = decide(line, await getShop(tx))
    if (!decided.ok) return decided
    const { state: to, number, price } = decided.value
    await movePartLine(tx, { lineId, from: line.state, to })
    await setPartLine(tx, { lineId, number, price })
    const { jobId } = request
    await takeChanges(tx, [{ entity: 'partRequest', id: requestId, jobId }])
    const detail = { lineId, from: line.state, to, number, price }
    const action = `partLine.${to}`
    await appendAudit(tx, [
      auditOf(actor, { stamp, jobId, action, entity: 'partRequest', id: requestId, detail }),
    ])
    return ok(null)
  })
}

type Told = {
  stamp: Stamp
  jobId: Id
  action: string
  entity: string
  id: Id
  detail: Record<string, unknown>
}

const auditOf = (actor: Actor, { stamp, jobId, action, entity, id, detail }: Told) => ({
  id: stamp.auditId,
  jobId,
  at: stamp.at,
  actorId: actor.personId,
  deviceId: null,
  action,
  entity,
  entityId: id,
  detail,
})
