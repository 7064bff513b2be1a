import {
  fileText,
  MAX_FILE_OPS,
  PHOTO_BYTES_A_FILE,
  UNSENT_FORMAT,
  type UnsentBody,
  type UnsentFile,
} from '@/lib/sync/protocol/unsent-file'
import type { Core } from './core'
import { openOp } from './core'
import { base64, hashOf, type Sender, signText } from './envelope'
import { recordsIn } from './outbox'
import { type LetGoRecord, type OutboxRecord, type PhotoRecord, sealedPhoto } from './phone-db'
import { photoPlace } from './record'
import { openBytes } from './seal'

/**
 * All unsent work as files that a person carries out (P23): every op as it was made, also those let go,
 * and the photos in base64. It works without signal and without a session. Each file is signed by this
 * phone's key, and is open to whoever holds it. There is one; more when the photos do not fit in one.
 */
export async function exportUnsent(core: Core, sender: Sender, at: string): Promise<Blob[]> {
  const { db } = core
  const records = await recordsIn(db, 'waiting', 'blocked', 'stuck')
  const letGo = await db.letGo.toArray()
  const held = [...letGo, ...records].sort((a, b) => a.dseq - b.dseq)
  const photos = await db.photo.where('state').anyOf('waiting', 'stuck').sortBy('since')
  const files: Blob[] = []
  for (const part of parts(held, photos)) files.push(await oneFile(core, sender, { at, ...part }))
  return files
}

type Held = OutboxRecord | LetGoRecord
type Part = { records: Held[]; photos: PhotoRecord[] }

/** Records go in front; photos follow, so many to a file as it holds. */
function parts(records: Held[], photos: PhotoRecord[]): Part[] {
  const found: Part[] = []
  for (let first = 0; first < records.length; first += MAX_FILE_OPS) {
    found.push({ records: records.slice(first, first + MAX_FILE_OPS), photos: [] })
  }
  let bytes = 0
  for (const photo of photos) {
    const last = found.at(-1)
    if (last === undefined || (bytes > 0 && bytes + photo.size > PHOTO_BYTES_A_FILE)) {
      found.push({ records: [], photos: [photo] })
      bytes = photo.size
    } else {
      last.photos.push(photo)
      bytes += photo.size
    }
  }
  return found.length === 0 ? [{ records: [], photos: [] }] : found
}

async function oneFile(core: Core, sender: Sender, of: Part & { at: string }): Promise<Blob> {
  const body: UnsentBody = {
    ops: await Promise.all(of.records.map((record) => exportedOp(core, record))),
    photos: await Promise.all(of.photos.map((photo) => exportedPhoto(core, photo))),
  }
  const words = JSON.stringify(body, null, 1)
  const who = { shop: sender.shopId, person: sender.personId, device: sender.deviceId, at: of.at }
  const signature = await signText(sender, fileText({ ...who, bodyHash: await hashOf(words) }))
  const file: UnsentFile = { format: UNSENT_FORMAT, ...who, body: words, signature }
  return new Blob([JSON.stringify(file, null, 1)], { type: 'application/json' })
}

const exportedOp = async (core: Core, record: Held): Promise<UnsentBody['ops'][number]> => ({
  state: record.state === 'letGo' ? 'letGo' : heldAs(record.state),
  reason: record.reason,
  since: new Date(record.since).toISOString(),
  op: await openOp(core.keys.outbox, record),
})

const heldAs = (state: OutboxRecord['state']) =>
  state === 'stuck' || state === 'blocked' ? state : 'waiting'

async function exportedPhoto(
  core: Core,
  photo: PhotoRecord,
): Promise<UnsentBody['photos'][number]> {
  const { hash, jobId, mime } = photo
  const sealed = await sealedPhoto(core.db, photo)
  const bytes = sealed && (await openBytes(core.keys.store, photoPlace(hash), sealed))
  return {
    hash,
    jobId,
    mime,
    since: new Date(photo.since).toISOString(),
    base64: bytes && base64(new Uint8Array(bytes)),
  }
}
