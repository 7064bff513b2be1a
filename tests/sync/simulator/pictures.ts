import { createHash } from 'node:crypto'
import type { PhotoRef } from '@/lib/model/photo'
import { jpegOf } from '../../support/pictures'

/** A small real picture that no other is like: its number stands in a comment segment (ITU-T T.81, B.2.4.5). */
export function pictureOf(number: string): { bytes: ArrayBuffer; hash: string; ref: PhotoRef } {
  const plain = jpegOf()
  const words = Buffer.from(number)
  const head = Buffer.from([0xff, 0xfe, 0, words.length + 2])
  const bytes = Buffer.concat([plain.subarray(0, 2), head, words, plain.subarray(2)])
  const hash = createHash('sha256').update(bytes).digest('hex')
  const ref = { hash, bytes: bytes.length, mime: 'image/jpeg', width: 1, height: 1 } as const
  return { bytes: Uint8Array.from(bytes).buffer, hash, ref }
}
