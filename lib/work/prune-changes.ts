import * as z from 'zod/mini'
import { asShop } from '@/db/client'
import { pruneChanges as prune } from '@/db/queries/changes'
import { enqueueWork } from '@/db/queries/work'
import { id } from '@/lib/model/id'
import { TOMBSTONE_DAYS } from '@/lib/shop/scope'

/**
 * pruneChanges: what was taken back more than 180 days ago leaves the change log (P10). In two runs: the
 * first makes older phones pull anew, the second purges, so that nobody who pulls meanwhile misses it.
 */
const payload = z.object({ shopId: id })
const DAY_MS = 24 * 3_600_000

/** Purges what is due at `now` (ms), and comes back a day later for what it has announced. */
export async function pruneChanges(given: unknown, { now }: { now: number }): Promise<void> {
  const { shopId } = payload.parse(given)
  const before = new Date(now - TOMBSTONE_DAYS * DAY_MS).toISOString()
  await asShop(shopId, async (tx) => {
    const { isWaiting } = await prune(tx, { before })
    if (!isWaiting) return
    const runAt = new Date(now + DAY_MS).toISOString()
    await enqueueWork(tx, { task: 'pruneChanges', payload: {}, key: 'pruneChanges:next', runAt })
  })
}
