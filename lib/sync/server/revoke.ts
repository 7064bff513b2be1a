import { asShop } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { lockShop } from '@/db/queries/changes'
import { findDevice, revokeDevice } from '@/db/queries/devices'
import { revokeSessionsOf } from '@/db/queries/sign-in'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'

/**
 * Takes a phone out for good (Q1): it is shown nothing any more, and every session of its person ends, as
 * one of them may have been copied from it. What it still sends goes into quarantine. Its key never comes
 * back: a phone that was emptied is enrolled anew under another one. Twice is once.
 */
export function revokePhone(
  owner: Actor,
  { phoneId, reason }: { phoneId: Id; reason: string },
  { now, newId }: { now: number; newId: () => Id },
): Promise<Result<null, { kind: 'notFound' }>> {
  const at = new Date(now).toISOString()
  return asShop(owner.shopId, async (tx) => {
    await lockShop(tx)
    const device = await findDevice(tx, phoneId)
    // The device under a person's own id is their desk, which is no phone to take out.
    if (!device || device.id === device.personId) return fail({ kind: 'notFound' as const })
    const { personId } = device
    const isNew = await revokeDevice(tx, { id: phoneId, by: owner.personId, now: at, reason })
    if (!isNew) return ok(null)
    await revokeSessionsOf(tx, { personId, now: at })
    await appendAudit(tx, [
      {
        id: newId(),
        jobId: null,
        at,
        actorId: owner.personId,
        deviceId: null,
        action: 'device.revoked',
        entity: 'device',
        entityId: phoneId,
        detail: { personId, lastSeenAt: device.lastSeenAt },
      },
    ])
    return ok(null)
  })
}
