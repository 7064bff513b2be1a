import type { ShopTx } from '@/db/client'
import { knownAdvice } from '@/db/queries/advice'
import { guideSafeIds } from '@/db/queries/code-book'
import { jobsById, jobsClosedOn } from '@/db/queries/jobs'
import { decidingEntries, jobsOfEntries } from '@/db/queries/log-entries'
import { listModels, machinesById } from '@/db/queries/machines'
import { listPartRequests } from '@/db/queries/part-requests'
import { findOps, type StoredOp } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { assertNever } from '@/lib/model/result'
import { may } from '@/lib/shop/permissions'
import { REJECT_CODES } from '@/lib/sync/protocol/message'
import type { Op } from '@/lib/sync/protocol/op'
import type { Known, Outcome } from './draft'
import type { ReadOp } from './read-ops'

/** Ids of each kind that a batch speaks of. */
type Named = Record<'jobs' | 'machines' | 'models' | 'entries' | 'partRequests' | 'advice', Set<Id>>

function addNames(named: Named, op: Op): void {
  switch (op.kind) {
    case 'machine.add':
      named.machines.add(op.fields.id)
      if (op.fields.modelId !== null) named.models.add(op.fields.modelId)
      return
    case 'job.open':
      named.jobs.add(op.fields.id)
      named.machines.add(op.fields.machineId)
      return
    case 'job.move':
    case 'job.people':
    case 'job.machine':
      named.jobs.add(op.entityId)
      return
    case 'log.add':
      named.jobs.add(op.fields.jobId)
      named.entries.add(op.fields.id)
      if (op.fields.supersedes !== null) named.entries.add(op.fields.supersedes)
      return
    case 'partRequest.ask':
      named.jobs.add(op.fields.jobId)
      named.partRequests.add(op.fields.id)
      for (const { condemnedBy } of op.fields.lines) {
        if (condemnedBy !== null) named.entries.add(condemnedBy)
      }
      return
    case 'advice.keep':
      named.jobs.add(op.fields.jobId)
      named.advice.add(op.fields.id)
      return
    default:
      assertNever(op)
  }
}

/** Entries that decide on what the batch asks: what it points back to, and what else was said of a way out. */
function decidingOn(ops: readonly ReadOp[]): { ids: Id[]; jobIds: Id[] } {
  const ids = new Set<Id>()
  const jobIds = new Set<Id>()
  for (const { read } of ops) {
    if (read.kind !== 'op') continue
    const { op } = read
    if (op.kind === 'job.machine' && op.fields.to === 'leftBehind') jobIds.add(op.entityId)
    if (op.kind !== 'log.add') continue
    const { supersedes, body, jobId } = op.fields
    if (supersedes !== null) ids.add(supersedes)
    if (supersedes !== null || body.kind === 'wayOut') jobIds.add(jobId)
  }
  return { ids: [...ids], jobIds: [...jobIds] }
}

const isCode = (code: string | null) => REJECT_CODES.find((known) => known === code)

/** What a stored op tells. A merge counts as accepted; one in quarantine waits like a blocked one. */
function outcomeOf(stored: StoredOp): Outcome {
  const code = isCode(stored.code)
  if (stored.outcome === 'rejected') {
    return { kind: 'rejected', code: code ?? 'invalid', field: stored.field, detail: stored.detail }
  }
  const isOpen = stored.outcome === 'blocked' || stored.outcome === 'quarantined'
  return isOpen ? { kind: 'blocked', on: stored.blockedOn ?? '' } : { kind: 'accepted' }
}

/**
 * Reads everything of the database that these ops can depend on, within the shop of the transaction:
 * an id of another shop is as unknown as one that was never made.
 */
export async function loadKnown(
  tx: ShopTx,
  { actor, deviceId, ops }: { actor: Actor; deviceId: Id; ops: readonly ReadOp[] },
): Promise<Known> {
  const named: Named = {
    jobs: new Set(),
    machines: new Set(),
    models: new Set(),
    entries: new Set(),
    partRequests: new Set(),
    advice: new Set(),
  }
  for (const { read } of ops) if (read.kind === 'op') addNames(named, read.op)
  const seen = await findOps(
    tx,
    ops.map((op) => op.opId),
  )
  const jobs = await jobsById(tx, [...named.jobs])
  const closed = jobs.filter((job) => job.state === 'closed').map((job) => job.id)
  const asksSafe = may(actor.roles, 'check.guideSafe') && !may(actor.roles, 'check.do')
  const requests = await listPartRequests(tx, { ids: [...named.partRequests] })
  return {
    actor,
    deviceId,
    seen: new Map(
      [...seen].map(([opId, op]) => [opId, { raw: op.raw, outcome: outcomeOf(op) }] as const),
    ),
    jobs: new Map(jobs.map((job) => [job.id, job])),
    closedHere: await jobsClosedOn(tx, { deviceId, ids: closed }),
    machines: new Set((await machinesById(tx, [...named.machines])).map((machine) => machine.id)),
    models: new Set((await listModels(tx, [...named.models])).map((model) => model.id)),
    entries: await jobsOfEntries(tx, [...named.entries]),
    deciding: new Map((await decidingEntries(tx, decidingOn(ops))).map((row) => [row.id, row])),
    partRequests: new Set(requests.map((request) => request.id)),
    advice: await knownAdvice(tx, [...named.advice]),
    guideSafe: asksSafe ? await guideSafeIds(tx) : new Set(),
  }
}
