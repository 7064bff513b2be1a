import { createHash } from 'node:crypto'
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET, POST, PUT } from '@/app/api/photos/[hash]/route'
import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { assignJob } from '@/db/queries/jobs'
import { findPhoto } from '@/db/queries/photos'
import type { LogBody } from '@/lib/model/log-entry'
import { jobOpen, logAdd, note } from '../support/field-ops'
import { jpegOf, pngOf, tiffOf } from '../support/pictures'
import { RawDevice } from '../support/raw-device'
import {
  openSyncWorld,
  phoneOf,
  problemOf,
  pullAll,
  type SyncWorld,
  signIn,
  sync,
} from '../support/sync-world'

let world: SyncWorld
let device: RawDevice
let cookie: string
let job: string
beforeAll(async () => {
  world = await openSyncWorld()
  const phone = await phoneOf(world.a, 'mechanic')
  device = phone.device
  cookie = phone.cookie
  const opening = jobOpen(world.a.machineId)
  job = opening.fields.id
  await sync(device, [device.op(opening)])
})
afterAll(() => world.close())

const hashOf = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex')
/** A picture unlike any other: what stands behind the end of a JPEG changes its hash and nothing else. */
let count = 0
const picture = () => Buffer.concat([jpegOf(), Buffer.from(`picture ${++count}`)])
const photoBody = (bytes: Buffer, mime: 'image/jpeg' | 'image/png' = 'image/jpeg'): LogBody => ({
  kind: 'photo',
  photo: { hash: hashOf(bytes), bytes: bytes.length, mime, width: 1, height: 1 },
  caption: null,
})
const put = (bytes: Buffer, hash = hashOf(bytes), from = device) =>
  PUT(from.photo(bytes, hash), { params: Promise.resolve({ hash }) })
const get = (hash: string, its: string | null) =>
  GET(
    new Request(`http://shop.invalid/api/photos/${hash}`, { headers: its ? { cookie: its } : {} }),
    {
      params: Promise.resolve({ hash }),
    },
  )
/** Sends the entry that names the picture. */
const name = (bytes: Buffer, body = photoBody(bytes), from = device, jobId = job) =>
  sync(from, [from.op(logAdd(from, jobId, body))])
const files = () => readdirSync(join(world.filesDir, world.a.id)).sort()

describe('PUT /api/photos/[hash]', () => {
  it('[PH4] keeps the bytes unchanged under their hash, once, and tells of it in the pull', async () => {
    const bytes = picture()
    const hash = hashOf(bytes)
    await name(bytes)
    await pullAll(device, cookie)
    const answers = await Promise.all([put(bytes), put(bytes), put(bytes)])
    expect(answers.map((answer) => answer.status)).toEqual([200, 200, 200])
    expect(await answers[0]?.json()).toMatchObject({
      hash,
      jobId: job,
      bytes: bytes.length,
      mime: 'image/jpeg',
    })
    expect(readFileSync(join(world.filesDir, world.a.id, hash)).equals(bytes)).toBe(true)
    expect(files().filter((file) => file.startsWith(hash))).toEqual([
      hash,
      `${hash}.show`,
      `${hash}.thumb`,
    ])
    const rows = await pullAll(device, cookie)
    expect(rows).toMatchObject([
      { entity: 'photo', id: hash, jobId: job, state: 'present', row: { bytes: bytes.length } },
    ])
  })

  it('[PH4] takes the picture of the dash that a code names', async () => {
    const bytes = picture()
    const context = {
      module: 0,
      status: 'active',
      count: null,
      order: 1,
      photo: hashOf(bytes),
    } as const
    await name(bytes, { kind: 'code', seen: { format: 'spn', spn: 1268, fmi: 3 }, context })
    expect((await put(bytes)).status).toBe(200)
  })

  it('[PH4] waits for the entry that names it, and takes it then', async () => {
    const bytes = picture()
    expect(await problemOf(await put(bytes))).toMatchObject({ status: 409, kind: 'entryFirst' })
    await name(bytes)
    expect((await put(bytes)).status).toBe(200)
  })

  it('[PH4] refuses a wrong hash, a changed body and another size than the entry says', async () => {
    const bytes = picture()
    await name(bytes)
    const other = picture()
    // Signed for the address, sent with other bytes.
    const twisted = new Request(device.photo(bytes, hashOf(bytes)), {
      body: Uint8Array.from(other),
      method: 'PUT',
    })
    const answer = await PUT(twisted, { params: Promise.resolve({ hash: hashOf(bytes) }) })
    expect(await problemOf(answer)).toMatchObject({ status: 422, kind: 'wrongHash' })
    expect(await problemOf(await put(other, hashOf(bytes)))).toMatchObject({
      status: 401,
      kind: 'badSignature',
    })
    const lied = picture()
    const body = photoBody(lied)
    if (body.kind === 'photo') await name(lied, { ...body, photo: { ...body.photo, bytes: 9 } })
    expect(await problemOf(await put(lied))).toMatchObject({ status: 422, kind: 'wrongPicture' })
    const png = pngOf()
    await name(png, photoBody(png))
    expect(await problemOf(await put(png))).toMatchObject({ status: 422, kind: 'wrongPicture' })
    for (const hash of [hashOf(bytes), hashOf(lied), hashOf(png)])
      expect(files()).not.toContain(hash)
  })

  it('[R22] refuses a picture that still says where it was taken', async () => {
    const bytes = jpegOf({ exif: tiffOf('MM', [0x8825]) })
    await name(bytes)
    expect(await problemOf(await put(bytes))).toMatchObject({ status: 422, kind: 'hasPosition' })
    expect(files()).not.toContain(hashOf(bytes))
  })

  it('[PH4] refuses more than 5 MB', async () => {
    const bytes = Buffer.concat([picture(), Buffer.alloc(5_000_000)])
    expect(await problemOf(await put(bytes))).toMatchObject({ status: 413, kind: 'tooLarge' })
  })

  it('[P18] takes it from the phone of the one who wrote the entry alone, with no session', async () => {
    const bytes = picture()
    await name(bytes)
    const second = (await phoneOf(world.a, 'second')).device
    const stranger = (await phoneOf(world.b, 'mechanic')).device
    for (const other of [second, stranger]) {
      expect(await problemOf(await put(bytes, hashOf(bytes), other))).toMatchObject({
        status: 409,
        kind: 'entryFirst',
      })
    }
    const forger = new RawDevice(device.owner)
    expect(await problemOf(await put(bytes, hashOf(bytes), forger))).toMatchObject({
      status: 401,
      kind: 'unknownDevice',
    })
    forger.id = device.id
    expect(await problemOf(await put(bytes, hashOf(bytes), forger))).toMatchObject({
      status: 401,
      kind: 'badSignature',
    })
    expect((await put(bytes)).status).toBe(200)
  })

  it('[PH4] reads no byte of a sender it does not know', async () => {
    const bytes = picture()
    let pulled = 0
    const body = new ReadableStream<Uint8Array>({
      pull(controller) {
        pulled += 1
        controller.enqueue(new Uint8Array(1024))
      },
    })
    const headers = new RawDevice(device.owner).photo(bytes, hashOf(bytes)).headers
    const init = { method: 'PUT', body, duplex: 'half', headers } as RequestInit
    const request = new Request('http://shop.invalid/', init)
    expect((await PUT(request, { params: Promise.resolve({ hash: hashOf(bytes) }) })).status).toBe(
      401,
    )
    expect(pulled).toBeLessThanOrEqual(1)
  })

  it('[PH4] answers no other method and no crooked address', async () => {
    expect(POST().status).toBe(405)
    for (const hash of ['../../etc/passwd', 'A'.repeat(64), '']) {
      expect((await put(picture(), hash)).status).toBe(401)
      expect((await get(hash, cookie)).status).toBe(404)
    }
  })
})

describe('GET /api/photos/[hash]', () => {
  it('[PH4] shows it to who may see its job, and to nobody else, whether it is there or not', async () => {
    const bytes = picture()
    const hash = hashOf(bytes)
    const opening = jobOpen(world.a.machineId)
    await sync(device, [
      device.op(opening),
      device.op(logAdd(device, opening.fields.id, note('x'))),
    ])
    await name(bytes, photoBody(bytes), device, opening.fields.id)
    await put(bytes)
    await asShop(world.a.id, async (tx) => {
      await assignJob(tx, { jobId: opening.fields.id, personId: device.owner.personId })
      await takeChanges(tx, [
        { entity: 'job', id: opening.fields.id, jobId: opening.fields.id, whole: true },
      ])
    })
    const as = async (shop: SyncWorld['a'], who: string, wanted = hash) =>
      get(wanted, (await signIn(shop, who)).cookie)
    for (const who of ['mechanic', 'dispatcher', 'owner', 'parts'])
      expect((await as(world.a, who)).status).toBe(200)
    const refusals = [
      await as(world.a, 'second'),
      await as(world.a, 'guide'),
      await as(world.b, 'owner'),
      await as(world.a, 'owner', hashOf(picture())),
    ]
    const said = await Promise.all(refusals.map(problemOf))
    expect(new Set(said.map((problem) => JSON.stringify(problem))).size).toBe(1)
    expect(said[0]).toMatchObject({ status: 404, kind: 'notFound' })
    expect((await get(hash, null)).status).toBe(401)
  })

  it('[PH4] sends the bytes as they are, as what they are, for this browser alone', async () => {
    const bytes = picture()
    await name(bytes)
    await put(bytes)
    const answer = await get(hashOf(bytes), cookie)
    expect(Object.fromEntries(answer.headers)).toMatchObject({
      'content-type': 'image/jpeg',
      'x-content-type-options': 'nosniff',
      'cache-control': 'private, max-age=31536000, immutable',
    })
    expect(Buffer.from(await answer.arrayBuffer()).equals(bytes)).toBe(true)
    expect(await asShop(world.b.id, (tx) => findPhoto(tx, hashOf(bytes)))).toBeUndefined()
  })
})
