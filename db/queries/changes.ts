import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { ShopTx } from '../client'

/** Entities whose rows travel to phones and desks, by the name they travel under. */
export type ChangeEntity =
  | 'shop'
  | 'person'
  | 'machineModel'
  | 'machine'
  | 'meterProfile'
  | 'bag'
  | 'job'
  | 'logEntry'
  | 'partRequest'
  | 'photo'
  | 'book'
  | 'bookWithdrawal'

/**
 * One row that changed. `jobId` is the job it belongs to (a job's own id for a job), null for none.
 * `whole` on a job: who may hold it changed, so all its rows are numbered again (docs/spec/data.md).
 */
export type Change = {
  entity: ChangeEntity
  id: string
  jobId: Id | null
  state?: 'present' | 'deleted'
  whole?: boolean
}

/**
 * Answers the shop's last change number and makes this transaction its only writer of numbers until
 * it ends. Call it when all checking is done: nothing slow may follow (sync.md section 1). Waits 2 s
 * at most, then fails with PostgreSQL's 55P03: tell the phone to retry. Name the jobs whose logs will be
 * added to: theirs are locked before the counter, as everywhere.
 */
export async function lockShop(tx: ShopTx, logs: readonly Id[] = []): Promise<number> {
  const { rows } = await sql<{ seq: number }>`
    select lock_counter(${tx.shopId}, ${logs}::uuid[]) as seq
  `.execute(tx)
  return Number(rows[0]?.seq)
}

/** Answers the shop's last change number without locking it. */
export async function lastChange(tx: ShopTx): Promise<number> {
  return (await logStand(tx)).seq
}

/** Answers which log the shop goes on with (another one after a restored backup), and its last number. */
export async function logStand(tx: ShopTx): Promise<{ epoch: string | null; seq: number }> {
  const row = await tx
    .selectFrom('shopCounter')
    .select(['epoch', 'seq'])
    .where('shopId', '=', tx.shopId)
    .executeTakeFirst()
  return row ?? { epoch: null, seq: 0 }
}

/**
 * Answers whether one of these jobs, something that travels with one, one of these rows, or the code book
 * changed after a number. Call it with the counter locked, when nothing can change any more.
 */
export async function isTouchedSince(
  tx: ShopTx,
  of: { seq: number; jobIds: readonly Id[]; entityIds: readonly string[] },
): Promise<boolean> {
  const { rows } = await sql<{ touched: boolean }>`
    select is_touched(${tx.shopId}, ${of.seq}, ${of.jobIds}::uuid[], ${of.entityIds}::text[]) as touched
  `.execute(tx)
  return rows[0]?.touched === true
}

/** Answers the shop's last change number, and the one under which the log is not whole any more (P10). */
export async function logBounds(tx: ShopTx): Promise<{ last: number; horizon: number }> {
  const row = await tx
    .selectFrom('shopCounter')
    .select(['seq', 'horizon'])
    .where('shopId', '=', tx.shopId)
    .executeTakeFirst()
  return { last: row?.seq ?? 0, horizon: row?.horizon ?? 0 }
}

/**
 * Purges tombstones from before `before` that an earlier run put under the horizon, and raises the horizon
 * over those that the next run will purge. `isWaiting`: there are such, so run again after a while.
 */
export async function pruneChanges(
  tx: ShopTx,
  { before }: { before: string },
): Promise<{ purged: number; isWaiting: boolean }> {
  const { rows } = await sql<{ purged: number; waiting: boolean }>`
    select purged, waiting from prune_changes(${tx.shopId}, ${before}::timestamptz)
  `.execute(tx)
  return { purged: Number(rows[0]?.purged ?? 0), isWaiting: rows[0]?.waiting ?? false }
}

/**
 * Gives the rows their change numbers in the order given and tells the listeners once, at commit.
 * Answers the last number (the shop's present one for an empty list). Every insert, update or delete
 * of a pulled table needs its number in the same transaction, or the commit is refused (FB002).
 */
export async function takeChanges(tx: ShopTx, changes: readonly Change[]): Promise<number> {
  const { rows } = await sql<{ last: number | null }>`
    select max(seq) as last from take_changes(${tx.shopId}, ${JSON.stringify(changes)}::jsonb)
  `.execute(tx)
  return rows[0]?.last ?? (await lastChange(tx))
}

/** Answers the next `count` job numbers, `J-0001` and on; a rollback gives them back. Locks the shop. */
export async function takeJobNumbers(tx: ShopTx, count: number): Promise<string[]> {
  const { rows } = await sql<{ number: string }>`
    select number from take_job_numbers(${tx.shopId}, ${count}) as number
  `.execute(tx)
  return rows.map((row) => row.number)
}
