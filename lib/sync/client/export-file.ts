import type { Core } from './core'
import { openOp } from './core'
import { base64 } from './envelope'
import type { OutboxRecord, PhotoRecord } from './phone-db'
import { photoPlace } from './record'
import { openBytes } from './seal'

/** What an exported file says it is. */
const EXPORT_FORMAT = 'farbench-unsent-1'

/**
 * All unsent work as one JSON file (P23): every op as it was made, and the photos in base64. It works
 * without signal and without a session. The file is open to whoever holds it.
 */
export async function exportUnsent(
  core: Core,
  who: { shopId: string; personId: string; deviceId: string; at: string },
): Promise<Blob> {
  const { db } = core
  const records = await db.outbox.where('state').anyOf('waiting', 'blocked', 'stuck').sortBy('dseq')
  const photos = await db.photo.where('state').anyOf('waiting', 'stuck').toArray()
  const file = {
    format: EXPORT_FORMAT,
    ...who,
    ops: await Promise.all(records.map((record) => exportedOp(core, record))),
    photos: await Promise.all(photos.map((photo) => exportedPhoto(core, photo))),
  }
  return new Blob([JSON.stringify(file, null, 1)], { type: 'application/json' })
}

const exportedOp = async (core: Core, record: OutboxRecord) => ({
  state: record.state,
  reason: record.reason,
  since: new Date(record.since).toISOString(),
  op: await openOp(core.keys.outbox, record),
})

const exportedPhoto = async (core: Core, photo: PhotoRecord) => ({
  hash: photo.hash,
  jobId: photo.jobId,
  mime: photo.mime,
  since: new Date(photo.since).toISOString(),
  base64: base64(
    new Uint8Array(await openBytes(core.keys.store, photoPlace(photo.hash), photo.bytes)),
  ),
})
