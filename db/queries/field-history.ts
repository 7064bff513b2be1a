import { type Selectable, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { FieldHistoryTable } from '../tables/merge'

/** What values are kept of. */
export type HistoryEntity = FieldHistoryTable['entity']

/** One write of one value, and whether it stands (docs/spec/sync.md, M1 to M5). */
export type FieldWrite = {
  id: Id
  value: unknown
  claimedHlc: string | null
  orderedHlc: string
  clockOdd: boolean
  deviceId: Id | null
  dseq: number | null
  personId: Id | null
  writtenAt: Instant
  receivedAt: Instant
  /** The shop's change number before this write: whoever had seen a later one had seen it. */
  afterSeq: number
  state: 'current' | 'replaced' | 'lost'
  /** The shop's change number before it lost; null while it did not. */
  lostAfter: number | null
  isLookedAt: boolean
}

/** A write with the row and the field it is of. */
export type PlacedWrite = {
  entity: HistoryEntity
  entityId: Id
  field: string
  write: FieldWrite
}

/** Answers every write kept of these rows, in the order in which they arrived. */
export async function listFieldWrites(
  tx: ShopTx,
  entityIds: readonly Id[],
): Promise<PlacedWrite[]> {
  if (entityIds.length === 0) return []
  const rows = await tx
    .selectFrom('fieldHistory')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where('entityId', 'in', entityIds)
    .orderBy('afterSeq')
    .orderBy('id')
    .execute()
  return rows.map(toPlaced)
}

/**
 * Stores new writes, and how known ones stand now. Those that stand no longer are written first, as one
 * write of a field stands at a time. Take a change number of the row.
 */
export async function saveFieldWrites(tx: ShopTx, placed: readonly PlacedWrite[]): Promise<void> {
  if (placed.length === 0) return
  const plain = JSON.stringify(
    placed.map(({ write, ...at }) => ({ ...at, ...write, value: { is: write.value } })),
  )
  await sql`
    update field_history h set state = w.state, lost_after = w."lostAfter"
    from json_to_recordset(${plain}::json) as w
      ("entityId" uuid, field text, id uuid, state text, "lostAfter" bigint)
    where h.shop_id = ${tx.shopId} and h.entity_id = w."entityId" and h.field = w.field and h.id = w.id
  `.execute(tx)
  await sql`
    insert into field_history (shop_id, id, entity, entity_id, field, value, claimed_hlc, ordered_hlc,
      clock_odd, device_id, dseq, person_id, written_at, received_at, after_seq, state, lost_after)
    select ${tx.shopId}::uuid, w.id, w.entity, w."entityId", w.field, w.value, w."claimedHlc",
      w."orderedHlc", w."clockOdd", w."deviceId", w.dseq, w."personId", w."writtenAt", w."receivedAt",
      w."afterSeq", w.state, w."lostAfter"
    from json_to_recordset(${plain}::json) as w (id uuid, entity text, "entityId" uuid, field text,
      value jsonb, "claimedHlc" text, "orderedHlc" text, "clockOdd" boolean, "deviceId" uuid, dseq bigint,
      "personId" uuid, "writtenAt" timestamptz, "receivedAt" timestamptz, "afterSeq" bigint, state text,
      "lostAfter" bigint)
    on conflict (shop_id, entity_id, field, id) do nothing
  `.execute(tx)
}

/** Notes that a person looked at values that did not stand. Take a change number of the row. */
export async function lookAtWrites(
  tx: ShopTx,
  { entityId, ids, by, at }: { entityId: Id; ids: readonly Id[]; by: Id; at: Instant },
): Promise<void> {
  await tx
    .updateTable('fieldHistory')
    .set({ lookedAt: at, lookedBy: by })
    .where('shopId', '=', tx.shopId)
    .where('entityId', '=', entityId)
    .where('id', 'in', ids)
    .where('lookedAt', 'is', null)
    .execute()
}

/** The values a job or machine was written with, and by whom: the first writes of its fields. */
export type FirstValues = {
  id: Id
  values: Readonly<Record<string, unknown>>
  deviceId: Id | null
  personId: Id | null
  at: Instant
}

/** Answers what these jobs hold in the fields that may be set. */
export async function valuesOfJobs(tx: ShopTx, ids: readonly Id[]): Promise<FirstValues[]> {
  if (ids.length === 0) return []
  const rows = await tx
    .selectFrom('job')
    .select(['id', 'complaint', 'place', 'airTempC', 'weather', 'openedBy', 'openedOn', 'openedAt'])
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .execute()
  return rows.map(({ id, complaint, place, airTempC, weather, ...of }) => ({
    id,
    values: { complaintWords: complaint.words, place, airTempC, weather },
    deviceId: of.openedOn,
    personId: of.openedBy,
    at: of.openedAt,
  }))
}

/** Answers what these machines hold in the fields that may be set; who wrote a machine is not kept. */
export async function valuesOfMachines(tx: ShopTx, ids: readonly Id[]): Promise<FirstValues[]> {
  if (ids.length === 0) return []
  const rows = await tx
    .selectFrom('machine')
    .select(['id', 'hours', 'unitNumber', 'serial', 'year', 'updatedAt'])
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .execute()
  return rows.map(({ id, updatedAt, ...values }) => ({
    id,
    values,
    deviceId: null,
    personId: null,
    at: updatedAt,
  }))
}

/**
 * The SQL of what was entered besides and nobody has looked at, of the row whose id is `entityId` (a
 * column); null where there is nothing, the latest first.
 */
export const alsoEnteredOf = (tx: ShopTx, entityId: ReturnType<typeof sql.ref>) =>
  sql<AlsoEnteredRow[] | null>`(select jsonb_agg(jsonb_build_object('id', h.id, 'field', h.field,
      'value', h.value -> 'is', 'by', h.person_id, 'at', to_char(h.written_at at time zone 'UTC',
        'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"'), 'clockOdd', h.clock_odd) order by h.ordered_hlc desc, h.id)
    from field_history h
    where h.shop_id = ${tx.shopId} and h.entity_id = ${entityId} and h.state = 'lost'
      and h.looked_at is null and h.entity <> 'partRequest')`

export type AlsoEnteredRow = {
  id: Id
  field: string
  value: unknown
  by: Id | null
  at: Instant
  clockOdd: boolean
}

const toPlaced = (row: Selectable<FieldHistoryTable>): PlacedWrite => ({
  entity: row.entity,
  entityId: row.entityId,
  field: row.field,
  write: {
    id: row.id,
    value: row.value.is,
    claimedHlc: row.claimedHlc,
    orderedHlc: row.orderedHlc,
    clockOdd: row.clockOdd,
    deviceId: row.deviceId,
    dseq: row.dseq,
    personId: row.personId,
    writtenAt: row.writtenAt,
    receivedAt: row.receivedAt,
    afterSeq: row.afterSeq,
    state: row.state,
    lostAfter: row.lostAfter,
    isLookedAt: row.lookedAt !== null,
  },
})
