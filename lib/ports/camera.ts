import type { PhotoRef } from '@/lib/model/photo'
import { fail, ok, type Result } from '@/lib/model/result'
import { plainJpeg } from './jpeg'

/** A photo ready to keep: re-encoded, without position data, known by the SHA-256 of its bytes. */
export type TakenPhoto = Pick<PhotoRef, 'hash' | 'mime' | 'width' | 'height'> & {
  bytes: ArrayBuffer
  /** A small copy that stays on the phone after the bytes went to the shop. */
  thumb: ArrayBuffer
}

/** `notReadable`: no picture this browser can open. `tooBig`: it could not be made small enough to keep. */
export type CameraProblem = { kind: 'notReadable' | 'tooBig' }

export type Camera = { ready(file: Blob): Promise<Result<TakenPhoto, CameraProblem>> }

const MEGABYTES = 1.6
const LONGEST_EDGE = 2048
const MOST_BYTES = 5_000_000

/** Longest edge and weight of the small copy that stays on the phone (choices). */
const THUMB_EDGE = 320
const THUMB_MEGABYTES = 0.03

/** Makes a JPEG of at most about 1.6 MB and 2048 pixels a side from what the camera or a file picker gave. */
export const browserCamera: Camera = {
  async ready(file) {
    const source = file instanceof File ? file : new File([file], 'photo', { type: file.type })
    const whole = await jpegOf(source, { edge: LONGEST_EDGE, megabytes: MEGABYTES, quality: 0.82 })
    if (whole === null) return fail({ kind: 'notReadable' })
    const { bytes, width, height } = whole
    if (bytes.byteLength > MOST_BYTES) return fail({ kind: 'tooBig' })
    const small = new File([bytes], 'small', { type: 'image/jpeg' })
    const size = { edge: THUMB_EDGE, megabytes: THUMB_MEGABYTES, quality: 0.7 }
    const thumb = await jpegOf(small, size)
    if (thumb === null) return fail({ kind: 'notReadable' })
    const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes))
    const hash = Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('')
    const shown = { hash, mime: 'image/jpeg', width, height } as const
    return ok({ ...shown, bytes: bytes.buffer, thumb: thumb.bytes.buffer })
  },
}

/** The picture as a JPEG without Exif and comments; null when this browser cannot open it. */
async function jpegOf(file: File, to: { edge: number; megabytes: number; quality: number }) {
  let encoded: Blob
  try {
    const { default: compress } = await import('browser-image-compression')
    encoded = await compress(file, {
      maxSizeMB: to.megabytes,
      maxWidthOrHeight: to.edge,
      fileType: 'image/jpeg',
      initialQuality: to.quality,
      preserveExif: false,
      // Its own worker would be fetched from elsewhere.
      useWebWorker: false,
    })
  } catch {
    return null
  }
  const plain = plainJpeg(new Uint8Array(await encoded.arrayBuffer()))
  return plain.ok ? plain.value : null
}
