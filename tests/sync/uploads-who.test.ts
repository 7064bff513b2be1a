import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET } from '@/app/api/photos/[hash]/route'
import { PATCH } from '@/app/api/photos/tus/[hash]/route'
import { POST } from '@/app/api/photos/tus/route'
import { RawDevice } from '../support/raw-device'
import { phoneOf, signIn } from '../support/sync-world'
import { at, hashOf, photoBody, said, UploadWorld } from '../support/upload-world'

let up: UploadWorld
beforeAll(async () => {
  up = await UploadWorld.open()
})
afterAll(() => up.world.close())

describe('who sends it', () => {
  it('[PH2] no other person, shop or key can go on with it, ask for it or read it', async () => {
    const bytes = up.another()
    const hash = hashOf(bytes)
    await up.name(photoBody(bytes))
    await up.begin(bytes)
    await up.add(bytes, { offset: 0, length: 20_000 })
    const second = (await phoneOf(up.world.a, 'second')).device
    const stranger = (await phoneOf(up.world.b, 'mechanic')).device
    for (const other of [second, stranger]) {
      expect(said(await up.ask(bytes, other))).toMatchObject({ status: 404, problem: 'notBegun' })
      expect(said(await up.add(bytes, { offset: 20_000, length: 100 }, other))).toMatchObject({
        status: 404,
      })
      expect(said(await up.begin(bytes, other))).toMatchObject({
        status: 409,
        problem: 'entryFirst',
      })
    }
    const forger = new RawDevice(up.device.owner)
    expect(said(await up.ask(bytes, forger))).toMatchObject({
      status: 401,
      problem: 'unknownDevice',
    })
    forger.id = up.device.id
    for (const answer of [
      await up.begin(bytes, forger),
      await up.ask(bytes, forger),
      await up.add(bytes, { offset: 20_000, length: 100 }, forger),
    ]) {
      expect(said(answer)).toMatchObject({ status: 401, problem: 'badSignature' })
    }
    const other = await signIn(up.world.b, 'owner')
    const request = new Request(`http://shop.invalid/api/photos/${hash}`, {
      headers: { cookie: other.cookie },
    })
    expect((await GET(request, at(hash))).status).toBe(404)
    expect(said(await up.ask(bytes)).offset).toBe(20_000)
  })

  it('[PH2] a signature holds for its own act, place, file and chunk alone', async () => {
    const bytes = up.another()
    const hash = hashOf(bytes)
    await up.name(photoBody(bytes))
    await up.begin(bytes)
    const chunk = bytes.subarray(0, 100)
    const twists: Request[] = [
      up.device.chunk(hash, { offset: 0, chunk }, { 'upload-offset': '100' }),
      up.device.chunk(
        hash,
        { offset: 0, chunk },
        up.device.uploadSignature('ask', { hash, at: 0, chunk: '-' }),
      ),
      up.device.chunk(
        hash,
        { offset: 0, chunk },
        {
          'upload-checksum': `sha256 ${createHash('sha256').update('x').digest('base64')}`,
        },
      ),
    ]
    for (const request of twists) {
      expect(said(await PATCH(request, at(hash)))).toMatchObject({
        status: 401,
        problem: 'badSignature',
      })
    }
    const elsewhere = await PATCH(up.device.chunk(hash, { offset: 0, chunk }), at('0'.repeat(64)))
    expect(said(elsewhere)).toMatchObject({ status: 401, problem: 'badSignature' })
    const longer = up.device.beginUpload(hash, bytes.length, { 'upload-length': '9' })
    expect(said(await POST(longer))).toMatchObject({ status: 401 })
  })

  it('[PH2] goes on from another phone of the same person', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes))
    await up.begin(bytes)
    await up.add(bytes, { offset: 0, length: 50_000 })
    const again = (await phoneOf(up.world.a, 'mechanic')).device
    expect(said(await up.begin(bytes, again)).offset).toBe(50_000)
    expect(said(await up.sendAll(bytes, 300_000, again)).stored).toBe(hashOf(bytes))
  })

  it('[P18] reads no byte of a chunk before it knows who sends it', async () => {
    const bytes = up.another()
    let pulled = 0
    const sent = new ReadableStream<Uint8Array>({
      pull(line) {
        pulled += 1
        line.enqueue(new Uint8Array(1024))
      },
    })
    const forger = new RawDevice(up.device.owner)
    const hash = hashOf(bytes)
    const request = forger.chunk(hash, { offset: 0, chunk: bytes.subarray(0, 99), sent })
    expect((await PATCH(request, at(hash))).status).toBe(401)
    expect(pulled).toBeLessThanOrEqual(1)
  })
})
