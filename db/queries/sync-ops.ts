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
  await sql`select save_ops(${tx.shopId}, ${JSON.stringify(stored)}::json)`.execute(tx)
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
