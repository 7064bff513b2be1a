import { asShop } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { lockShop, takeChanges } from '@/db/queries/changes'
import { listFieldWrites, lookAtWrites, saveFieldWrites } from '@/db/queries/field-history'
import { findLeadJob } from '@/db/queries/jobs'
import { setJobValue } from '@/db/queries/values'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import { jobSetting } from '@/lib/model/setting'
import type { Instant } from '@/lib/model/time'
import { seesJob } from '@/lib/shop/scope'
import { hlcAt } from '@/lib/sync/protocol/hlc'
import { mergeWrite } from './field-merge'

/**
 * The desk looks at a value that did not stand (M4): it uses it, which is a new value by one who knew of
 * all, or leaves things as they are. Locked from the first read on: the desk judges what is so now.
 */
export type DeskSettling = {
  jobId: Id
  historyId: Id
  use: boolean
  stamp: { newId: () => Id; at: Instant }
}

/**
 * Settles one value of a job. `notFound` when it does not wait there any more, and when the job, or the one
 * that goes on for it, is not one this person sees (R22): the same answer, so that nothing is told of it.
 */
export function settleAtDesk(
  actor: Actor,
  { jobId, historyId, use, stamp }: DeskSettling,
): Promise<Result<null, { kind: 'notFound' }>> {
  const { at, newId } = stamp
  return asShop(actor.shopId, async (tx) => {
    const seq = await lockShop(tx)
    const job = await findLeadJob(tx, jobId)
    if (!job || !seesJob(actor, job)) return fail({ kind: 'notFound' as const })
    const placed = (await listFieldWrites(tx, [jobId])).filter(({ entity }) => entity === 'job')
    const found = placed.find(({ write }) => write.id === historyId)
    const isWaiting = found?.write.state === 'lost' && !found.write.isLookedAt
    const setting = jobSetting.safeParse({ field: found?.field, value: found?.write.value })
    if (!isWaiting || !setting.success) return fail({ kind: 'notFound' as const })
    const { field } = setting.data
    if (use) {
      const nowMs = Date.parse(at)
      const held = placed.filter((one) => one.field === field).map((one) => one.write)
      const by = { deviceId: null, dseq: null, personId: actor.personId }
      const write = { id: newId(), value: setting.data.value, hlc: hlcAt(nowMs), base: seq }
      const merged = mergeWrite(
        held,
        { ...write, ...by, hasRow: true },
        { field, at: { nowMs, seq } },
      )
      const place = { entity: 'job', entityId: jobId, field } as const
      await saveFieldWrites(
        tx,
        merged.changed.map((changed) => ({ ...place, write: changed })),
      )
      await setJobValue(tx, jobId, setting.data)
    }
    await lookAtWrites(tx, { entityId: jobId, ids: [historyId], by: actor.personId, at })
    const about = { entity: 'job', entityId: jobId, jobId, at }
    const who = { actorId: actor.personId, deviceId: null }
    await appendAudit(tx, [
      {
        id: newId(),
        ...about,
        ...who,
        action: 'job.settle',
        detail: { history: [historyId], use },
      },
    ])
    await takeChanges(tx, [{ entity: 'job', id: jobId, jobId }])
    return ok(null)
  })
}
