import * as z from 'zod/mini'
import { asShop } from '@/db/client'
import { lockShop, takeChanges } from '@/db/queries/changes'
import { leaveField as takeOffPhones } from '@/db/queries/jobs'
import { id } from '@/lib/model/id'
import { FIELD_DAYS } from '@/lib/shop/scope'

/** leaveField: jobs closed more than 60 days ago leave the phones (R22); the shop keeps them. */
const payload = z.object({ shopId: id })

/** Takes every job of the shop off the phones that is due at `now` (ms). */
export async function leaveField(given: unknown, { now }: { now: number }): Promise<void> {
  const { shopId } = payload.parse(given)
  const closedBefore = new Date(now - FIELD_DAYS * 24 * 3_600_000).toISOString()
  await asShop(shopId, async (tx) => {
    await lockShop(tx)
    const ids = await takeOffPhones(tx, { closedBefore, now: new Date(now).toISOString() })
    const changes = ids.map((jobId) => ({
      entity: 'job' as const,
      id: jobId,
      jobId,
      whole: true,
    }))
    if (changes.length > 0) await takeChanges(tx, changes)
  })
}
