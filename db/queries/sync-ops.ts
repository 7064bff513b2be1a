import { type Selectable, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { OpOutcome, SyncOpTable } from '../tables/sync-op'

/**
 * An op as it was sent, with what became of it. `raw` is its text, unchanged (P2); `blockedOn` the id
 * it waits for; `loser` what a merge set aside. `code` goes with `rejected` and with nothing else.
 */
export type StoredOp = {
  opId: string
  deviceId: Id
  dseq: number
  personId: Id
  kind: string
  entityId: string | null
  jobId: Id | null
  raw: string
  outcome: OpOutcome
  code: string | null
  field: string | null
  detail: string | null
  blockedOn: string | null
  loser: unknown
  receivedAt: Instant
  settledAt: Instant | null
}

/** Answers the ops with these ids that came before, by id. */
export async function findOps(
  tx: ShopTx,
  opIds: readonly string[],
): Promise<Map<string, StoredOp>> {
  if (opIds.length === 0) return new Map()
  const rows = await ops(tx).where('opId', '=', sql<string>`any(${opIds}::text[])`).execute()
  return new Map(rows.map((row) => [row.opId, toOp(row)]))
}

/** Answers which of these ids came before: the quick question to ask again under the lock. */
export async function knownOps(tx: ShopTx, opIds: readonly string[]): Promise<Set<string>> {
  if (opIds.length === 0) return new Set()
  const rows = await tx
    .selectFrom('syncOp')
    .select('opId')
    .where('shopId', '=', tx.shopId)
    .where('opId', '=', sql<string>`any(${opIds}::text[])`)
    .execute()
  return new Set(rows.map((row) => row.opId))
}

/**
 * Stores ops with their outcomes. One that is there is settled anew only while it was blocked or in
 * quarantine: a final outcome never changes (P6).
 */
export async function saveOps(tx: ShopTx, stored: readonly StoredOp[]): Promise<void> {
  if (stored.length === 0) return
  await sql`
    insert into sync_op (shop_id, op_id, device_id, dseq, person_id, kind, entity_id, job_id, raw,
      outcome, code, field, detail, blocked_on, loser, received_at, settled_at)
    select ${tx.shopId}::uuid, o."opId", o."deviceId", o.dseq, o."personId", o.kind, o."entityId",
      o."jobId", o.raw, o.outcome, o.code, o.field, o.detail, o."blockedOn", nullif(o.loser, 'null'::jsonb),
      o."receivedAt", o."settledAt"
    from json_to_recordset(${JSON.stringify(stored)}::json) as o ("opId" text, "deviceId" uuid,
      dseq bigint, "personId" uuid, kind text, "entityId" text, "jobId" uuid, raw text, outcome text,
      code text, field text, detail text, "blockedOn" text, loser jsonb, "receivedAt" timestamptz,
      "settledAt" timestamptz)
    on conflict (shop_id, op_id) do update set
      outcome = excluded.outcome, code = excluded.code, field = excluded.field,
      detail = excluded.detail, blocked_on = excluded.blocked_on, loser = excluded.loser,
      settled_at = excluded.settled_at
    where sync_op.outcome in ('blocked', 'quarantined')
  `.execute(tx)
}

/** True when an op of this phone that was refused for good speaks of a file by its hash. */
export async function refusedOpNames(
  tx: ShopTx,
  { deviceId, hash }: { deviceId: Id; hash: string },
): Promise<boolean> {
  const row = await tx
    .selectFrom('syncOp')
    .select('opId')
    .where('shopId', '=', tx.shopId)
    .where('deviceId', '=', deviceId)
    .where('outcome', '=', 'rejected')
    .where(sql<boolean>`position(${hash} in raw) > 0`)
    .limit(1)
    .executeTakeFirst()
  return row !== undefined
}

const ops = (tx: ShopTx) => tx.selectFrom('syncOp').selectAll().where('shopId', '=', tx.shopId)

const toOp = ({ shopId: _, ...op }: Selectable<SyncOpTable>): StoredOp => op
