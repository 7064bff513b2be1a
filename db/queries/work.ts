import { sql } from 'kysely'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'

/**
 * Puts a task into the queue in this transaction: it runs only if its cause commits. The shop's id is
 * added to the payload as `shopId` by the database. `key`: a second task under it replaces the first
 * while that waits (keys are the shop's own). `runAt`: not before; left out, at once.
 */
export async function enqueueWork(
  tx: ShopTx,
  {
    task,
    payload,
    key,
    runAt,
    maxAttempts,
  }: {
    task: string
    payload: Record<string, unknown>
    key?: string
    runAt?: Instant
    maxAttempts?: number
  },
): Promise<void> {
  await sql`select enqueue_work(${task}, ${JSON.stringify(payload)}::jsonb, ${key ?? null},
    ${runAt ?? null}::timestamptz, ${maxAttempts ?? null}::integer)`.execute(tx)
}
