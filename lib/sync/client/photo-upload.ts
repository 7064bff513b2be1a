import type { SyncPorts } from '@/lib/ports/sync-ports'
import { type Sender, signedHeaders } from './envelope'
import type { PhoneDb, PhotoRecord } from './phone-db'
import { type Reply, readReply } from './reply'

/** The photo that has waited longest; photos wait until no record does (PH3). */
export async function nextPhoto(
  db: PhoneDb,
  held: ReadonlySet<string>,
): Promise<PhotoRecord | undefined> {
  const waiting = await db.photo.where('state').equals('waiting').toArray()
  waiting.sort((a, b) => a.since - b.since)
  return waiting.find((photo) => !held.has(photo.hash))
}

/** Sends the bytes of one photo under its hash; the bytes stay on the phone (PH4). */
export async function sendPhoto(
  ports: SyncPorts,
  sender: Sender,
  photo: Pick<PhotoRecord, 'hash' | 'mime'>,
  bytes: ArrayBuffer,
): Promise<Reply> {
  const body = new Uint8Array(bytes)
  const sent = await ports.network.send({
    method: 'PUT',
    path: `/api/photos/${photo.hash}`,
    headers: { ...(await signedHeaders(sender, '-', body)), 'content-type': photo.mime },
    body,
  })
  return readReply(sent, ports.clock.now())
}

/** Writes what became of a photo; it is never deleted here. */
export async function markPhoto(
  db: PhoneDb,
  hash: string,
  now: Pick<PhotoRecord, 'state' | 'reason'>,
): Promise<void> {
  await db.photo.update(hash, now)
}
