import { createHash } from 'node:crypto'
import { fail, ok, type Result } from '@/lib/model/result'
import type { HttpProblem } from './problems'

/**
 * Looks at the bytes of a picture before they are kept (PH4, R22): SHA-256, magic bytes, and that no
 * position is left in them. Positions are looked for where the formats keep them: the GPS block of Exif
 * (tag 0x8825 of Exif 2.32, CIPA DC-008) in every Exif block of a JPEG, the `eXIf` chunk of a PNG and
 * the `EXIF` chunk of a WebP, and the words of an XMP packet (ISO 16684-1) anywhere. Packed text chunks
 * of a PNG are refused unread. Bytes are never changed.
 */
export type PictureMime = 'image/jpeg' | 'image/png' | 'image/webp'

const GPS_TAG = 0x8825
const PNG_MAGIC = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])
const EXIF_HEAD = Buffer.from('Exif\0\0', 'latin1')
const XMP_WORDS = ['exif:GPS', 'GPSLatitude', 'GPSLongitude']

/** The kind of picture by its first bytes, or null. */
export function pictureMime(bytes: Buffer): PictureMime | null {
  if (bytes.length > 3 && bytes[0] === 0xff && bytes[1] === 0xd8 && bytes[2] === 0xff) {
    return 'image/jpeg'
  }
  if (bytes.subarray(0, 8).equals(PNG_MAGIC)) return 'image/png'
  const riff = bytes.subarray(0, 4).toString('latin1') === 'RIFF'
  return riff && bytes.subarray(8, 12).toString('latin1') === 'WEBP' ? 'image/webp' : null
}

/** True when a TIFF block (as in Exif) names a GPS block in any directory of its chain. */
function tiffHasGps(tiff: Buffer): boolean {
  if (tiff.length < 8) return false
  const little = tiff.subarray(0, 2).toString('latin1') === 'II'
  const u16 = (at: number) => (little ? tiff.readUInt16LE(at) : tiff.readUInt16BE(at))
  const u32 = (at: number) => (little ? tiff.readUInt32LE(at) : tiff.readUInt32BE(at))
  let directory = u32(4)
  for (let hops = 0; hops < 8 && directory > 0 && directory + 2 <= tiff.length; hops++) {
    const count = u16(directory)
    for (let i = 0; i < count; i++) {
      const entry = directory + 2 + i * 12
      if (entry + 12 > tiff.length) return false
      if (u16(entry) === GPS_TAG) return true
    }
    const next = directory + 2 + count * 12
    directory = next + 4 <= tiff.length ? u32(next) : 0
  }
  return false
}

function exifHasGps(block: Buffer): boolean {
  const tiff = block.subarray(0, 6).equals(EXIF_HEAD) ? block.subarray(6) : block
  return tiffHasGps(tiff)
}

/** Every Exif block of the file, also those of pictures kept behind the first one. */
function jpegHasGps(bytes: Buffer): boolean {
  let at = bytes.indexOf(EXIF_HEAD)
  while (at !== -1) {
    if (tiffHasGps(bytes.subarray(at + EXIF_HEAD.length))) return true
    at = bytes.indexOf(EXIF_HEAD, at + EXIF_HEAD.length)
  }
  return false
}

function pngHasGps(bytes: Buffer): boolean {
  let at = 8
  while (at + 8 <= bytes.length) {
    const length = bytes.readUInt32BE(at)
    const name = bytes.subarray(at + 4, at + 8).toString('latin1')
    const block = bytes.subarray(at + 8, at + 8 + length)
    if (name === 'eXIf' && exifHasGps(block)) return true
    // A text that may be packed is not looked into: a phone's canvas never writes one.
    if (name === 'zTXt' || name === 'iTXt') return true
    if (name === 'IEND') return false
    at += 12 + length
  }
  return false
}

function webpHasGps(bytes: Buffer): boolean {
  let at = 12
  while (at + 8 <= bytes.length) {
    const name = bytes.subarray(at, at + 4).toString('latin1')
    const length = bytes.readUInt32LE(at + 4)
    const block = bytes.subarray(at + 8, at + 8 + length)
    if (name === 'EXIF' && exifHasGps(block)) return true
    at += 8 + length + (length % 2)
  }
  return false
}

const HAS_GPS = { 'image/jpeg': jpegHasGps, 'image/png': pngHasGps, 'image/webp': webpHasGps }

/** True when the picture still says where it was taken. */
const hasPosition = (bytes: Buffer, mime: PictureMime): boolean =>
  XMP_WORDS.some((word) => bytes.includes(word)) || HAS_GPS[mime](bytes)

/**
 * Answers the picture's kind when its bytes match `hash` (lower-case hex), are a picture and hold no
 * position; else `wrongHash`, `wrongPicture` or `hasPosition`.
 */
export function checkPicture(bytes: Buffer, hash: string): Result<PictureMime, HttpProblem> {
  if (createHash('sha256').update(bytes).digest('hex') !== hash) return fail({ kind: 'wrongHash' })
  const mime = pictureMime(bytes)
  if (!mime) return fail({ kind: 'wrongPicture' })
  return hasPosition(bytes, mime) ? fail({ kind: 'hasPosition' }) : ok(mime)
}
