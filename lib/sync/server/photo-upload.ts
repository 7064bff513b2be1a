import { createHash } from 'node:crypto'
import { asShop } from '@/db/client'
import { enqueueWork } from '@/db/queries/work'
import { fail, ok, type Result } from '@/lib/model/result'
import {
  addStaged,
  beginStaged,
  dropStaged,
  findStaged,
  readStaged,
  STAGE_MS,
  type StageOwner,
} from './photo-stage'
import { isStored, lookUpPhoto, MAX_PHOTO_BYTES, type PhotoDelivery, takePhoto } from './photos'
import type { HttpProblem } from './problems'
import { isInQuarantine, keepFile, type QuarantineFile } from './quarantine-files'

/**
 * Uploads that go on where they stood (PH2). An upload is of one person in one shop and of one hash: the
 * device may change in between, the person and the file may not.
 */
export type Upload = Omit<PhotoDelivery, 'bytes'> & {
  /** Set for a phone that may not write any more: its files go into quarantine (Q3). */
  quarantine?: QuarantineFile | null
}

/** Where an upload stands; `stored` when the shop has the whole file verified. */
export type Standing = { offset: number; size: number; stored: boolean; expiresAt: number | null }

const DAY_MS = 24 * 3600 * 1000

const ownerOf = ({ device, hash }: Upload): StageOwner => ({
  shopId: device.actor.shopId,
  personId: device.actor.personId,
  hash,
})

const stored = (size: number): Standing => ({ offset: size, size, stored: true, expiresAt: null })

/**
 * Begins an upload of `size` bytes, or answers where the one under way stands; nothing needs sending when
 * the shop has the file. `entryFirst` until the entry that names it has come, `wrongPicture` or
 * `wrongVoice` when that says another size, `tooLarge` past the most we take.
 */
export async function beginUpload(
  upload: Upload,
  size: number,
): Promise<Result<Standing, HttpProblem>> {
  if (upload.quarantine) return await beginApart(upload, size, upload.quarantine)
  const { known, named } = await lookUpPhoto(upload.device.actor, upload.hash)
  if (!named) return fail({ kind: 'entryFirst' })
  if (size > MAX_PHOTO_BYTES) return fail({ kind: 'tooLarge' })
  if (named.bytes !== null && named.bytes !== size) {
    return fail({ kind: named.is === 'voice' ? 'wrongVoice' : 'wrongPicture' })
  }
  if (await isStored(upload, known)) return ok(stored(size))
  return await stage(upload, size)
}

/** As beginUpload, into quarantine: what it is, is looked at when the owner lets it in. */
async function beginApart(
  upload: Upload,
  size: number,
  quarantine: QuarantineFile,
): Promise<Result<Standing, HttpProblem>> {
  if (size > MAX_PHOTO_BYTES) return fail({ kind: 'tooLarge' })
  const held = await isInQuarantine({ ...upload, ...quarantine })
  if (held === 'notNamed') return fail({ kind: 'entryFirst' })
  return held === 'here' ? ok(stored(size)) : await stage(upload, size)
}

async function stage(upload: Upload, size: number): Promise<Result<Standing, HttpProblem>> {
  const owner = ownerOf(upload)
  const held = await findStaged(owner)
  if (held.ok && held.value.size === size) return await standing(upload, held.value)
  await beginStaged(owner, size)
  await planSweep(upload)
  const expiresAt = upload.now + STAGE_MS
  return ok({ offset: 0, size, stored: false, expiresAt })
}

/** Where the upload stands; `notBegun` or `gone` when there is none. */
export async function askUpload(upload: Upload): Promise<Result<Standing, HttpProblem>> {
  if (upload.quarantine) {
    const held = await findStaged(ownerOf(upload))
    return held.ok ? ok({ ...held.value, stored: false, expiresAt: null }) : held
  }
  const { known, named } = await lookUpPhoto(upload.device.actor, upload.hash)
  if (known && named && (await isStored(upload, known))) return ok(stored(known.bytes))
  const held = await findStaged(ownerOf(upload))
  return held.ok ? ok({ ...held.value, stored: false, expiresAt: null }) : held
}

/**
 * Adds a chunk at its offset. With the last byte the whole is verified and stored; what will never be
 * taken is dropped and its reason answered, what could not be stored now stays staged.
 */
export async function addChunk(
  upload: Upload,
  at: { offset: number; chunk: Buffer; sum: string },
): Promise<Result<Standing, HttpProblem>> {
  const { offset, chunk } = at
  if (createHash('sha256').update(chunk).digest('base64') !== at.sum) {
    return fail({ kind: 'wrongChunk' })
  }
  const owner = ownerOf(upload)
  const held = await findStaged(owner)
  if (!held.ok) return held
  const { size } = held.value
  if (held.value.offset !== offset) return fail({ kind: 'wrongOffset' })
  if (offset + chunk.length > size) return fail({ kind: 'tooLarge' })
  if (chunk.length === 0) return await standing(upload, held.value)
  const added = await addStaged(owner, { offset, chunk })
  return added.ok ? await standing(upload, { offset: added.value, size }) : added
}

/** Stores what is whole. */
async function standing(
  upload: Upload,
  { offset, size }: { offset: number; size: number },
): Promise<Result<Standing, HttpProblem>> {
  if (offset < size) return ok({ offset, size, stored: false, expiresAt: null })
  const owner = ownerOf(upload)
  const bytes = await readStaged(owner)
  if (bytes === null) return fail({ kind: 'notBegun' })
  const { quarantine } = upload
  const taken = quarantine
    ? await keepFile({ ...upload, ...quarantine, bytes })
    : await takePhoto({ ...upload, bytes })
  if (taken.ok || taken.problem.kind !== 'entryFirst') await dropStaged(owner)
  return taken.ok ? ok(stored(size)) : taken
}

/** One sweep of the stage a day and shop, after the uploads begun today have run out. */
async function planSweep({ device, now }: Upload): Promise<void> {
  const day = Math.ceil((now + STAGE_MS) / DAY_MS) * DAY_MS
  const runAt = new Date(day).toISOString()
  await asShop(device.actor.shopId, (tx) =>
    enqueueWork(tx, { task: 'dropStaged', payload: {}, key: `stage:${runAt.slice(0, 10)}`, runAt }),
  )
}
