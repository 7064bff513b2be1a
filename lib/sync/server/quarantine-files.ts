import { createHash } from 'node:crypto'
import { asShop } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { lockShop } from '@/db/queries/changes'
import { findPhotoNaming } from '@/db/queries/photo-entries'
import { findPhoto } from '@/db/queries/photos'
import {
  decideQuarantine,
  FILE_KIND,
  fileItemId,
  findQuarantined,
  keepInQuarantine,
  opsNaming,
  type Quarantine,
} from '@/db/queries/quarantine'
import { refusedOpNames } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { PhotoRow } from '@/lib/model/photo'
import { fail, ok, type Result } from '@/lib/model/result'
import type { Files } from '@/lib/ports/files'
import { uuidv7 } from '@/lib/ports/ids'
import { checkVoice } from './media-voice'
import { makeCopies } from './photo-copies'
import { type PhotoDelivery, type ShownPhoto, takePhoto } from './photos'
import type { HttpProblem } from './problems'

/** What an upload needs besides when its phone may not write any more (Q3). */
export type QuarantineFile = { why: Quarantine; newId: () => Id }

/** Of a signed sender: what its files need besides when they go into quarantine, else null. */
export const quarantineOf = (sender: { quarantine: Quarantine | null }): QuarantineFile | null =>
  sender.quarantine === null ? null : { why: sender.quarantine, newId: uuidv7.next }

type Delivery = Omit<PhotoDelivery, 'bytes'> & QuarantineFile

/** Where the bytes of a shop's quarantine lie: a folder that no route shows. */
const keyOf = (shopId: Id, hash: string) => `quarantine-${shopId}/${hash}`

/**
 * Whether these bytes are here already, in quarantine or let in; `notNamed` until an op or an entry of
 * this person that names them has come, as nobody may store what nothing speaks of.
 */
export async function isInQuarantine(of: Delivery): Promise<'here' | 'wanted' | 'notNamed'> {
  const { device, hash } = of
  const { shopId, personId } = device.actor
  const found = await asShop(shopId, async (tx) => ({
    item: await findQuarantined(tx, fileItemId(hash)),
    row: await findPhoto(tx, hash),
    ops: await opsNaming(tx, { hash, personId }),
    entry: await findPhotoNaming(tx, { hash, authorId: personId }),
    refused: await refusedOpNames(tx, { deviceId: device.deviceId, hash }),
  }))
  if (found.ops.length === 0 && !found.entry && !found.refused) return 'notNamed'
  return found.item || (found.row && found.entry) ? 'here' : 'wanted'
}

/**
 * Keeps the bytes of a photo or voice note apart, under their SHA-256 and unseen. Where the owner has
 * accepted the op that names them they are let in at once.
 */
export async function keepFile(
  of: Delivery & { bytes: Buffer },
): Promise<Result<null, HttpProblem>> {
  const { device, hash, bytes, files, now, why, newId } = of
  const { shopId, personId, roles } = device.actor
  if (createHash('sha256').update(bytes).digest('hex') !== hash) return fail({ kind: 'wrongHash' })
  const held = await isInQuarantine(of)
  if (held !== 'wanted') return held === 'here' ? ok(null) : fail({ kind: 'entryFirst' })
  await files.put(keyOf(shopId, hash), bytes, 'application/octet-stream')
  const at = new Date(now).toISOString()
  const { deviceId } = device
  const accepted = await asShop(shopId, async (tx) => {
    await lockShop(tx)
    const ops = await opsNaming(tx, { hash, personId })
    const isNew = (await findQuarantined(tx, fileItemId(hash))) === undefined
    const raw = JSON.stringify({ hash, bytes: bytes.length })
    const row = { opId: fileItemId(hash), deviceId, personId, roles: [...roles], dseq: 0, raw, why }
    const jobId = ops[0]?.jobId ?? null
    const rest = { kind: FILE_KIND, entityId: null, jobId, fileHash: hash, receivedAt: at }
    await keepInQuarantine(tx, [{ ...row, ...rest }])
    const entry = { id: newId(), jobId: null, at, actorId: personId, deviceId }
    const what = { action: 'quarantine.kept', entity: 'device', entityId: deviceId }
    if (isNew) await appendAudit(tx, [{ ...entry, ...what, detail: { why, file: hash } }])
    return ops.find((op) => op.decision === 'accepted')
  })
  if (accepted?.decidedBy) await letFileIn({ ...of, by: accepted.decidedBy })
  return ok(null)
}

/** A file to be let in: whose it is, into which store, and on whose word. */
export type FileEntry = {
  device: { actor: Actor; deviceId: Id }
  hash: string
  files: Files
  now: number
  by: Id
}

/**
 * Lets the bytes of a quarantined file in, as those of its person: they are verified now, as any file is
 * (PH4). `notFound` when they have not come; else what they were refused for, and they stay where they are.
 */
export async function letFileIn(of: FileEntry): Promise<Result<PhotoRow, HttpProblem>> {
  const { device, hash, files, now, by } = of
  const { shopId } = device.actor
  const item = await asShop(shopId, (tx) => findQuarantined(tx, fileItemId(hash)))
  const bytes = item && (await files.get(keyOf(shopId, hash)))
  if (!bytes) return fail({ kind: 'notFound' })
  const taken = await takePhoto({ device, hash, bytes: Buffer.from(bytes), files, now })
  if (!taken.ok) return taken
  const at = new Date(now).toISOString()
  const word = { opId: fileItemId(hash), decision: 'accepted', reason: null, by, at } as const
  await asShop(shopId, (tx) => decideQuarantine(tx, word))
  return taken
}

/**
 * A file in quarantine for the owner who decides on it: a voice note as it is, a picture as a copy made
 * anew, so that nothing of a stranger's file but its pixels is shown. `notFound`, or why it cannot be shown.
 */
export async function showQuarantined(
  shopId: Id,
  hash: string,
  files: Files,
): Promise<Result<ShownPhoto, HttpProblem>> {
  const item = await asShop(shopId, (tx) => findQuarantined(tx, fileItemId(hash)))
  const held = item && (await files.get(keyOf(shopId, hash)))
  if (!held) return fail({ kind: 'notFound' })
  const bytes = Buffer.from(held)
  const voice = checkVoice(bytes, hash)
  if (voice.ok) return ok({ bytes: held, mime: voice.value })
  const copies = await makeCopies(bytes)
  if (!copies.ok) return copies
  return ok({ bytes: new Uint8Array(copies.value.show), mime: 'image/jpeg' })
}
