import { existsSync, mkdirSync, readFileSync, rmSync, truncateSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { PATCH } from '@/app/api/photos/tus/[hash]/route'
import { asShop } from '@/db/client'
import { findPhoto } from '@/db/queries/photos'
import { STAGE_MS } from '@/lib/sync/server/photo-stage'
import { dropStaged } from '@/lib/work/drop-staged'
import { workOnce } from '@/lib/work/run'
import { phoneOf, pullAll } from '../support/sync-world'
import { at, hashOf, photoBody, said, UploadWorld } from '../support/upload-world'

let up: UploadWorld
beforeAll(async () => {
  up = await UploadWorld.open()
})
afterAll(() => up.world.close())

describe('an upload', () => {
  it('[PH2] comes in by chunks, is stored once under its hash, and is told of in the pull', async () => {
    const bytes = up.another()
    const hash = hashOf(bytes)
    await up.name(photoBody(bytes))
    await pullAll(up.device, up.cookie)
    const begun = await up.begin(bytes)
    expect(said(begun)).toMatchObject({ status: 201, offset: 0, stored: null })
    expect(begun.headers.get('location')).toBe(`/api/photos/tus/${hash}`)
    expect(Date.parse(begun.headers.get('upload-expires') ?? '')).toBeGreaterThan(Date.now())
    const half = Math.floor(bytes.length / 2)
    expect(said(await up.add(bytes, { offset: 0, length: half }))).toMatchObject({
      status: 204,
      offset: half,
      stored: null,
    })
    expect(await asShop(up.world.a.id, (tx) => findPhoto(tx, hash))).toBeUndefined()
    expect(said(await up.ask(bytes))).toMatchObject({ status: 200, offset: half, stored: null })
    const last = await up.add(bytes, { offset: half, length: bytes.length })
    expect(said(last)).toMatchObject({ status: 204, offset: bytes.length, stored: hash })
    expect(readFileSync(join(up.world.filesDir, up.world.a.id, hash)).equals(bytes)).toBe(true)
    expect(up.stored().filter((key) => key.startsWith(hash))).toEqual([
      hash,
      `${hash}.show`,
      `${hash}.thumb`,
    ])
    expect(up.staged()).toEqual([])
    expect(await pullAll(up.device, up.cookie)).toMatchObject([{ entity: 'photo', id: hash }])
  })

  it('[fault 25] [PH2] of a file the shop has needs no byte, whoever of its writers asks', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes))
    await up.sendAll(bytes, 65_536)
    expect(said(await up.begin(bytes))).toMatchObject({ status: 201, stored: hashOf(bytes) })
    expect(said(await up.ask(bytes))).toMatchObject({ status: 200, stored: hashOf(bytes) })
    const { device: second } = await phoneOf(up.world.a, 'second')
    expect(said(await up.begin(bytes, second))).toMatchObject({
      status: 409,
      problem: 'entryFirst',
    })
    await up.name(photoBody(bytes), second)
    expect(said(await up.begin(bytes, second))).toMatchObject({
      status: 201,
      stored: hashOf(bytes),
    })
    expect(up.stored().filter((key) => key === hashOf(bytes))).toHaveLength(1)
  })

  it('[fault 25] cut at every edge of a chunk goes on where it stood', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes))
    const edge = 32_768
    expect(said(await up.begin(bytes)).offset).toBe(0)
    for (let offset = 0; offset < bytes.length; offset += edge) {
      // The answer is lost: the phone begins anew each time, and once it asks.
      await up.add(bytes, { offset: offset, length: edge })
      const next = Math.min(offset + edge, bytes.length)
      expect(said(await up.begin(bytes)).offset).toBe(next)
      expect(said(await up.ask(bytes)).offset).toBe(next)
    }
    expect(said(await up.ask(bytes)).stored).toBe(hashOf(bytes))
  })

  it('[fault 25] cut inside a chunk takes nothing of it', async () => {
    const bytes = up.another()
    const hash = hashOf(bytes)
    await up.name(photoBody(bytes))
    await up.begin(bytes)
    await up.add(bytes, { offset: 0, length: 10_000 })
    const torn = new ReadableStream<Uint8Array>({
      start(line) {
        line.enqueue(bytes.subarray(10_000, 15_000))
      },
      pull(line) {
        line.error(new Error('cut'))
      },
    })
    const chunk = bytes.subarray(10_000, 20_000)
    const cut = await PATCH(up.device.chunk(hash, { offset: 10_000, chunk, sent: torn }), at(hash))
    expect(said(cut)).toMatchObject({ status: 400, problem: 'badRequest' })
    const short = up.device.chunk(hash, {
      offset: 10_000,
      chunk,
      sent: Uint8Array.from(bytes.subarray(10_000, 15_000)),
    })
    expect(said(await PATCH(short, at(hash)))).toMatchObject({ status: 460, problem: 'wrongChunk' })
    const bent = Buffer.from(chunk)
    bent[5] = (bent[5] ?? 0) ^ 1
    const flipped = up.device.chunk(hash, { offset: 10_000, chunk, sent: Uint8Array.from(bent) })
    expect(said(await PATCH(flipped, at(hash)))).toMatchObject({ status: 460 })
    expect(said(await up.ask(bytes)).offset).toBe(10_000)
    expect((await up.sendAll(bytes, 65_536)).headers.get('x-farbench-stored')).toBe(hash)
  })

  it('[PH3] answers 409 where it does not stand, and 404 before it is begun', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes))
    expect(said(await up.ask(bytes))).toMatchObject({ status: 404, problem: 'notBegun' })
    expect(said(await up.add(bytes, { offset: 0, length: 100 }))).toMatchObject({
      status: 404,
      problem: 'notBegun',
    })
    await up.begin(bytes)
    await up.add(bytes, { offset: 0, length: 100 })
    for (const offset of [0, 50, 200]) {
      expect(said(await up.add(bytes, { offset: offset, length: 100 }))).toMatchObject({
        status: 409,
        problem: 'wrongOffset',
      })
    }
    expect(said(await up.ask(bytes)).offset).toBe(100)
  })

  it('[fault 25] staged bytes that are gone, run out or hurt are begun anew', async () => {
    const bytes = up.another()
    const hash = hashOf(bytes)
    await up.name(photoBody(bytes))
    await up.begin(bytes)
    await up.add(bytes, { offset: 0, length: 20_000 })
    const notes = JSON.parse(readFileSync(`${up.stageOf(bytes)}.json`, 'utf8'))
    notes.creation_date = new Date(Date.now() - STAGE_MS - 1000).toISOString()
    writeFileSync(`${up.stageOf(bytes)}.json`, JSON.stringify(notes))
    expect(said(await up.ask(bytes))).toMatchObject({ status: 410, problem: 'gone' })
    expect(said(await up.add(bytes, { offset: 20_000, length: 10_000 }))).toMatchObject({
      status: 410,
    })
    expect(said(await up.begin(bytes)).offset).toBe(0)
    await up.add(bytes, { offset: 0, length: 20_000 })
    rmSync(up.stageOf(bytes))
    expect([404, 410]).toContain(
      said(await up.add(bytes, { offset: 20_000, length: 10_000 })).status,
    )
    await up.begin(bytes)
    await up.add(bytes, { offset: 0, length: 20_000 })
    writeFileSync(`${up.stageOf(bytes)}.json`, '{"half')
    expect(said(await up.ask(bytes)).status).toBe(404)
    await up.begin(bytes)
    await up.add(bytes, { offset: 0, length: 20_000 })
    // A crash took the last of what had been said to be there.
    truncateSync(up.stageOf(bytes), 12_345)
    expect(said(await up.add(bytes, { offset: 20_000, length: 10_000 })).status).toBe(409)
    expect(said(await up.ask(bytes)).offset).toBe(12_345)
    const held = readFileSync(up.stageOf(bytes))
    held[3] = (held[3] ?? 0) ^ 0xff
    writeFileSync(up.stageOf(bytes), held)
    expect(said(await up.sendAll(bytes, 300_000))).toMatchObject({
      status: 422,
      problem: 'wrongHash',
    })
    expect(existsSync(up.stageOf(bytes))).toBe(false)
    expect(said(await up.sendAll(bytes, 300_000)).stored).toBe(hash)
  })

  it('[PH3] what never became whole is swept away after 30 days, what is fresh is not', async () => {
    const [old, fresh] = [up.another(), up.another()]
    for (const bytes of [old, fresh]) {
      await up.name(photoBody(bytes))
      await up.begin(bytes)
      await up.add(bytes, { offset: 0, length: 1000 })
    }
    const notes = JSON.parse(readFileSync(`${up.stageOf(old)}.json`, 'utf8'))
    notes.creation_date = new Date(Date.now() - STAGE_MS - 1000).toISOString()
    writeFileSync(`${up.stageOf(old)}.json`, JSON.stringify(notes))
    await dropStaged()
    expect(existsSync(up.stageOf(old))).toBe(false)
    expect(existsSync(`${up.stageOf(old)}.json`)).toBe(false)
    expect(said(await up.ask(fresh)).offset).toBe(1000)
  })

  it('[PH3] [AC1] plans one sweep a day, after the uploads begun that day have run out', async () => {
    for (const bytes of [up.another(), up.another()]) {
      await up.name(photoBody(bytes))
      await up.begin(bytes)
    }
    const { rows } = await sql<{ key: string; runAt: string }>`
      select key, run_at as "runAt" from graphile_worker.jobs where task_identifier = 'dropStaged'
    `.execute(up.world.db.admin)
    expect(rows).toHaveLength(1)
    const runAt = new Date(rows[0]?.runAt ?? 0).getTime()
    expect(runAt - STAGE_MS).toBeGreaterThan(Date.now())
    expect(runAt - STAGE_MS).toBeLessThan(Date.now() + 25 * 3_600_000)
    await sql`update graphile_worker._private_jobs set run_at = now() - interval '1 second'`.execute(
      up.world.db.admin,
    )
    await workOnce({ queueUrl: up.world.db.workUrl })
    const left = await sql`select 1 from graphile_worker.jobs`.execute(up.world.db.admin)
    expect(left.rows).toEqual([])
  })

  it('[fault 25] four writers of one upload at once end in one stored object', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes))
    const one = async () => {
      for (let tries = 0; tries < 200; tries++) {
        const here = said(await up.begin(bytes))
        if (here.stored) return
        await up.add(bytes, { offset: here.offset, length: 20_000 })
      }
      throw new Error('never whole')
    }
    await Promise.all([one(), one(), one(), one()])
    expect(readFileSync(join(up.world.filesDir, up.world.a.id, hashOf(bytes))).equals(bytes)).toBe(
      true,
    )
    const rows = await asShop(up.world.a.id, (tx) => findPhoto(tx, hashOf(bytes)))
    expect(rows).toMatchObject({ bytes: bytes.length })
  })

  it('[P6] keeps what is whole when the store is away, and stores it without another byte', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes))
    await up.begin(bytes)
    const folder = join(up.world.filesDir, up.world.a.id, `${hashOf(bytes)}.show`)
    // A folder in the place of the object: the store answers 500 until it is gone.
    mkdirSync(join(folder, 'x'), { recursive: true })
    expect(said(await up.add(bytes, { offset: 0, length: bytes.length })).status).toBe(503)
    expect(await asShop(up.world.a.id, (tx) => findPhoto(tx, hashOf(bytes)))).toBeUndefined()
    expect(said(await up.ask(bytes))).toMatchObject({ offset: bytes.length, stored: null })
    rmSync(folder, { recursive: true })
    expect(said(await up.add(bytes, { offset: bytes.length, length: 0 })).stored).toBe(
      hashOf(bytes),
    )
  })

  it('[fault 27] [P12] finds a file again whose row a restored backup has lost', async () => {
    const bytes = up.another()
    await up.name(photoBody(bytes))
    await up.sendAll(bytes, 300_000)
    await up.world.db.admin.transaction().execute(async (tx) => {
      await sql`set local session_replication_role = replica`.execute(tx)
      await sql`delete from photo where hash = ${hashOf(bytes)}`.execute(tx)
    })
    expect(said(await up.ask(bytes))).toMatchObject({ status: 404, problem: 'notBegun' })
    expect(said(await up.begin(bytes))).toMatchObject({ status: 201, stored: hashOf(bytes) })
    expect(await asShop(up.world.a.id, (tx) => findPhoto(tx, hashOf(bytes)))).toMatchObject({
      jobId: up.job,
      bytes: bytes.length,
    })
  })
})
