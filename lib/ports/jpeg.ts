import { fail, ok, type Result } from '@/lib/model/result'

/**
 * What we need of a JPEG file (ISO/IEC 10918-1, annex B): its size, and the file without the segments
 * that can tell where it was taken. The picture itself is left byte for byte.
 */
export type JpegProblem = { kind: 'notJpeg' }

const SOI = 0xd8
const SOS = 0xda
const EOI = 0xd9
const COM = 0xfe
/** APP0 (JFIF), APP2 (colour profile) and APP14 (colour transform) say how to draw; other APPn are dropped. */
const KEPT_APP = new Set([0xe0, 0xe2, 0xee])
/** Start-of-frame markers: C0 to CF without C4 (tables), C8 (reserved) and CC (tables). */
const isFrame = (marker: number) =>
  marker >= 0xc0 && marker <= 0xcf && marker !== 0xc4 && marker !== 0xc8 && marker !== 0xcc
const isDropped = (marker: number) =>
  marker === COM || (marker >= 0xe0 && marker <= 0xef && !KEPT_APP.has(marker))

type Segment = { marker: number; from: number; to: number }

/** The file without Exif, XMP, IPTC and comments, and its width and height in pixels. */
export function plainJpeg(
  file: Uint8Array,
): Result<{ bytes: Uint8Array<ArrayBuffer>; width: number; height: number }, JpegProblem> {
  const segments = headerSegments(file)
  if (segments === null) return fail({ kind: 'notJpeg' })
  const frame = segments.find((segment) => isFrame(segment.marker))
  const scan = segments.at(-1)
  if (frame === undefined || scan?.marker !== SOS || frame.to - frame.from < 9) {
    return fail({ kind: 'notJpeg' })
  }
  const kept = segments.filter((segment) => !isDropped(segment.marker) && segment !== scan)
  const parts = [
    file.subarray(0, 2),
    ...kept.map((segment) => file.subarray(segment.from, segment.to)),
    file.subarray(scan.from, pictureEnd(file, scan.to)),
  ]
  return ok({
    bytes: joined(parts),
    height: word(file, frame.from + 5),
    width: word(file, frame.from + 7),
  })
}

/** Segments after SOI up to and with the first SOS; null when the file is not a whole JPEG header. */
function headerSegments(file: Uint8Array): Segment[] | null {
  if (file[0] !== 0xff || file[1] !== SOI) return null
  const segments: Segment[] = []
  let at = 2
  while (at + 4 <= file.length) {
    if (file[at] !== 0xff) return null
    const marker = file[at + 1] ?? 0
    if (marker === 0xff) {
      at += 1
      continue
    }
    const to = at + 2 + word(file, at + 2)
    if (to > file.length) return null
    segments.push({ marker, from: at, to })
    if (marker === SOS) return segments
    at = to
  }
  return null
}

/** End of the picture: behind its EOI. Bytes after it (other pictures, trailers) are left out. */
function pictureEnd(file: Uint8Array, from: number): number {
  let at = from
  while (at + 1 < file.length) {
    const marker = file[at] === 0xff ? (file[at + 1] ?? 0) : 0
    if (marker === EOI) return at + 2
    // Stuffed bytes, fill bytes and restart markers belong to the scan; tables between scans have a length.
    const inScan = marker === 0 || marker === 0xff || (marker >= 0xd0 && marker <= 0xd7)
    at += inScan ? 1 : 2 + word(file, at + 2)
  }
  return file.length
}

const word = (file: Uint8Array, at: number) => ((file[at] ?? 0) << 8) | (file[at + 1] ?? 0)

function joined(parts: Uint8Array[]): Uint8Array<ArrayBuffer> {
  const whole = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0))
  let at = 0
  for (const part of parts) {
    whole.set(part, at)
    at += part.length
  }
  return whole
}
