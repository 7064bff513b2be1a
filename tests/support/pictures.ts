/** Small real pictures, made byte by byte so that a test can put into them what a phone would not. */
type Parts = { exif?: Buffer; xmp?: string }

/** A TIFF block with one directory per list of tags; each entry is a LONG of value 8. */
export function tiffOf(order: 'II' | 'MM', ...directories: number[][]): Buffer {
  const little = order === 'II'
  const size = (tags: number[]) => 2 + tags.length * 12 + 4
  const out = Buffer.alloc(8 + directories.reduce((sum, tags) => sum + size(tags), 0))
  const u16 = (value: number, at: number) =>
    little ? out.writeUInt16LE(value, at) : out.writeUInt16BE(value, at)
  const u32 = (value: number, at: number) =>
    little ? out.writeUInt32LE(value, at) : out.writeUInt32BE(value, at)
  out.write(order, 0, 'latin1')
  u16(42, 2)
  u32(8, 4)
  let at = 8
  for (const [index, tags] of directories.entries()) {
    u16(tags.length, at)
    for (const [i, tag] of tags.entries()) {
      const entry = at + 2 + i * 12
      u16(tag, entry)
      u16(4, entry + 2)
      u32(1, entry + 4)
      u32(8, entry + 8)
    }
    at += size(tags)
    u32(index + 1 < directories.length ? at : 0, at - 4)
  }
  return out
}

function segment(marker: number, body: Buffer): Buffer {
  const head = Buffer.alloc(4)
  head.writeUInt16BE(0xff00 | marker, 0)
  head.writeUInt16BE(body.length + 2, 2)
  return Buffer.concat([head, body])
}

/** 1 x 1 grey JPEG (ITU-T T.81 baseline), with an Exif or XMP segment when asked. */
export function jpegOf(parts: Parts = {}): Buffer {
  const pieces: Buffer[] = [Buffer.from([0xff, 0xd8])]
  if (parts.exif) pieces.push(segment(0xe1, Buffer.concat([Buffer.from('Exif\0\0'), parts.exif])))
  if (parts.xmp) pieces.push(segment(0xe1, Buffer.from(`packet\0${parts.xmp}`)))
  pieces.push(segment(0xdb, Buffer.concat([Buffer.from([0]), Buffer.alloc(64, 1)])))
  pieces.push(segment(0xc0, Buffer.from([8, 0, 1, 0, 1, 1, 1, 0x11, 0])))
  const oneCode = Buffer.concat([Buffer.from([0, 1]), Buffer.alloc(15), Buffer.from([0])])
  pieces.push(segment(0xc4, oneCode))
  oneCode[0] = 0x10
  pieces.push(segment(0xc4, Buffer.from(oneCode)))
  pieces.push(segment(0xda, Buffer.from([1, 1, 0, 0, 63, 0])))
  pieces.push(Buffer.from([0x3f, 0xff, 0xd9]))
  return Buffer.concat(pieces)
}

function pngChunk(name: string, body: Buffer): Buffer {
  const head = Buffer.alloc(8)
  head.writeUInt32BE(body.length, 0)
  head.write(name, 4, 'latin1')
  // The check sum is not looked at by the code under test; browsers never see these bytes.
  return Buffer.concat([head, body, Buffer.alloc(4)])
}

/** The chunks of a PNG (RFC 2083), with an `eXIf` chunk when asked. */
export function pngOf(parts: Parts = {}): Buffer {
  const pieces: Buffer[] = [Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])]
  pieces.push(pngChunk('IHDR', Buffer.from([0, 0, 0, 1, 0, 0, 0, 1, 8, 0, 0, 0, 0])))
  if (parts.exif) pieces.push(pngChunk('eXIf', parts.exif))
  pieces.push(pngChunk('IEND', Buffer.alloc(0)))
  return Buffer.concat(pieces)
}

function webpChunk(name: string, body: Buffer): Buffer {
  const head = Buffer.alloc(8)
  head.write(name, 0, 'latin1')
  head.writeUInt32LE(body.length, 4)
  return Buffer.concat([head, body, Buffer.alloc(body.length % 2)])
}

/** The chunks of a WebP container, with `EXIF` and `XMP ` chunks when asked. */
export function webpOf(parts: Parts = {}): Buffer {
  const chunks: Buffer[] = [
    webpChunk('VP8X', Buffer.alloc(10)),
    webpChunk('VP8 ', Buffer.alloc(11)),
  ]
  if (parts.exif) chunks.push(webpChunk('EXIF', parts.exif))
  if (parts.xmp) chunks.push(webpChunk('XMP ', Buffer.from(parts.xmp)))
  const body = Buffer.concat([Buffer.from('WEBP'), ...chunks])
  const head = Buffer.alloc(8)
  head.write('RIFF', 0, 'latin1')
  head.writeUInt32LE(body.length, 4)
  return Buffer.concat([head, body])
}
