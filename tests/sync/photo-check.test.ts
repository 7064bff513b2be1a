import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { checkPicture, pictureMime } from '@/lib/sync/server/photo-check'
import { jpegOf, pngOf, tiffOf, webpOf } from '../support/pictures'

const hashOf = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex')
const check = (bytes: Buffer) => checkPicture(bytes, hashOf(bytes))
const refused = (kind: string) => ({ ok: false, problem: { kind } })

/** Tag 0x8825 is the pointer to the GPS block, tag 0x0112 the orientation: Exif 2.32, CIPA DC-008. */
const GPS = 0x8825
const ORIENTATION = 0x0112

describe('pictures', () => {
  it('[PH4] takes a JPEG, a PNG and a WebP without a position', () => {
    expect(check(jpegOf())).toEqual({ ok: true, value: 'image/jpeg' })
    expect(check(pngOf())).toEqual({ ok: true, value: 'image/png' })
    expect(check(webpOf())).toEqual({ ok: true, value: 'image/webp' })
  })

  it('[PH4] refuses bytes of another hash', () => {
    expect(checkPicture(jpegOf(), hashOf(pngOf()))).toEqual(refused('wrongHash'))
  })

  it('[PH4] refuses what is no picture, whatever it calls itself', () => {
    expect(check(Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'))).toEqual(
      refused('wrongPicture'),
    )
    expect(pictureMime(Buffer.alloc(0))).toBeNull()
    expect(pictureMime(Buffer.from('RIFF....WAVEfmt '))).toBeNull()
  })

  for (const order of ['II', 'MM'] as const) {
    const gps = tiffOf(order, [ORIENTATION, GPS])
    const plain = tiffOf(order, [ORIENTATION])
    it(`[R22] refuses a position in Exif, byte order ${order}, in each format`, () => {
      for (const make of [jpegOf, pngOf, webpOf]) {
        expect(check(make({ exif: gps }))).toEqual(refused('hasPosition'))
        expect(check(make({ exif: plain })).ok).toBe(true)
      }
    })
    it(`[R22] finds a position in the second directory, byte order ${order}`, () => {
      const second = tiffOf(order, [ORIENTATION], [GPS])
      expect(check(jpegOf({ exif: second }))).toEqual(refused('hasPosition'))
    })
  }

  it('[R22] refuses a position in an XMP packet', () => {
    const xmp = '<x:xmpmeta><rdf:Description exif:GPSLatitude="47,6.0N"/></x:xmpmeta>'
    expect(check(jpegOf({ xmp }))).toEqual(refused('hasPosition'))
    expect(check(webpOf({ xmp }))).toEqual(refused('hasPosition'))
  })

  it('[R22] refuses a picture kept behind the first one that holds a position', () => {
    const second = jpegOf({ exif: tiffOf('MM', [GPS]) })
    expect(check(Buffer.concat([jpegOf(), second]))).toEqual(refused('hasPosition'))
  })

  it('[R22] does not lose its way in a broken directory', () => {
    const loop = tiffOf('II', [ORIENTATION])
    loop.writeUInt32LE(8, 8 + 2 + 12)
    expect(check(jpegOf({ exif: loop })).ok).toBe(true)
    expect(check(jpegOf({ exif: loop.subarray(0, 9) })).ok).toBe(true)
  })
})
