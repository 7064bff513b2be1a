import { expect } from 'vitest'
import { asShop } from '@/db/client'
import { verifyAudit } from '@/db/queries/audit'
import { verifyLog } from '@/db/queries/log-entries'
import type { Id } from '@/lib/model/id'

/** Fails unless every chain of the shop holds and its change numbers are dense; answers how many jobs it has. */
export async function expectWholeShop(shopId: Id): Promise<number> {
  return await asShop(shopId, async (tx) => {
    const jobs = await tx.selectFrom('job').select('id').where('shopId', '=', shopId).execute()
    for (const { id } of jobs) {
      expect(await verifyLog(tx, id)).toMatchObject({ ok: true })
      expect(await verifyAudit(tx, id)).toMatchObject({ ok: true })
    }
    expect(await verifyAudit(tx, null)).toMatchObject({ ok: true })
    const log = await tx
      .selectFrom('changeLog')
      .select('seq')
      .where('shopId', '=', shopId)
      .orderBy('seq')
      .execute()
    expect(log.map((row) => row.seq)).toEqual(log.map((_, i) => i + 1))
    const counter = await tx.selectFrom('shopCounter').select('seq').executeTakeFirstOrThrow()
    expect(counter.seq).toBe(log.length)
    return jobs.length
  })
}
