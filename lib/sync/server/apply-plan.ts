import type { ShopTx } from '@/db/client'
import { insertAdvice } from '@/db/queries/advice'
import { appendAudit } from '@/db/queries/audit'
import { type Change, takeChanges, takeJobNumbers } from '@/db/queries/changes'
import { insertHeard } from '@/db/queries/code-book-withdrawal'
import { type Evidence, takeEvidence } from '@/db/queries/evidence'
import { insertJobs, setJobStand } from '@/db/queries/jobs'
import { insertLinks, linkEntries, type NewLinks } from '@/db/queries/log-entries'
import { insertMachines } from '@/db/queries/machines'
import { insertPartRequests } from '@/db/queries/part-requests'
import { type StoredOp, saveOps } from '@/db/queries/sync-ops'
import { enqueueWork } from '@/db/queries/work'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import { forgottenAt, leavesFieldAt } from '@/lib/shop/scope'
import type { Effects, JobStand, Known, Outcome } from './known'
import type { Plan } from './plan'
import type { ReadOp } from './read-ops'
import { auditOfValues, changesOfValues, type Hand, writeValues } from './write-values'

/** Who sends, and when it came by the server's clock. */
export type Sender = Hand

/**
 * Writes a plan. The caller holds the shop's counter, so nothing of the shop moves meanwhile: only bulk
 * statements here, and the numbers last (sync.md section 1). `links`: the plan's entries as they were
 * linked before the lock, if they still follow on their jobs' chains; null: to be linked now.
 */
export async function applyPlan(
  tx: ShopTx,
  of: { plan: Plan; known: Known; sender: Sender; links: NewLinks | null },
): Promise<void> {
  const { plan, known, sender } = of
  const { effects } = plan
  const { actor, deviceId, at } = sender
  await insertMachines(tx, effects.machines)
  await writeJobs(tx, effects, sender)
  const { entries } = effects
  await insertLinks(tx, of.links ?? (await linkEntries(tx, { entries, receivedAt: at })))
  await insertPartRequests(
    tx,
    effects.partRequests.map((request) => ({
      request,
      askedBy: actor.personId,
      askedOn: deviceId,
      receivedAt: at,
    })),
  )
  await insertAdvice(
    tx,
    effects.advice.map((advice) => ({
      advice,
      personId: actor.personId,
      deviceId,
      receivedAt: at,
    })),
  )
  await insertHeard(
    tx,
    effects.heard.map(({ withdrawalId, at: heardAt }) => ({
      withdrawalId,
      personId: actor.personId,
      deviceId,
      heardAt,
      receivedAt: at,
    })),
  )
  await writeValues(tx, effects, sender)
  await appendAudit(tx, [...auditOf(effects, sender), ...auditOfValues(effects, sender)])
  await saveOps(tx, storedOps(plan, sender))
  await enqueueTasks(tx, effects, at)
  const changes = changesOf(effects, known)
  if (changes.length > 0) await takeChanges(tx, changes)
}

/**
 * The same for a plan that only adds entries (addsOnly), in one statement that locks the counter late. False
 * when it was overtaken meanwhile, and then nothing is written.
 */
export async function applyEvidence(
  tx: ShopTx,
  of: { plan: Plan; known: Known; sender: Sender; links: NewLinks; rests: Evidence['rests'] },
): Promise<boolean> {
  const { plan, known, sender, links, rests } = of
  const changes = changesOf(plan.effects, known)
  const stored = storedOps(plan, sender)
  return await takeEvidence(tx, { links, stored, changes, readAt: known.at.seq, rests })
}

const storedOps = ({ outcomes }: Plan, sender: Sender): StoredOp[] =>
  outcomes.map(({ op, outcome }) => storedOp(op, outcome, sender))

async function writeJobs(tx: ShopTx, effects: Effects, sender: Sender): Promise<void> {
  const { actor, deviceId, at } = sender
  const numbers = await takeNumbers(tx, effects.jobs.length)
  await insertJobs(
    tx,
    effects.jobs.map(({ opening, stand }, index) => ({
      opening,
      stand: statesOf(stand),
      number: numbers[index] ?? '',
      openedBy: actor.personId,
      openedOn: deviceId,
      receivedAt: at,
    })),
  )
  for (const [id, stand] of effects.changedJobs) {
    await setJobStand(tx, { id, stand: statesOf(stand), by: { deviceId, at } })
  }
}

const takeNumbers = (tx: ShopTx, count: number): Promise<string[]> =>
  count === 0 ? Promise.resolve([]) : takeJobNumbers(tx, count)

const statesOf = ({ state, peopleState, machineState, wayOut }: JobStand) => ({
  state,
  peopleState,
  machineState,
  wayOut,
})

const auditOf = (effects: Effects, sender: Sender) => [
  ...auditOfSteps(effects, sender),
  ...auditOfHeard(effects, sender),
]

const auditOfHeard = ({ heard }: Effects, { actor, deviceId, at, newId }: Sender) =>
  heard.map((one) => ({
    id: newId(),
    jobId: null,
    at,
    actorId: actor.personId,
    deviceId,
    action: 'book.heard',
    entity: 'bookWithdrawal',
    entityId: one.withdrawalId,
    detail: { heardAt: one.at },
  }))

const auditOfSteps = ({ steps }: Effects, { actor, deviceId, at, newId }: Sender) =>
  steps.map(({ jobId, what, from, to }) => ({
    id: newId(),
    jobId,
    at,
    actorId: actor.personId,
    deviceId,
    action: what === 'job' ? 'job.move' : `job.${what}`,
    entity: 'job',
    entityId: jobId,
    detail: { from, to },
  }))

/** After-commit work: it is queued only if this transaction commits (lib/work). */
async function enqueueTasks(tx: ShopTx, effects: Effects, at: Instant): Promise<void> {
  for (const { id } of effects.partRequests) {
    const key = `partRequestMail:${id}`
    await enqueueWork(tx, { task: 'partRequestMail', payload: { requestId: id }, key })
  }
  const closed = effects.steps.filter((step) => step.what === 'job' && step.to === 'closed')
  const runAt = leavesFieldAt(at)
  for (const { jobId } of closed) {
    await enqueueWork(tx, { task: 'leaveField', payload: {}, key: `leaveField:${jobId}`, runAt })
  }
  if ([...effects.drops.values()].some((drop) => drop.isDropped)) {
    const due = forgottenAt(at)
    const key = `pruneChanges:${due.slice(0, 10)}`
    await enqueueWork(tx, { task: 'pruneChanges', payload: {}, key, runAt: due })
  }
}

/** Where an op of any shape points, as far as it says so in a form that can be kept. */
function placeOf({ read }: ReadOp) {
  if (read.kind !== 'op') return { kind: read.kind, entityId: null, jobId: null }
  const { kind, entityId, jobId } = read.op
  return { kind, entityId, jobId }
}

function storedOp(op: ReadOp, outcome: Outcome, { actor, deviceId, at }: Sender): StoredOp {
  const refusal = outcome.kind === 'rejected' ? outcome : null
  return {
    opId: op.opId,
    deviceId,
    dseq: op.dseq,
    personId: actor.personId,
    ...placeOf(op),
    raw: op.raw,
    outcome: outcome.kind,
    code: refusal?.code ?? null,
    field: refusal?.field ?? null,
    detail: refusal?.detail ?? null,
    blockedOn: outcome.kind === 'blocked' ? outcome.on : null,
    loser: outcome.kind === 'merged' ? outcome.loser : null,
    receivedAt: at,
    settledAt: outcome.kind === 'blocked' ? null : at,
  }
}

/**
 * What gets a number, parents first. A job that was closed or reopened is numbered whole: its rows, the
 * new ones among them, then travel with it.
 */
function changesOf(effects: Effects, known: Known): Change[] {
  const changes: Change[] = []
  const whole = new Set<Id>()
  for (const { id } of effects.machines) changes.push({ entity: 'machine', id, jobId: null })
  for (const { opening } of effects.jobs) {
    changes.push({ entity: 'job', id: opening.id, jobId: opening.id })
  }
  for (const [id, stand] of effects.changedJobs) {
    const wasClosed = known.jobs.get(id)?.state === 'closed'
    const isWhole = wasClosed !== (stand.state === 'closed')
    if (isWhole) whole.add(id)
    changes.push({ entity: 'job', id, jobId: id, whole: isWhole })
  }
  for (const { id, jobId } of effects.entries) {
    if (!whole.has(jobId)) changes.push({ entity: 'logEntry', id, jobId })
  }
  for (const { id, jobId } of effects.partRequests) {
    if (!whole.has(jobId)) changes.push({ entity: 'partRequest', id, jobId })
  }
  for (const { withdrawalId } of effects.heard) {
    changes.push({ entity: 'bookWithdrawal', id: withdrawalId, jobId: null })
  }
  return withOnce(changes, changesOfValues(effects))
}

/** Both lists, a row of both once: taken back in the end counts, else what came first, which may be whole. */
function withOnce(changes: readonly Change[], more: readonly Change[]): Change[] {
  const once = new Map(changes.map((change) => [`${change.entity} ${change.id}`, change]))
  for (const change of more) {
    const key = `${change.entity} ${change.id}`
    if (!once.has(key) || change.state === 'deleted') once.set(key, change)
  }
  return [...once.values()]
}
