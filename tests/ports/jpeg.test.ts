import { describe, expect, test } from 'vitest'
import { plainJpeg } from '@/lib/ports/jpeg'
import { jpegOf, tiffOf } from '../support/pictures'

const bytesOf = (parts: Parameters<typeof jpegOf>[0]) => new Uint8Array(jpegOf(parts))

describe('[R22] a photo leaves without saying where it was taken (ISO/IEC 10918-1, annex B)', () => {
  test('Exif and XMP are gone, the picture is byte for byte the same', () => {
    const bare = jpegOf()
    const told = bytesOf({ exif: tiffOf('II', [0x8825]), xmp: 'exif:GPSLatitude="61,30N"' })
    expect(Buffer.from(told).includes('Exif')).toBe(true)
    const plain = plainJpeg(told)
    if (!plain.ok) throw new Error('not read')
    expect(Buffer.from(plain.value.bytes)).toEqual(bare)
    expect(plain.value).toMatchObject({ width: 1, height: 1 })
  })

  test('what stands behind the picture is left out', () => {
    const trailer = Buffer.concat([jpegOf(), jpegOf({ exif: tiffOf('MM', [0x8825]) })])
    const plain = plainJpeg(new Uint8Array(trailer))
    if (!plain.ok) throw new Error('not read')
    expect(Buffer.from(plain.value.bytes)).toEqual(jpegOf())
  })

  test.each([
    ['nothing', new Uint8Array()],
    ['a PNG', new Uint8Array([0x89, 0x50, 0x4e, 0x47])],
    ['a cut header', bytesOf({}).subarray(0, 30)],
    ['a segment longer than the file', new Uint8Array([0xff, 0xd8, 0xff, 0xe0, 0xff, 0xff, 0])],
  ])('%s is refused', (_words, file) => {
    expect(plainJpeg(file)).toEqual({ ok: false, problem: { kind: 'notJpeg' } })
  })
})
