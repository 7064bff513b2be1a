import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { findLeadJob } from '@/db/queries/jobs'
import { findPhotoNaming, type PhotoNaming } from '@/db/queries/photo-entries'
import { findPhoto, insertPhoto } from '@/db/queries/photos'
import { type Id, sha256Hex } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { PhotoRow } from '@/lib/model/photo'
import { fail, ok, type Result } from '@/lib/model/result'
import type { Files } from '@/lib/ports/files'
import { seesJob } from '@/lib/shop/scope'
import { checkVoice } from './media-voice'
import { checkPicture } from './photo-check'
import { type Copies, type CopySize, makeCopies } from './photo-copies'
import type { HttpProblem } from './problems'
import { type Claim, readClaim } from './signed-request'

/** Most bytes of one picture, as lib/model/photo.ts says; voice notes are smaller. */
export const MAX_PHOTO_BYTES = 5_000_000

/** Who sent a photo or a voice note, into which store, and when. */
export type PhotoDelivery = {
  device: { actor: Actor; deviceId: Id }
  hash: string
  bytes: Buffer
  files: Files
  now: number
}

const COPY_MIME = 'image/jpeg'
const keyOf = (shopId: Id, hash: string) => `${shopId}/${hash}`
const copyKey = (shopId: Id, hash: string, size: CopySize) => `${keyOf(shopId, hash)}.${size}`

/**
 * The claim of a PUT, from the headers alone: the address names the SHA-256 that was signed, so nobody
 * unknown gets to send a byte. Null when the address or a header is malformed.
 */
export function readPhotoClaim(headers: Headers, hash: string): Claim | null {
  if (!sha256Hex.safeParse(hash).success) return null
  return readClaim(headers, Buffer.from(hash, 'hex').toString('base64url'))
}

/** What the shop knows of a file before its bytes come: its row, and the sender's entry that names it. */
export async function lookUpPhoto(
  actor: Actor,
  hash: string,
): Promise<{ known: PhotoRow | undefined; named: PhotoNaming | undefined }> {
  return await asShop(actor.shopId, async (tx) => ({
    known: await findPhoto(tx, hash),
    named: await findPhotoNaming(tx, { hash, authorId: actor.personId }),
  }))
}

type Checked = { mime: string; copies: Copies | null }

/** The bytes against their hash and what the entry says of them; with the copies of a picture. */
async function check(
  bytes: Buffer,
  hash: string,
  named: PhotoNaming,
): Promise<Result<Checked, HttpProblem>> {
  const isVoice = named.is === 'voice'
  const seen = isVoice ? checkVoice(bytes, hash) : checkPicture(bytes, hash)
  if (!seen.ok) return seen
  const mime: string = seen.value
  const isAsNamed =
    (named.bytes === null || named.bytes === bytes.length) &&
    (named.mime === null || named.mime === mime)
  if (!isAsNamed) return fail({ kind: isVoice ? 'wrongVoice' : 'wrongPicture' })
  if (isVoice) return ok({ mime, copies: null })
  const copies = await makeCopies(bytes)
  return copies.ok ? ok({ mime, copies: copies.value }) : copies
}

/**
 * Verifies and keeps a photo or a voice note (PH4): the bytes match their hash, are what an entry of the
 * sender says they are, and hold no position. Sent twice it is kept once. Original and copies are stored
 * before the row, so a row always has its bytes. Throws AppError `filesAway` when the store is away.
 */
export async function takePhoto(with_: PhotoDelivery): Promise<Result<PhotoRow, HttpProblem>> {
  const { device, hash, bytes, files, now } = with_
  const { shopId } = device.actor
  const { known, named } = await lookUpPhoto(device.actor, hash)
  if (!named) return fail({ kind: 'entryFirst' })
  const checked = await check(bytes, hash, named)
  if (!checked.ok) return checked
  const { mime, copies } = checked.value
  if (known && (await files.has(keyOf(shopId, hash)))) return ok(known)
  if (copies) await keepCopies(files, { shopId, hash, copies })
  await files.put(keyOf(shopId, hash), bytes, mime)
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

async function keepCopies(
  files: Files,
  { shopId, hash, copies }: { shopId: Id; hash: string; copies: Copies },
): Promise<void> {
  await files.put(copyKey(shopId, hash, 'show'), copies.show, COPY_MIME)
  await files.put(copyKey(shopId, hash, 'thumb'), copies.thumb, COPY_MIME)
}

/**
 * True when the whole file lies in the store. After a restored backup its row may be gone: then it is
 * verified again and its row written anew, without a byte from the phone.
 */
export async function isStored(
  delivery: Omit<PhotoDelivery, 'bytes'>,
  known: PhotoRow | undefined,
): Promise<boolean> {
  const key = keyOf(delivery.device.actor.shopId, delivery.hash)
  if (known) return await delivery.files.has(key)
  const bytes = await delivery.files.get(key)
  return bytes !== null && (await takePhoto({ ...delivery, bytes: Buffer.from(bytes) })).ok
}

/** A file as it is shown. */
export type ShownPhoto = { bytes: Uint8Array<ArrayBuffer>; mime: string }

/**
 * A photo, a copy of it in `size`, or a voice note (which has no copies), for a person who may see its
 * job; `notFound` for everybody else, whether it exists or not.
 */
export async function readPhoto(
  actor: Actor,
  wanted: { hash: string; size: CopySize | 'original' },
  files: Files,
): Promise<Result<ShownPhoto, HttpProblem>> {
  const { hash, size } = wanted
  const row = sha256Hex.safeParse(hash).success ? await seenPhoto(actor, hash) : undefined
  if (!row) return fail({ kind: 'notFound' })
  const isCopy = size !== 'original' && row.mime.startsWith('image/')
  const bytes = isCopy
    ? await readCopy(files, { shopId: actor.shopId, hash, size })
    : await files.get(keyOf(actor.shopId, hash))
  return bytes ? ok({ bytes, mime: isCopy ? COPY_MIME : row.mime }) : fail({ kind: 'notFound' })
}

/** The copy; of a picture that came before copies were made, it is made now. */
async function readCopy(
  files: Files,
  of: { shopId: Id; hash: string; size: CopySize },
): Promise<Uint8Array<ArrayBuffer> | null> {
  const { shopId, hash, size } = of
  const held = await files.get(copyKey(shopId, hash, size))
  if (held) return held
  const original = await files.get(keyOf(shopId, hash))
  const copies = original && (await makeCopies(Buffer.from(original)))
  if (!copies?.ok) return null
  await keepCopies(files, { shopId, hash, copies: copies.value })
  return new Uint8Array(copies.value[size])
}

function seenPhoto(actor: Actor, hash: string): Promise<PhotoRow | undefined> {
  return asShop(actor.shopId, async (tx) => {
    const row = await findPhoto(tx, hash)
    const job = row ? await findLeadJob(tx, row.jobId) : undefined
    return job && seesJob(actor, job) ? row : undefined
  })
}
