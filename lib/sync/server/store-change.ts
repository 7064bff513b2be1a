import type { ShopTx } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { lockShop } from '@/db/queries/changes'
import { type Silent, silentPhones } from '@/db/queries/device-stand'
import { type Device, findDevice, lossBefore } from '@/db/queries/devices'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { SyncResponse } from '@/lib/sync/protocol/message'

/**
 * Puts on record that a known phone speaks out of another store than before (P22): its key went on and what
 * was in the store did not, as after a half-emptied or a copied one. Twins at once leave one entry. Comes
 * before the new canary is noted.
 */
export async function noteStoreChange(
  tx: ShopTx,
  of: { device: Device; canary: Id | null | undefined; at: Instant; newId: () => Id },
): Promise<void> {
  const { device, canary = null, at, newId } = of
  if (canary === null || device.canary === null || device.canary === canary) return
  await lockShop(tx)
  const now = await findDevice(tx, device.id)
  if (now === undefined || now.canary === canary) return
  const { personId, highestDseq, lastSeenAt } = now
  await appendAudit(tx, [
    {
      id: newId(),
      jobId: null,
      at,
      actorId: personId,
      deviceId: device.id,
      action: 'device.storeChanged',
      entity: 'device',
      entityId: device.id,
      detail: { before: now.canary, now: canary, highestDseq, lastSeenAt },
    },
  ])
}

/** What a store that begins anew hears of those before it: what went with them, and who fell silent. */
export async function toldToNewStore(
  tx: ShopTx,
  deviceId: Id,
): Promise<Pick<SyncResponse, 'lost'> & Partial<Pick<SyncResponse, 'silent'>>> {
  const loss = await lossBefore(tx, deviceId)
  const lost = loss && { ops: loss.ops, lastAt: loss.lastOn }
  const silent = summed(await silentPhones(tx, deviceId))
  return silent === null ? { lost } : { lost, silent }
}

function summed(phones: readonly Silent[]): NonNullable<SyncResponse['silent']> | null {
  const [last] = phones
  if (last === undefined) return null
  const sum = (of: 'ops' | 'photos') => phones.reduce((total, phone) => total + phone[of], 0)
  return { phones: phones.length, ops: sum('ops'), photos: sum('photos'), lastAt: last.lastSeenAt }
}

/** Puts on record which phones of its person had fallen silent with unsent work when a new one came. */
export async function noteSilent(
  tx: ShopTx,
  of: { personId: Id; deviceId: Id; at: Instant; newId: () => Id },
): Promise<void> {
  const { personId, deviceId, at, newId } = of
  const phones = await silentPhones(tx, deviceId)
  await appendAudit(
    tx,
    phones.map(({ id, lastSeenAt, ops, photos }) => ({
      id: newId(),
      jobId: null,
      at,
      actorId: personId,
      deviceId,
      action: 'device.silent',
      entity: 'device',
      entityId: id,
      detail: { lastSeenAt, ops, photos },
    })),
  )
}
