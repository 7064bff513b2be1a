import type { PhoneDb, PhotoRecord } from './phone-db'

/** The shop has confirmed the hash: the bytes go, what is told of the photo and its small copy stay (PH4). */
export function markStored(
  { db, step }: { db: PhoneDb; step(name: string): void },
  photo: PhotoRecord,
  nowMs: number,
): Promise<void> {
  return db.transaction('rw', [db.photo, db.photoBytes], async () => {
    await db.photo.update(photo.hash, {
      state: 'sent',
      reason: null,
      uploaded: photo.size,
      sentAt: nowMs,
      bytes: null,
    })
    step('photoMarked')
    await db.photoBytes.delete(photo.hash)
    step('photoPutAway')
  })
}

/**
 * Photos confirmed after `sinceMs` by the shop's clock, to be offered again to a shop restored from a backup (P12): it finds
 * them in its store by their hash and needs no byte.
 */
export async function photosToOffer(db: PhoneDb, sinceMs: number): Promise<PhotoRecord[]> {
  const sent = await db.photo.where('state').equals('sent').toArray()
  return sent
    .filter((photo) => (photo.sentAt ?? 0) >= sinceMs)
    .map((photo) => ({ ...photo, state: 'waiting', reason: null, uploaded: null }))
}

/** Lets go of small copies the shop can show again, to make room; answers whether there were any. */
export async function dropSentThumbs(db: PhoneDb): Promise<boolean> {
  const count = await db.photo
    .where('state')
    .equals('sent')
    .filter((photo) => (photo.thumb ?? null) !== null)
    .modify({ thumb: null })
  return count > 0
}
