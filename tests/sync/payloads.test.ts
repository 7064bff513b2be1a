// What a hostile or broken phone may send: each op is refused on its own with a reason, and nothing else moves.
import { createGzip, gzipSync } from 'node:zlib'
import { sql } from 'kysely'
import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/sync/route'
import { asShop } from '@/db/client'
import { findOps } from '@/db/queries/sync-ops'
import { MAX_RAW_BYTES } from '@/lib/sync/server/body'
import { jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import { opsOf } from '../support/field-sets'
import type { RawDevice } from '../support/raw-device'
import { openSyncWorld, phoneOf, problemOf, type SyncWorld, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
/** A job of each shop with one line in its log. */
const jobs = { a: '', b: '' }
const entries = { a: '', b: '' }
beforeAll(async () => {
  world = await openSyncWorld()
  for (const key of ['a', 'b'] as const) {
    const { device } = await phoneOf(world[key], 'second')
    const opening = jobOpen(world[key].machineId)
    const line = device.op(logAdd(device, opening.fields.id, note('there before')))
    await sync(device, [device.op(opening), line])
    jobs[key] = opening.fields.id
    entries[key] = line.entityId
  }
})
afterAll(() => world.close())

/** A hash of every table but those that note what was sent: the ops themselves and when a phone was heard. */
async function everythingElse(): Promise<Record<string, string>> {
  const { rows } = await sql<{ name: string }>`
    select relname as name from pg_class where relnamespace = 'public'::regnamespace
      and relkind in ('r', 'p') and relname not in ('sync_op', 'device') order by 1
  `.execute(world.db.admin)
  const found: Record<string, string> = {}
  for (const { name } of rows) {
    const { rows: hashed } = await sql<{ hash: string }>`
      select md5(coalesce(string_agg(t::text, '|' order by t::text), '')) as hash
      from ${sql.table(name)} t`.execute(world.db.admin)
    found[name] = hashed[0]?.hash ?? ''
  }
  return found
}

type Told = { opId: string; result: string; code?: string; on?: string | null }
/** Sends ops one by one and all at once; nothing but the record of them may change. */
async function refusals(device: RawDevice, ops: readonly unknown[]): Promise<string[]> {
  const before = await everythingElse()
  const answer = await sync(device, [...ops])
  expect(answer.results).toHaveLength(ops.length)
  expect(await everythingElse()).toEqual(before)
  return (answer.results as Told[]).map((told) => told.code ?? told.result)
}

const isRecord = (op: unknown) => typeof op === 'object' && op !== null && !Array.isArray(op)
const of = (device: RawDevice, changes: object) => ({
  ...device.op(logAdd(device, jobs.a, note('x'))),
  ...changes,
})

describe('malformed', () => {
  it('[P2] [P5] each shape that is none is refused by itself with a code, and nothing is touched', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const deep = JSON.parse(`${'['.repeat(40)}${']'.repeat(40)}`) as unknown
    const bad = [
      null,
      7,
      'an op',
      [],
      {},
      of(device, { id: 'no uuid' }),
      of(device, { entityId: '../../etc' }),
      of(device, { dseq: -4 }),
      of(device, { hlc: 'tomorrow' }),
      of(device, { surprise: 1 }),
      of(device, { fields: null }),
      of(device, { fields: deep }),
      of(device, { fields: { body: { kind: 'note', words: '\0' } } }),
      of(device, { fields: { body: { kind: 'note', words: '\ud800' } } }),
      of(device, { kind: 'shop.drop' }),
      of(device, { kind: '__proto__' }),
    ]
    const codes = await refusals(device, bad)
    const kinds = bad.map((op) => (op as { kind?: unknown } | null)?.kind)
    expect(codes).toEqual(
      bad.map((op, at) => (isRecord(op) && kinds[at] !== 'log.add' ? 'unknown_kind' : 'invalid')),
    )
  })

  it('[P5] [P14] an oversized op costs itself alone, an oversized request is refused whole', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const big = [of(device, { x: 'y'.repeat(16 * 1024) }), of(device, { x: 'y'.repeat(400_000) })]
    expect(await refusals(device, big)).toEqual(['too_big', 'too_big'])
    const good = device.op(logAdd(device, jobs.a, note('good')))
    const mixed = await sync(device, [of(device, { x: 'y'.repeat(16 * 1024) }), good])
    expect(mixed.results).toMatchObject([{ code: 'too_big' }])
    expect(mixed.taken).toContain(good.id)
    const before = await everythingElse()
    const many = Array.from({ length: 501 }, () => of(device, {}))
    for (const request of [device.push(many), device.send(Buffer.alloc(MAX_RAW_BYTES + 1))]) {
      expect(await problemOf(await POST(request))).toMatchObject({ status: 413, kind: 'tooLarge' })
    }
    for (const text of ['', '{', '[]', '{"protocol":2}', '<html>']) {
      const answer = await POST(device.send(gzipSync(text)))
      expect(await problemOf(answer)).toMatchObject({ status: 400, kind: 'badJson' })
    }
    expect(await everythingElse()).toEqual(before)
  })
})

describe('a zip bomb', () => {
  const MB = 1024 * 1024
  const INFLATED = 400 * MB

  /** Gzip of so many zeros, made piece by piece so that the test itself stays small. */
  async function bombOf(bytes: number): Promise<Buffer> {
    const gzip = createGzip({ level: 9 })
    const parts: Buffer[] = []
    gzip.on('data', (part: Buffer) => parts.push(part))
    const ended = new Promise((done) => gzip.on('end', done))
    const piece = Buffer.alloc(MB)
    for (let at = 0; at < bytes; at += MB) {
      if (!gzip.write(piece)) await new Promise<void>((go) => gzip.once('drain', go))
    }
    gzip.end()
    await ended
    return Buffer.concat(parts)
  }

  it('[P14] of 400 MB is answered 413, eight at once too, with memory a small part of that', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const bomb = await bombOf(INFLATED)
    expect(bomb.length).toBeLessThan(MAX_RAW_BYTES)
    const before = await everythingElse()
    const start = process.memoryUsage().rss
    let peak = start
    const look = setInterval(() => {
      peak = Math.max(peak, process.memoryUsage().rss)
    }, 2)
    for (let round = 0; round < 3; round += 1) {
      const answers = await Promise.all(Array.from({ length: 8 }, () => POST(device.send(bomb))))
      for (const answer of answers) {
        expect(await problemOf(answer)).toMatchObject({ status: 413, kind: 'tooLarge' })
      }
      peak = Math.max(peak, process.memoryUsage().rss)
    }
    clearInterval(look)
    // Eight bodies are held unpacked at once, 8 MB each, and no more: a figure of the process, not of time.
    expect(peak - start).toBeLessThan(INFLATED / 2)
    expect(await everythingElse()).toEqual(before)
  })
})

describe('of another shop, or guessed', () => {
  it('[P11] ids of another shop are told apart from ids never made by nothing', async () => {
    const { device } = await phoneOf(world.a, 'owner')
    const theirs = { job: jobs.b, entry: entries.b, machine: world.b.machineId }
    const guessed = { job: v7(), entry: v7(), machine: v7() }
    const aimedAt = (at: typeof theirs) => [
      device.op(logAdd(device, at.job, note('in'))),
      device.op({
        kind: 'job.move',
        entityId: at.job,
        jobId: at.job,
        fields: { from: 'open', to: 'closed', reason: null },
      }),
      device.op(jobOpen(at.machine)),
      device.op(partRequestAsk(at.job)),
      device.op(
        logAdd(device, jobs.a, { kind: 'correction', reason: 'x' }, { supersedes: at.entry }),
      ),
      opsOf(device).setJob(at.job, { field: 'weather', value: 'fog' }),
      opsOf(device).setMachine(at.machine, { field: 'year', value: 2020 }),
    ]
    const [seen, unseen] = [
      await refusals(device, aimedAt(theirs)),
      await refusals(device, aimedAt(guessed)),
    ]
    expect(seen).toEqual(unseen)
    expect(new Set(seen)).toEqual(new Set(['blocked']))
  })

  it('[P11] [P18] another’s name, device, entry or id under an op is refused', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const other = await phoneOf(world.a, 'guide')
    const opening = jobOpen(world.a.machineId)
    const forged = [
      device.op(logAdd(device, jobs.a, note('x'), { authorId: other.device.owner.personId })),
      device.op(logAdd(device, jobs.a, note('x'), { deviceId: other.device.id })),
      { ...device.op(opening), dev: other.device.id },
      device.op(logAdd(device, jobs.a, note('another text'), { id: entries.a })),
    ]
    expect(await refusals(device, forged)).toEqual([
      'not_yours',
      'not_yours',
      'not_yours',
      'id_reuse',
    ])
  })
})

describe('of another role', () => {
  it('[P11] what a role may not is refused op by op and kept as refused', async () => {
    const { device } = await phoneOf(world.a, 'guide')
    const asGuide = [
      device.op(machineAdd()),
      device.op(partRequestAsk(jobs.a)),
      device.op(
        logAdd(device, jobs.a, {
          kind: 'fix',
          fault: 'ignitionCoilPart',
          words: 'x',
          temporary: null,
        }),
      ),
      device.op({
        kind: 'job.move',
        entityId: jobs.a,
        jobId: jobs.a,
        fields: { from: 'open', to: 'closed', reason: null },
      }),
    ]
    expect(await refusals(device, asGuide)).toEqual(Array(4).fill('forbidden'))
    const kept = await asShop(world.a.id, (tx) =>
      findOps(
        tx,
        asGuide.map((op) => op.id),
      ),
    )
    expect([...kept.values()].map((op) => [op.outcome, op.code])).toEqual(
      Array(4).fill(['rejected', 'forbidden']),
    )
    const parts = await phoneOf(world.a, 'both')
    expect((await sync(parts.device, [parts.device.op(partRequestAsk(jobs.a))])).results).toEqual(
      [],
    )
  })

  it('[R23] leaves both shops whole after all of this', async () => {
    expect(await expectWholeShop(world.a.id)).toBe(1)
    expect(await expectWholeShop(world.b.id)).toBe(1)
  })
})
