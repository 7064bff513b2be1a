import type { Selectable } from 'kysely'
import type { Advice } from '@/lib/model/advice'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { AdviceTable } from '../tables/sync-op'

/** Who acted on it, on which phone (null: at the desk), and when it came. */
export type NewAdvice = { advice: Advice; personId: Id; deviceId: Id | null; receivedAt: Instant }

/** Stores recommendations that were acted on or overridden; insert only (R23). */
export async function insertAdvice(tx: ShopTx, kept: readonly NewAdvice[]): Promise<void> {
  if (kept.length === 0) return
  await tx
    .insertInto('advice')
    .values(
      kept.map(({ advice, ...rest }) => ({
        shopId: tx.shopId,
        ...advice,
        inputs: JSON.stringify(advice.inputs ?? null),
        shown: JSON.stringify(advice.shown ?? null),
        ...rest,
      })),
    )
    .execute()
}

/** Answers the recommendations kept of a job, the oldest first. */
export async function listAdvice(tx: ShopTx, jobId: Id): Promise<Advice[]> {
  const rows = await tx
    .selectFrom('advice')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where('jobId', '=', jobId)
    .orderBy('at')
    .orderBy('id')
    .execute()
  return rows.map(toAdvice)
}

/** Answers which of these ids are kept. */
export async function knownAdvice(tx: ShopTx, ids: readonly Id[]): Promise<Set<Id>> {
  if (ids.length === 0) return new Set()
  const rows = await tx
    .selectFrom('advice')
    .select('id')
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .execute()
  return new Set(rows.map((row) => row.id))
}

const toAdvice = (row: Selectable<AdviceTable>): Advice => ({
  id: row.id,
  jobId: row.jobId,
  at: row.at,
  engineVersion: row.engineVersion,
  bookVersion: row.bookVersion,
  inputs: JSON.parse(row.inputs),
  shown: JSON.parse(row.shown),
  acted: row.acted,
  chose: row.chose,
  reason: row.reason,
})
