import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { findJob } from '@/db/queries/jobs'
import { findPhotoNaming, type PhotoNaming } from '@/db/queries/photo-entries'
import { findPhoto, insertPhoto } from '@/db/queries/photos'
import { type Id, sha256Hex } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { PhotoRow } from '@/lib/model/photo'
import { fail, ok, type Result } from '@/lib/model/result'
import type { Files } from '@/lib/ports/files'
import { seesJob } from '@/lib/shop/scope'
import { checkPicture, type PictureMime } from './photo-check'
import type { HttpProblem } from './problems'
import { type Claim, readClaim } from './signed-request'

/** Most bytes of one picture, as lib/model/photo.ts says. */
export const MAX_PHOTO_BYTES = 5_000_000

/** Who sent a picture, into which store, and when. */
export type PhotoDelivery = {
  device: { actor: Actor; deviceId: Id }
  hash: string
  bytes: Buffer
  files: Files
  now: number
}

/**
 * The claim of a PUT, from the headers alone: the address names the SHA-256 that was signed, so nobody
 * unknown gets to send a byte. Null when the address or a header is malformed.
 */
export function readPhotoClaim(headers: Headers, hash: string): Claim | null {
  if (!sha256Hex.safeParse(hash).success) return null
  return readClaim(headers, Buffer.from(hash, 'hex').toString('base64url'))
}

/** True when the entry that names the picture says the same of it, as far as it says anything. */
const isAsNamed = (named: PhotoNaming, bytes: Buffer, mime: PictureMime): boolean =>
  (named.bytes === null || named.bytes === bytes.length) &&
  (named.mime === null || named.mime === mime)

/**
 * Verifies and keeps a picture (PH4): the bytes match their hash, are what they say, hold no position,
 * and an entry of the sender names them. Sent twice it is kept once. The file is written before its row,
 * so a row always has its bytes.
 */
export async function takePhoto(with_: PhotoDelivery): Promise<Result<PhotoRow, HttpProblem>> {
  const { device, hash, bytes, files, now } = with_
  const { shopId, personId } = device.actor
  const picture = checkPicture(bytes, hash)
  if (!picture.ok) return picture
  const mime = picture.value
  const { known, named } = await asShop(shopId, async (tx) => ({
    known: await findPhoto(tx, hash),
    named: await findPhotoNaming(tx, { hash, authorId: personId }),
  }))
  if (!named) return fail({ kind: 'entryFirst' })
  if (!isAsNamed(named, bytes, mime)) return fail({ kind: 'wrongPicture' })
  const key = `${shopId}/${hash}`
  if (known && (await files.has(key))) return ok(known)
  await files.put(key, bytes)
  if (known) return ok(known)
  const receivedAt = new Date(now).toISOString()
  const row = { hash, jobId: named.jobId, bytes: bytes.length, mime, receivedAt }
  return await asShop(shopId, async (tx) => {
    const isNew = await insertPhoto(tx, { ...row, receivedFrom: device.deviceId })
    if (!isNew) return ok((await findPhoto(tx, hash)) ?? row)
    await takeChanges(tx, [{ entity: 'photo', id: hash, jobId: named.jobId }])
    return ok(row)
  })
}

/**
 * A picture for a person who may see its job; `notFound` for everybody else, whether it exists or not.
 */
export async function readPhoto(
  actor: Actor,
  hash: string,
  files: Files,
): Promise<Result<{ bytes: Uint8Array<ArrayBuffer>; mime: string }, HttpProblem>> {
  const row = sha256Hex.safeParse(hash).success ? await seenPhoto(actor, hash) : undefined
  const bytes = row ? await files.get(`${actor.shopId}/${hash}`) : null
  return row && bytes ? ok({ bytes, mime: row.mime }) : fail({ kind: 'notFound' })
}

function seenPhoto(actor: Actor, hash: string): Promise<PhotoRow | undefined> {
  return asShop(actor.shopId, async (tx) => {
    const row = await findPhoto(tx, hash)
    const job = row ? await findJob(tx, row.jobId) : undefined
    return job && seesJob(actor, job) ? row : undefined
  })
}
