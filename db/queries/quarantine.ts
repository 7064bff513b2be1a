import { type Selectable, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { QuarantineDecisionTable, QuarantineOpTable } from '../tables/quarantine'

/** Something a phone sent that may not write any more. `raw` is its text, unchanged (P2). */
export type QuarantineOp = Omit<Selectable<QuarantineOpTable>, 'shopId'>
export type Quarantine = QuarantineOp['why']
/** With the owner's word on it, if there is one. */
export type QuarantineItem = QuarantineOp & {
  decision: QuarantineDecisionTable['decision'] | null
  reason: string | null
  decidedBy: Id | null
  decidedAt: Instant | null
}

/** The kind of a row that is the bytes of a photo or voice note themselves. */
export const FILE_KIND = 'file'

/** The id under which the bytes of a file are kept in quarantine. */
export const fileItemId = (hash: string): string => `file:${hash}`

/** Keeps ops as they were sent; one that is there stays as it is, whatever comes under its id. */
export async function keepInQuarantine(tx: ShopTx, ops: readonly QuarantineOp[]): Promise<void> {
  if (ops.length === 0) return
  await sql`
    insert into quarantine_op (shop_id, op_id, device_id, person_id, roles, dseq, kind, entity_id,
      job_id, file_hash, raw, why, received_at)
    select ${tx.shopId}::uuid, o."opId", o."deviceId", o."personId", o.roles, o.dseq, o.kind,
      o."entityId", o."jobId", o."fileHash", o.raw, o.why, o."receivedAt"
    from json_to_recordset(${JSON.stringify(ops)}::json) as o ("opId" text, "deviceId" uuid,
      "personId" uuid, roles text[], dseq bigint, kind text, "entityId" text, "jobId" uuid,
      "fileHash" text, raw text, why text, "receivedAt" timestamptz)
    on conflict (shop_id, op_id) do nothing
  `.execute(tx)
}

/** Answers how much of a phone lies in quarantine: items, and the bytes of their texts. */
export async function quarantineLoad(
  tx: ShopTx,
  deviceId: Id,
): Promise<{ items: number; bytes: number }> {
  const { rows } = await sql<{ items: number; bytes: number }>`
    select count(*) as items, coalesce(sum(octet_length(raw)), 0)::bigint as bytes from quarantine_op
    where shop_id = ${tx.shopId} and device_id = ${deviceId}
  `.execute(tx)
  return rows[0] ?? { items: 0, bytes: 0 }
}

/** Answers the texts of those of these ops that lie in quarantine, by id. */
export async function quarantinedTexts(
  tx: ShopTx,
  opIds: readonly string[],
): Promise<Map<string, string>> {
  if (opIds.length === 0) return new Map()
  const rows = await tx
    .selectFrom('quarantineOp')
    .select(['opId', 'raw'])
    .where('shopId', '=', tx.shopId)
    .where('opId', '=', sql<string>`any(${opIds}::text[])`)
    .execute()
  return new Map(rows.map((row) => [row.opId, row.raw]))
}

const items = (tx: ShopTx) =>
  tx
    .selectFrom('quarantineOp as q')
    .leftJoin('quarantineDecision as d', (join) =>
      join.onRef('d.shopId', '=', 'q.shopId').onRef('d.opId', '=', 'q.opId'),
    )
    .selectAll('q')
    .select(['d.decision', 'd.reason', 'd.decidedBy', 'd.decidedAt'])
    .where('q.shopId', '=', tx.shopId)

/** Answers everything that came into quarantine, phone by phone in the order it was made. */
export async function listQuarantine(tx: ShopTx): Promise<QuarantineItem[]> {
  const rows = await items(tx)
    .orderBy('q.deviceId')
    .orderBy('q.dseq')
    .orderBy('q.receivedAt')
    .orderBy('q.opId')
    .execute()
  return rows.map(({ shopId: _, ...item }) => item)
}

/** Answers one of them; undefined when there is none under this id. */
export async function findQuarantined(
  tx: ShopTx,
  opId: string,
): Promise<QuarantineItem | undefined> {
  const row = await items(tx).where('q.opId', '=', opId).executeTakeFirst()
  if (!row) return undefined
  const { shopId: _, ...item } = row
  return item
}

/** Answers what of a phone waits for the owner, in the order it was made: ops first, then files. */
export async function waitingInQuarantine(tx: ShopTx, deviceId: Id): Promise<QuarantineItem[]> {
  const rows = await items(tx)
    .where('q.deviceId', '=', deviceId)
    .where('d.opId', 'is', null)
    .orderBy(sql`q.kind = ${FILE_KIND}`)
    .orderBy('q.dseq')
    .orderBy('q.opId')
    .execute()
  return rows.map(({ shopId: _, ...item }) => item)
}

/** Answers the quarantined ops of a person that name a file, decided or not. */
export async function opsNaming(
  tx: ShopTx,
  { hash, personId }: { hash: string; personId: Id },
): Promise<QuarantineItem[]> {
  const rows = await items(tx)
    .where('q.fileHash', '=', hash)
    .where('q.personId', '=', personId)
    .where('q.kind', '!=', FILE_KIND)
    .execute()
  return rows.map(({ shopId: _, ...item }) => item)
}

/** Stores the owner's word. False when there was one: that one stands. */
export async function decideQuarantine(
  tx: ShopTx,
  word: {
    opId: string
    decision: 'accepted' | 'refused'
    reason: string | null
    by: Id
    at: Instant
  },
): Promise<boolean> {
  const { opId, decision, reason, by, at } = word
  const done = await tx
    .insertInto('quarantineDecision')
    .values({ shopId: tx.shopId, opId, decision, reason, decidedBy: by, decidedAt: at })
    .onConflict((on) => on.columns(['shopId', 'opId']).doNothing())
    .executeTakeFirst()
  return done.numInsertedOrUpdatedRows === 1n
}
