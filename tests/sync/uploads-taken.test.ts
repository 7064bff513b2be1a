import { existsSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { crc32 } from 'node:zlib'
import sharp from 'sharp'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET } from '@/app/api/photos/[hash]/route'
import { PATCH } from '@/app/api/photos/tus/[hash]/route'
import { OPTIONS, POST } from '@/app/api/photos/tus/route'
import type { LogBody } from '@/lib/model/log-entry'
import { MAX_CHUNK_BYTES } from '@/lib/sync/protocol/upload'
import { jpegOf, tiffOf } from '../support/pictures'
import { at, hashOf, photoBody, said, UploadWorld, voiceBody } from '../support/upload-world'
import { webmOf } from '../support/voices'

let up: UploadWorld
beforeAll(async () => {
  up = await UploadWorld.open()
})
afterAll(() => up.world.close())

describe('what is taken', () => {
  const whole = async (bytes: Buffer, body: LogBody) => {
    await up.name(body)
    return said(await up.sendAll(bytes, 800_000))
  }

  it('[PH4] refuses at once what is too big or not as long as the entry says', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes, { bytes: bytes.length + 1 }))
    expect(said(await up.begin(bytes))).toMatchObject({ status: 422, problem: 'wrongPicture' })
    const dash = hashOf(Buffer.from('dash'))
    const context = { module: 0, status: 'active', count: null, order: 1, photo: dash } as const
    await up.name({ kind: 'code', seen: { format: 'spn', spn: 1268, fmi: 3 }, context })
    const big = up.device.beginUpload(dash, 5_000_001)
    expect(said(await POST(big))).toMatchObject({ status: 413, problem: 'tooLarge' })
    const chunk = Buffer.alloc(MAX_CHUNK_BYTES + 1)
    expect(said(await POST(up.device.beginUpload(dash, 5_000_000))).status).toBe(201)
    const long = await PATCH(up.device.chunk(dash, { offset: 0, chunk }), at(dash))
    expect(said(long)).toMatchObject({ status: 413, problem: 'tooLarge' })
  })

  it('[PH4] refuses more bytes than it was begun with', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes))
    await up.begin(bytes)
    const hash = hashOf(bytes)
    const more = Buffer.concat([bytes, Buffer.from('more')])
    const answer = await PATCH(up.device.chunk(hash, { offset: 0, chunk: more }), at(hash))
    expect(said(answer)).toMatchObject({ status: 413, problem: 'tooLarge' })
    expect(said(await up.ask(bytes)).offset).toBe(0)
  })

  it('[R22] refuses a picture that says where it was taken and keeps nothing of it', async () => {
    const bytes = jpegOf({ exif: tiffOf('MM', [0x8825]) })
    expect(await whole(bytes, photoBody(bytes))).toMatchObject({ problem: 'hasPosition' })
    expect(up.stored().filter((key) => key.startsWith(hashOf(bytes)))).toEqual([])
    expect(existsSync(up.stageOf(bytes))).toBe(false)
  })

  it('[PH4] refuses a bomb of pixels and what no picture can be made of', async () => {
    const many = await sharp({
      create: { width: 5000, height: 4000, channels: 3, background: '#fff' },
      limitInputPixels: false,
    })
      .png()
      .toBuffer()
    // The same file, saying in its head (RFC 2083, 4.1.1) that it holds 3,600 million pixels.
    const bomb = Buffer.from(many)
    bomb.writeUInt32BE(60_000, 16)
    bomb.writeUInt32BE(60_000, 20)
    bomb.writeUInt32BE(crc32(bomb.subarray(12, 29)), 29)
    const before = process.memoryUsage().rss
    for (const bytes of [many, bomb]) {
      expect(await whole(bytes, photoBody(bytes, { mime: 'image/png' }))).toMatchObject({
        status: 422,
        problem: 'tooManyPixels',
      })
    }
    expect(process.memoryUsage().rss - before).toBeLessThan(60_000_000)
    const noise = Buffer.concat([Buffer.from([0xff, 0xd8, 0xff]), Buffer.alloc(500, 7)])
    expect(await whole(noise, photoBody(noise))).toMatchObject({ problem: 'wrongPicture' })
  })

  it('[PH4] refuses sound where the entry says picture, and a picture where it says sound', async () => {
    const sound = webmOf({ seconds: 22, noise: 'one' })
    expect(await whole(sound, photoBody(sound))).toMatchObject({ problem: 'wrongPicture' })
    const bytes = up.another()
    expect(await whole(bytes, voiceBody(bytes))).toMatchObject({ problem: 'wrongVoice' })
  })

  it('[R8] keeps a voice note as recorded and plays it by ranges to who may see the job', async () => {
    const sound = webmOf({ seconds: 22, noise: 'two' })
    const hash = hashOf(sound)
    expect(await whole(sound, voiceBody(sound))).toMatchObject({ stored: hash })
    expect(up.stored().filter((key) => key.startsWith(hash))).toEqual([hash])
    const get = (range?: string) =>
      GET(
        new Request(`http://shop.invalid/api/photos/${hash}?size=show`, {
          headers: { cookie: up.cookie, ...(range ? { range } : {}) },
        }),
        at(hash),
      )
    const all = await get()
    expect(all.headers.get('content-type')).toBe('audio/webm')
    expect(Buffer.from(await all.arrayBuffer()).equals(sound)).toBe(true)
    const part = await get('bytes=10-19')
    expect([part.status, part.headers.get('content-range')]).toEqual([
      206,
      `bytes 10-19/${sound.length}`,
    ])
    expect(Buffer.from(await part.arrayBuffer()).equals(sound.subarray(10, 20))).toBe(true)
    expect((await get(`bytes=${sound.length}-`)).status).toBe(416)
  })

  it('[PH4] shows a copy made anew, small and upright, without a byte of metadata', async () => {
    const big = await sharp({
      create: { width: 2048, height: 1024, channels: 3, background: '#884422' },
    })
      .jpeg()
      .withMetadata({ orientation: 6 })
      .toBuffer()
    await whole(big, photoBody(big))
    const get = async (size: string) =>
      Buffer.from(
        await (
          await GET(
            new Request(`http://shop.invalid/api/photos/${hashOf(big)}${size}`, {
              headers: { cookie: up.cookie },
            }),
            at(hashOf(big)),
          )
        ).arrayBuffer(),
      )
    expect((await get('')).equals(big)).toBe(true)
    const show = await sharp(await get('?size=show')).metadata()
    expect([show.width, show.height, show.exif]).toEqual([800, 1600, undefined])
    const thumb = await sharp(await get('?size=thumb')).metadata()
    expect([thumb.width, thumb.height]).toEqual([160, 320])
    // Of a picture that came before copies were made, they are made when first asked for.
    for (const size of ['show', 'thumb'])
      rmSync(join(up.world.filesDir, up.world.a.id, `${hashOf(big)}.${size}`))
    expect((await sharp(await get('?size=thumb')).metadata()).height).toBe(320)
  })

  it('[PH2] speaks tus 1.0.0 and says so', async () => {
    const abilities = OPTIONS()
    expect(abilities.headers.get('tus-extension')).toBe('creation,expiration,checksum')
    const bytes = up.another()
    const old = up.device.beginUpload(hashOf(bytes), bytes.length, { 'tus-resumable': '0.2.2' })
    expect(said(await POST(old))).toMatchObject({ status: 412, problem: 'wrongVersion' })
    for (const twist of [
      { 'upload-metadata': 'name YQ==' },
      { 'upload-length': '-4' },
      { 'upload-length': '1e3' },
    ]) {
      const crooked = up.device.beginUpload(
        hashOf(bytes),
        bytes.length,
        twist as Record<string, string>,
      )
      expect(said(await POST(crooked)).status).toBe(400)
    }
  })
})
