import { asShop, type ShopTx } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { lockShop } from '@/db/queries/changes'
import {
  countMissing,
  enrolDevice,
  findDevice,
  listDevices,
  replaceDevice,
} from '@/db/queries/devices'
import { peopleById } from '@/db/queries/people'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import {
  type EnrolAnswer,
  type EnrolRequest,
  enrolRequest,
  type Keepsake,
} from '@/lib/sync/protocol/device'
import { readCapped, readJson } from './body'
import type { HttpProblem } from './problems'
import { noteSilent } from './store-change'

/** Most bytes of an enrolment: a key and a few words. */
const MAX_BYTES = 8 * 1024

/** Reads what a phone sends to be enrolled; whether the key is a key at all is asked apart. */
export async function readEnrolment(request: Request): Promise<Result<EnrolRequest, HttpProblem>> {
  const body = await readCapped(request, MAX_BYTES)
  if (!body.ok) return body
  const json = await readJson(body.value, null)
  const asked = enrolRequest.safeParse(json.ok ? json.value : null)
  return asked.success ? ok(asked.data) : fail({ kind: 'badJson' })
}

/**
 * Makes a phone known to the shop under the public half of its key (P18). The same key of the same
 * person is the same phone, however often it asks; a revoked one stays revoked under its old key.
 */
export function enrol(
  actor: Actor,
  request: EnrolRequest,
  { now, newId }: { now: number; newId: () => Id },
): Promise<Result<EnrolAnswer, HttpProblem>> {
  const at = new Date(now).toISOString()
  const { kty, crv, x, y } = request.publicKey
  return asShop(actor.shopId, async (tx) => {
    // Two tabs of one phone ask at once: the second finds what the first stored.
    await lockShop(tx)
    const known = (await listDevices(tx)).find(
      (device) =>
        device.personId === actor.personId && device.publicKey.x === x && device.publicKey.y === y,
    )
    if (known?.revokedAt) return fail<HttpProblem>({ kind: 'deviceRevoked' })
    if (known) return ok({ deviceId: known.id, serverTime: at })
    // A person's own id is kept for their desk (db/queries/desk-closing.ts).
    const isTaken =
      (await findDevice(tx, request.deviceId)) !== undefined ||
      (await peopleById(tx, [request.deviceId])).length > 0
    const id = isTaken ? newId() : request.deviceId
    const publicKey = { kty, crv, x, y }
    await enrolDevice(tx, {
      id,
      personId: actor.personId,
      name: request.words,
      publicKey,
      enrolledAt: at,
    })
    const entry = { id: newId(), jobId: null, at, actorId: actor.personId, deviceId: id }
    const what = { action: 'device.enrolled', entity: 'device', entityId: id, detail: {} }
    await appendAudit(tx, [{ ...entry, ...what }])
    const after = { actor, id, at, newId }
    for (const kept of request.kept ?? []) await noteGone(tx, kept, after)
    await noteSilent(tx, { personId: actor.personId, deviceId: id, at, newId })
    return ok({ deviceId: id, serverTime: at })
  })
}

/**
 * A store of this person is gone from the phone that asks (P22): the shop counts which of its numbers never
 * came, on both records. Stores of other people are none of this person's business, and what a revoked
 * phone or one that was told to empty itself no longer holds is no loss.
 */
async function noteGone(
  tx: ShopTx,
  kept: Keepsake,
  after: { actor: Actor; id: Id; at: string; newId: () => Id },
): Promise<void> {
  const { actor, id, at, newId } = after
  const gone = await findDevice(tx, kept.deviceId)
  if (!gone || gone.id === id || gone.personId !== actor.personId) return
  if (gone.replacedBy !== null || gone.wipeToldAt !== null || gone.revokedAt !== null) return
  const missing = await countMissing(tx, { id: gone.id, dseq: kept.dseq })
  const deletedOps = kept.deleted === null ? 0 : Math.min(kept.deleted, missing)
  const lostOps = kept.deleted === null ? missing : 0
  await replaceDevice(tx, { id: gone.id, by: id, at, lostOps, lastOn: kept.day, deletedOps })
  const action =
    kept.deleted !== null ? 'device.emptied' : lostOps > 0 ? 'device.lost' : 'device.replaced'
  await appendAudit(tx, [
    {
      id: newId(),
      jobId: null,
      at,
      actorId: actor.personId,
      deviceId: id,
      action,
      entity: 'device',
      entityId: gone.id,
      detail: { lostOps, deletedOps, lastOn: kept.day, unsent: kept.unsent, replacedBy: id },
    },
  ])
}
