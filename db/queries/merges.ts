import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { JobState } from '@/lib/model/job'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import type { Instant } from '@/lib/model/time'
import { asShop, type ShopTx } from '../client'
import { appendAudit } from './audit'
import { type Change, lockShop, takeChanges } from './changes'
import type { NotThere } from './desk-writes'
import { assignJob, unassignJob } from './jobs'

/**
 * Merging two rows that are one stranding or one machine, and undoing it (R13, docs/spec/sync.md M9 to M11).
 * The merged row keeps all it has and points to the one that goes on; entries stay in the chains they
 * were written to, and every read by the one that goes on shows those of all.
 */
export type MergeEntity = 'job' | 'machine'
export type MergeStamp = { newId: () => Id; at: Instant }

/** A row as the rules judge it; `state` is null for a machine. */
export type MergeRow = { id: Id; mergedInto: Id | null; state: JobState | null }

/** Merges `id` into `intoId`, when `decide` lets it; both are told of, and both audits say so. */
export function mergeRows<P>(
  actor: Actor,
  input: { entity: MergeEntity; id: Id; intoId: Id; stamp: MergeStamp },
  decide: (from: MergeRow, into: MergeRow) => Result<null, P>,
): Promise<Result<null, P | NotThere>> {
  const { entity, id, intoId, stamp } = input
  return asShop(actor.shopId, async (tx) => {
    await lockShop(tx)
    const from = await findRow(tx, entity, id)
    const into = await findRow(tx, entity, intoId)
    if (!from || !into) return fail({ kind: 'notFound' as const })
    const decided = decide(from, into)
    if (!decided.ok) return decided
    const members = await membersOf(tx, entity, id)
    await point(tx, entity, { ids: [id], into: intoId, root: intoId })
    await point(tx, entity, { ids: members, root: intoId })
    const people = entity === 'job' ? await putToWork(tx, id, intoId) : []
    await tx
      .insertInto('merging')
      .values({
        shopId: tx.shopId,
        id: stamp.newId(),
        entity,
        entityId: id,
        intoId,
        mergedAt: stamp.at,
        mergedBy: actor.personId,
        people,
        undoneAt: null,
        undoneBy: null,
      })
      .execute()
    await tell(tx, actor, { entity, stamp, action: 'merge', one: id, other: intoId })
    await takeChanges(tx, changesOf(entity, [id, ...members, intoId]))
    return ok(null)
  })
}

/** Lets a merged row stand for itself again, with all that was written to it meanwhile. */
export function unmergeRow<P>(
  actor: Actor,
  input: { entity: MergeEntity; id: Id; stamp: MergeStamp },
  notMerged: P,
): Promise<Result<null, P | NotThere>> {
  const { entity, id, stamp } = input
  return asShop(actor.shopId, async (tx) => {
    await lockShop(tx)
    const row = await findRow(tx, entity, id)
    if (!row) return fail({ kind: 'notFound' as const })
    const merging = await standingMerge(tx, entity, id)
    if (row.mergedInto === null || !merging) return fail(notMerged)
    const own = await treeOf(tx, entity, id)
    await point(tx, entity, { ids: [id], into: null, root: null })
    await point(tx, entity, { ids: own, root: id })
    for (const personId of merging.people) {
      await unassignJob(tx, { jobId: merging.intoId, personId })
    }
    await tx
      .updateTable('merging')
      .set({ undoneAt: stamp.at, undoneBy: actor.personId })
      .where('shopId', '=', tx.shopId)
      .where('id', '=', merging.id)
      .execute()
    await tell(tx, actor, { entity, stamp, action: 'unmerge', one: id, other: merging.intoId })
    const touched = new Set([id, ...own, merging.intoId, row.mergedInto])
    await takeChanges(tx, changesOf(entity, [...touched]))
    return ok(null)
  })
}

/** A job that was merged into this one, for the desk's list. */
export type MergedJob = { id: Id; number: string; words: string; mergedAt: Instant }

/** Answers the jobs merged straight into this one, the earliest merge first. */
export async function listMerged(tx: ShopTx, intoId: Id): Promise<MergedJob[]> {
  const rows = await tx
    .selectFrom('merging as m')
    .innerJoin('job as j', (join) =>
      join.onRef('j.shopId', '=', 'm.shopId').onRef('j.id', '=', 'm.entityId'),
    )
    .select(['j.id', 'j.number', 'j.complaint', 'm.mergedAt'])
    .where('m.shopId', '=', tx.shopId)
    .where('m.entity', '=', 'job')
    .where('m.intoId', '=', intoId)
    .where('m.undoneAt', 'is', null)
    .orderBy('m.mergedAt')
    .orderBy('j.id')
    .execute()
  return rows.map(({ complaint, ...row }) => ({ ...row, words: complaint.words }))
}

/** Answers the job that goes on for this one: itself unless it was merged; undefined when there is none. */
export async function leadOfJob(tx: ShopTx, id: Id): Promise<Id | undefined> {
  const row = await tx
    .selectFrom('job')
    .select(['id', 'mergedRoot'])
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .executeTakeFirst()
  return row && (row.mergedRoot ?? row.id)
}

async function findRow(tx: ShopTx, entity: MergeEntity, id: Id): Promise<MergeRow | undefined> {
  const row = await tx
    .selectFrom(entity)
    .select(['id', 'mergedRoot'])
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .where('deletedAt', 'is', null)
    .executeTakeFirst()
  if (!row) return undefined
  const state = entity === 'job' ? await stateOf(tx, id) : null
  return { id: row.id, mergedInto: row.mergedRoot, state }
}

async function stateOf(tx: ShopTx, id: Id): Promise<JobState> {
  const row = await tx
    .selectFrom('job')
    .select('state')
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .executeTakeFirstOrThrow()
  return row.state
}

const standingMerge = (tx: ShopTx, entity: MergeEntity, id: Id) =>
  tx
    .selectFrom('merging')
    .select(['id', 'intoId', 'people'])
    .where('shopId', '=', tx.shopId)
    .where('entity', '=', entity)
    .where('entityId', '=', id)
    .where('undoneAt', 'is', null)
    .executeTakeFirst()

/** Every row that goes on as this one. */
async function membersOf(tx: ShopTx, entity: MergeEntity, id: Id): Promise<Id[]> {
  const rows = await tx
    .selectFrom(entity)
    .select('id')
    .where('shopId', '=', tx.shopId)
    .where('mergedRoot', '=', id)
    .execute()
  return rows.map((row) => row.id)
}

/** Rows merged into this one, and into those, at whatever end the chain is now. */
async function treeOf(tx: ShopTx, entity: MergeEntity, id: Id): Promise<Id[]> {
  const { rows } = await sql<{ id: Id }>`
    with recursive own as (
      select r.id from ${sql.table(entity)} r where r.shop_id = ${tx.shopId} and r.merged_into = ${id}
      union
      select r.id from ${sql.table(entity)} r join own on r.merged_into = own.id
      where r.shop_id = ${tx.shopId}
    )
    select id from own`.execute(tx)
  return rows.map((row) => row.id)
}

/** Points rows at what they were merged into (left out: as before) and at the end of that chain. */
async function point(
  tx: ShopTx,
  entity: MergeEntity,
  { ids, into, root }: { ids: readonly Id[]; into?: Id | null; root: Id | null },
): Promise<void> {
  if (ids.length === 0) return
  await tx
    .updateTable(entity)
    .set({ mergedRoot: root, ...(into === undefined ? {} : { mergedInto: into }) })
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .execute()
}

/** Who works on the merged job works on the one that goes on; answers whom that put to work there. */
async function putToWork(tx: ShopTx, from: Id, into: Id): Promise<Id[]> {
  const at = async (jobId: Id) =>
    (
      await tx
        .selectFrom('jobAssignment')
        .select('personId')
        .where('shopId', '=', tx.shopId)
        .where('jobId', '=', jobId)
        .orderBy('assignedAt')
        .execute()
    ).map((row) => row.personId)
  const there = new Set(await at(into))
  const people = (await at(from)).filter((personId) => !there.has(personId))
  for (const personId of people) await assignJob(tx, { jobId: into, personId })
  return people
}

type Told = {
  entity: MergeEntity
  stamp: MergeStamp
  action: 'merge' | 'unmerge'
  one: Id
  other: Id
}

/** Says it in the audit of both: which one it was, and which one goes (or went) on. */
async function tell(tx: ShopTx, actor: Actor, of: Told): Promise<void> {
  const { entity, stamp, action, one, other } = of
  const entry = (id: Id, detail: Record<string, unknown>) => ({
    id: stamp.newId(),
    jobId: entity === 'job' ? id : null,
    at: stamp.at,
    actorId: actor.personId,
    deviceId: null,
    action: `${entity}.${action}`,
    entity,
    entityId: id,
    detail,
  })
  await appendAudit(tx, [entry(one, { into: other }), entry(other, { from: one })])
}

const changesOf = (entity: MergeEntity, ids: readonly Id[]): Change[] =>
  ids.map((id) =>
    entity === 'job' ? { entity, id, jobId: id, whole: true } : { entity, id, jobId: null },
  )
