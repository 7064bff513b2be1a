import { createHash } from 'node:crypto'
import type { PhotoRecord } from '@/lib/sync/client/phone-db'
import type { TestPhone } from './phone'
import { atWork, note } from './phone-world'
import { ShopDouble } from './shop-double'

export const KB = 1024

/** Bytes of a photo, none like another. */
export function bytesOf(size: number, seed = 1): Uint8Array<ArrayBuffer> {
  const bytes = new Uint8Array(size)
  for (let at = 0; at < size; at++) bytes[at] = (at * 31 + seed * 7 + (at >> 8)) & 0xff
  return bytes
}
export const hashOf = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex')
export const bigPhotoOf = (jobId: string, bytes: Uint8Array<ArrayBuffer>) => ({
  hash: hashOf(bytes),
  jobId,
  bytes: bytes.buffer,
  mime: 'image/jpeg' as const,
  thumb: new Uint8Array([9, 9]).buffer,
})
export const photoRecord = (of: TestPhone, hash: string) =>
  of.phone.core.db.photo.get(hash) as Promise<PhotoRecord>

/** A phone with a job and one photo that has not left it. */
export async function withPhoto(size: number, options: Parameters<typeof atWork>[1] = {}) {
  const world = await atWork(new ShopDouble(), options)
  const { shop, phone, machine, job, jobId } = world
  const photo = bigPhotoOf(jobId, bytesOf(size))
  shop.fault = () => ({ noLine: true })
  await phone.record([machine, job, note(phone, jobId, 'With photo')], { photos: [photo] })
  shop.fault = () => null
  return { ...world, photo }
}
export const isWhole = (shop: ShopDouble, photo: { hash: string; bytes: ArrayBuffer }) =>
  Buffer.from(shop.photos.get(photo.hash) ?? []).equals(Buffer.from(photo.bytes))
