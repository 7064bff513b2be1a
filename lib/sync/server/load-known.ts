import type { ShopTx } from '@/db/client'
import { knownAdvice } from '@/db/queries/advice'
import { guideSafeIds } from '@/db/queries/code-book'
import { knownWithdrawals } from '@/db/queries/code-book-withdrawal'
import {
  type FieldWrite,
  type FirstValues,
  listFieldWrites,
  valuesOfJobs,
  valuesOfMachines,
} from '@/db/queries/field-history'
import { jobsById, jobsClosedOn } from '@/db/queries/jobs'
import { decidingEntries, jobsOfEntries } from '@/db/queries/log-entries'
import { machineStands, openersOnMachines } from '@/db/queries/machine-stands'
import { listModels } from '@/db/queries/machines'
import { knownLines, requestStands } from '@/db/queries/part-lines'
import { findOps, type StoredOp } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import type { Actor } from '@/lib/model/person'
import { may } from '@/lib/shop/permissions'
import { REJECT_CODES } from '@/lib/sync/protocol/message'
import type { Arrival } from './field-merge'
import { fieldKey, type Known, type Outcome } from './known'
import { type Named, namesOf } from './named'
import type { ReadOp } from './read-ops'

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

/** What a stored op tells. One in quarantine waits like a blocked one. */
function outcomeOf(stored: StoredOp): Outcome {
  const code = isCode(stored.code)
  switch (stored.outcome) {
    case 'rejected':
      return {
        kind: 'rejected',
        code: code ?? 'invalid',
        field: stored.field,
        detail: stored.detail,
      }
    case 'blocked':
    case 'quarantined':
      return { kind: 'blocked', on: stored.blockedOn ?? '' }
    case 'merged':
      return { kind: 'merged', loser: stored.loser }
    case 'accepted':
      return { kind: 'accepted' }
  }
}

/**
 * Reads everything of the database that these ops can depend on, within the shop of the transaction:
 * an id of another shop is as unknown as one that was never made. What only few batches speak of (values,
 * merged jobs) costs the others no round trip.
 */
export async function loadKnown(
  tx: ShopTx,
  { actor, deviceId, at, ops }: { actor: Actor; deviceId: Id; at: Arrival; ops: readonly ReadOp[] },
): Promise<Known> {
  const named = namesOf(ops)
  const seen = await findOps(
    tx,
    ops.map((op) => op.opId),
  )
  const partRequests = await requestStands(tx, [...named.partRequests])
  for (const { jobId } of partRequests.values()) named.jobs.add(jobId)
  const entries = await jobsOfEntries(tx, [...named.entries])
  for (const jobId of entries.values()) named.jobs.add(jobId)
  const jobs = await withLeads(tx, await jobsById(tx, [...named.jobs]))
  const deciding = withGroups(decidingOn(ops), jobs)
  const closed = jobs.filter((job) => job.state === 'closed').map((job) => job.id)
  const asksSafe = may(actor.roles, 'check.guideSafe') && !may(actor.roles, 'check.do')
  const machines = await machineStands(tx, [...named.machines])
  for (const id of named.setMachines) named.setMachines.add(machines.get(id)?.mergedInto ?? id)
  for (const id of named.setJobs) {
    named.setJobs.add(jobs.find((job) => job.id === id)?.mergedInto ?? id)
  }
  return {
    actor,
    deviceId,
    at,
    seen: new Map(
      [...seen].map(([opId, op]) => [opId, { raw: op.raw, outcome: outcomeOf(op) }] as const),
    ),
    jobs: new Map(jobs.map((job) => [job.id, job])),
    closedHere: await jobsClosedOn(tx, { deviceId, ids: closed }),
    machines,
    openersOn: await openersOnMachines(tx, [...named.droppedMachines]),
    models: new Set((await listModels(tx, [...named.models])).map((model) => model.id)),
    entries,
    deciding: new Map((await decidingEntries(tx, deciding)).map((row) => [row.id, row])),
    partRequests,
    lines: await knownLines(tx, [...named.newLines]),
    advice: await knownAdvice(tx, [...named.advice]),
    withdrawals: await knownWithdrawals(tx, [...named.withdrawals]),
    ...(await valuesOf(tx, { named, machines })),
    guideSafe: asksSafe ? await guideSafeIds(tx) : new Set(),
  }
}

/** The jobs to look into, with those merged with them: they are read as one log (R13). */
function withGroups<T extends { jobIds: Id[] }>(of: T, jobs: readonly Job[]): T {
  const byId = new Map(jobs.map((job) => [job.id, job]))
  const groups = of.jobIds.flatMap((id) => {
    const lead = byId.get(byId.get(id)?.mergedInto ?? id)
    return [id, ...(lead ? [lead.id, ...(lead.mergedFrom ?? [])] : [])]
  })
  return { ...of, jobIds: [...new Set(groups)] }
}

/** The jobs, and of merged ones those that go on. */
async function withLeads(tx: ShopTx, jobs: Job[]): Promise<Job[]> {
  const held = new Set(jobs.map((job) => job.id))
  const leads = jobs.flatMap(({ mergedInto }) =>
    mergedInto === undefined || held.has(mergedInto) ? [] : [mergedInto],
  )
  return leads.length === 0 ? jobs : [...jobs, ...(await jobsById(tx, [...new Set(leads)]))]
}

/** Every write of the rows whose values the batch sets, and what these rows hold. */
async function valuesOf(
  tx: ShopTx,
  { named, machines }: { named: Named; machines: Known['machines'] },
): Promise<Pick<Known, 'writes' | 'firsts'>> {
  const revived = [...named.machines].filter((id) => machines.get(id)?.isDropped)
  const ids = new Set([...named.setJobs, ...named.setMachines, ...named.setRequests, ...revived])
  const writes = new Map<string, FieldWrite[]>()
  for (const { entityId, field, write } of await listFieldWrites(tx, [...ids])) {
    const key = fieldKey(entityId, field)
    writes.set(key, [...(writes.get(key) ?? []), write])
  }
  const firsts: FirstValues[] = [
    ...(await valuesOfJobs(tx, [...named.setJobs])),
    ...(await valuesOfMachines(tx, [...named.setMachines])),
  ]
  return { writes, firsts: new Map(firsts.map((first) => [first.id, first])) }
}
