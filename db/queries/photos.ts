import type { Id } from '@/lib/model/id'
import type { PhotoRow } from '@/lib/model/photo'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'

const COLUMNS = ['hash', 'jobId', 'bytes', 'mime', 'receivedAt'] as const

/** A photo whose bytes lie verified in the file store. */
export type NewPhoto = {
  hash: string
  jobId: Id
  bytes: number
  mime: PhotoRow['mime']
  receivedAt: Instant
  receivedFrom: Id | null
}

/** Stores the word that a photo came; answers false when it was known. Take a change number (photo) if true. */
export async function insertPhoto(tx: ShopTx, photo: NewPhoto): Promise<boolean> {
  const done = await tx
    .insertInto('photo')
    .values({ shopId: tx.shopId, ...photo })
    .onConflict((on) => on.columns(['shopId', 'hash']).doNothing())
    .executeTakeFirst()
  return done.numInsertedOrUpdatedRows === 1n
}

/** Answers the word on a photo; undefined when its bytes have not come. */
export async function findPhoto(tx: ShopTx, hash: string): Promise<PhotoRow | undefined> {
  return (await photosByHash(tx, [hash]))[0]
}

/** Answers the photos with these hashes that came, in no order. */
export async function photosByHash(tx: ShopTx, hashes: readonly string[]): Promise<PhotoRow[]> {
  if (hashes.length === 0) return []
  return await tx
    .selectFrom('photo')
    .select(COLUMNS)
    .where('shopId', '=', tx.shopId)
    .where('hash', 'in', hashes)
    .execute()
}
