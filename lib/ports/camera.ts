import type { PhotoRef } from '@/lib/model/photo'
import { fail, ok, type Result } from '@/lib/model/result'
import { plainJpeg } from './jpeg'

/** A photo ready to keep: re-encoded, without position data, known by the SHA-256 of its bytes. */
export type TakenPhoto = Pick<PhotoRef, 'hash' | 'mime' | 'width' | 'height'> & {
  bytes: ArrayBuffer
}

/** `notReadable`: no picture this browser can open. `tooBig`: it could not be made small enough to keep. */
export type CameraProblem = { kind: 'notReadable' | 'tooBig' }

export type Camera = { ready(file: Blob): Promise<Result<TakenPhoto, CameraProblem>> }

const MEGABYTES = 1.6
const LONGEST_EDGE = 2048
const MOST_BYTES = 5_000_000

/** Makes a JPEG of at most about 1.6 MB and 2048 pixels a side from what the camera or a file picker gave. */
export const browserCamera: Camera = {
  async ready(file) {
    let encoded: Blob
    try {
      const { default: compress } = await import('browser-image-compression')
      const source = file instanceof File ? file : new File([file], 'photo', { type: file.type })
      encoded = await compress(source, {
        maxSizeMB: MEGABYTES,
        maxWidthOrHeight: LONGEST_EDGE,
        fileType: 'image/jpeg',
        initialQuality: 0.82,
        preserveExif: false,
        // Its own worker would be fetched from elsewhere.
        useWebWorker: false,
      })
    } catch {
      return fail({ kind: 'notReadable' })
    }
    const plain = plainJpeg(new Uint8Array(await encoded.arrayBuffer()))
    if (!plain.ok) return fail({ kind: 'notReadable' })
    const { bytes, width, height } = plain.value
    if (bytes.byteLength > MOST_BYTES) return fail({ kind: 'tooBig' })
    const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes))
    const hash = Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('')
    return ok({ hash, mime: 'image/jpeg', width, height, bytes: bytes.buffer })
  },
}
