import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/sync/route'
import { asShop } from '@/db/client'
import { lastChange } from '@/db/queries/changes'
import { listLog, verifyLog } from '@/db/queries/log-entries'
import { findOps } from '@/db/queries/sync-ops'
import type { Op } from '@/lib/sync/protocol/op'
import { jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import type { RawDevice } from '../support/raw-device'
import {
  exchangeOf,
  openSyncWorld,
  phoneOf,
  pullAll,
  type SyncWorld,
  sync,
} from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
let device: RawDevice
let cookie: string
beforeAll(async () => {
  world = await openSyncWorld()
  const phone = await phoneOf(world.a, 'mechanic')
  device = phone.device
  cookie = phone.cookie
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
/** A new job of this phone, at the shop. */
async function openJob(from: RawDevice = device): Promise<string> {
  const opening = jobOpen(world.a.machineId)
  await sync(from, [from.op(opening)])
  return opening.fields.id
}
/** The same request, whose line breaks after the first 40 bytes. */
function cut(request: Request): Request {
  const body = new ReadableStream<Uint8Array>({
    async start(controller) {
      controller.enqueue(new Uint8Array(await request.arrayBuffer()).subarray(0, 40))
      controller.error(new Error('line cut'))
    },
  })
  const init = { method: 'POST', body, duplex: 'half', headers: request.headers }
  return new Request(request.url, init as RequestInit)
}
const codesOf = (answer: Awaited<ReturnType<typeof sync>>) =>
  answer.results.map((result) => ('code' in result ? result.code : result.result))

describe('POST /api/sync, pushing', () => {
  it('[P3] carries ops, results, own rows and the next cursor in one request', async () => {
    await pullAll(device, cookie)
    const opening = jobOpen(world.a.machineId)
    const job = opening.fields.id
    const entry = logAdd(device, job, note('Plug was wet'))
    const ask = partRequestAsk(job)
    const ops = [device.op(opening), device.op(entry), device.op(ask)]
    const answer = await sync(device, ops, { cookie })
    expect(answer.results).toEqual([])
    expect(answer.taken).toEqual(ops.map((op) => op.id))
    expect(answer.pull).toMatchObject({
      kind: 'page',
      more: false,
      rows: [
        {
          entity: 'job',
          id: job,
          state: 'present',
          row: { state: 'open', number: expect.stringMatching(/^J-\d{4,}$/) },
        },
        {
          entity: 'logEntry',
          id: entry.fields.id,
          jobId: job,
          row: { order: 1, body: note('Plug was wet') },
        },
        { entity: 'partRequest', id: ask.fields.id, row: { lines: [{ state: 'asked' }] } },
      ],
    })
    const again = await sync(device, [], { cookie })
    expect(again.pull).toMatchObject({ kind: 'page', rows: [], more: false })
  })

  it('[fault 1] [P4] stores every op once when the answer is lost and the phone sends again', async () => {
    const job = await openJob()
    const ops = Array.from({ length: 20 }, (_, i) => device.op(logAdd(device, job, note(`n${i}`))))
    await exchangeOf(device.push(ops))
    const again = await exchangeOf(device.push(ops))
    expect(again.taken).toEqual(ops.map((op) => op.id))
    expect(new Set(again.results.map((result) => result.result))).toEqual(new Set(['duplicate']))
    expect((await inA((tx) => listLog(tx, job))).map((entry) => entry.id)).toEqual(
      ops.map((op) => op.entityId),
    )
  })

  it('[fault 3] [P4] [P6] gives twins sent at once one effect and the same answer, refusals too', async () => {
    const job = await openJob()
    const good = Array.from({ length: 40 }, (_, i) => device.op(logAdd(device, job, note(`t${i}`))))
    const bad = device.op({
      kind: 'job.move',
      entityId: job,
      jobId: job,
      fields: { from: 'closed', to: 'open', reason: null },
    })
    const batch = [...good, bad]
    const before = await inA(lastChange)
    const answers = await Promise.all(
      Array.from({ length: 6 }, () => exchangeOf(device.push(batch))),
    )
    const waiting = answers.filter((answer) =>
      answer.results.some((result) => result.result === 'retry'),
    )
    for (const answer of [...answers, await exchangeOf(device.push(batch))]) {
      if (waiting.includes(answer)) continue
      expect(answer.taken).toEqual(batch.map((op) => op.id))
      expect(answer.results.at(-1)).toEqual({
        opId: bad.id,
        result: 'rejected',
        code: 'stale_status',
        field: 'fields.from',
        detail: 'open',
      })
    }
    expect(await inA((tx) => listLog(tx, job))).toHaveLength(40)
    expect(await inA(lastChange)).toBe(before + 40)
  })

  it('[fault 1] [P4] survives 200 requests, many of them cut, in any order', async () => {
    const { device: phone } = await phoneOf(world.a, 'second')
    const job = await openJob(phone)
    const ops = Array.from({ length: 30 }, (_, i) => phone.op(logAdd(phone, job, note(`c${i}`))))
    const pushes = Array.from({ length: 200 }, (_, i) => {
      const from = (i * 7) % 25
      const request = phone.push(ops.slice(from, from + 5))
      return POST(i % 3 === 0 ? cut(request) : request)
    })
    const statuses = (await Promise.all(pushes)).map((answer) => answer.status)
    expect(new Set(statuses)).toEqual(new Set([200, 400]))
    await sync(phone, ops)
    const log = await inA((tx) => listLog(tx, job))
    expect(log.map((entry) => entry.id).sort()).toEqual(ops.map((op) => op.entityId).sort())
    expect(await inA((tx) => verifyLog(tx, job))).toEqual({ ok: true, value: 30 })
  })

  it('[fault 8] [P5] lets a poison op in 500 cost only itself, whoever finds it', async () => {
    const job = await openJob()
    const ops: Op[] = Array.from({ length: 500 }, (_, i) =>
      device.op(logAdd(device, job, note(`p${i}`))),
    )
    // The parser's: an unknown field. The database's: the year zero is no timestamp of PostgreSQL.
    const parserPoison = { ...ops[100]!, surprise: true }
    const year0 = logAdd(device, job, note('long ago'), { happenedAt: '0000-01-01T00:00:00.000Z' })
    const databasePoison = { ...device.op(year0) }
    const batch = [
      ...ops.slice(0, 100),
      parserPoison,
      ...ops.slice(101, 300),
      databasePoison,
      ...ops.slice(301),
    ]
    const answer = await sync(device, batch)
    expect(answer.results).toMatchObject([
      { opId: parserPoison.id, result: 'rejected', code: 'invalid' },
      { opId: databasePoison.id, result: 'rejected', code: 'invalid' },
    ])
    expect(answer.taken).toHaveLength(500)
    expect(await inA((tx) => listLog(tx, job))).toHaveLength(498)
    const again = await sync(device, [databasePoison])
    expect(codesOf(again)).toEqual(['invalid'])
  })

  it('[P5] keeps the order of one phone’s entries in the job’s chain', async () => {
    const job = await openJob()
    const ops = Array.from({ length: 60 }, (_, i) => device.op(logAdd(device, job, note(`o${i}`))))
    await sync(device, ops.slice(0, 25))
    await sync(device, ops.slice(25))
    const log = await inA((tx) => listLog(tx, job))
    expect(log.map((entry) => entry.body)).toEqual(ops.map((_, i) => note(`o${i}`)))
    expect(log.map((entry) => entry.order)).toEqual(ops.map((_, i) => i + 1))
  })

  it('[fault 9] [P5] blocks a child before its parent and releases it when the parent lands', async () => {
    const machine = machineAdd()
    const opening = jobOpen(machine.fields.id)
    const [first, second, third] = [
      device.op(machine),
      device.op(opening),
      device.op(logAdd(device, opening.fields.id, note('child'))),
    ]
    const early = await sync(device, [third, second])
    expect(early.results).toEqual([
      { opId: third.id, result: 'blocked', on: opening.fields.id },
      { opId: second.id, result: 'blocked', on: machine.fields.id },
    ])
    expect(early.taken).toEqual([])
    expect((await inA((tx) => findOps(tx, [third.id]))).get(third.id)).toMatchObject({
      outcome: 'blocked',
      blockedOn: opening.fields.id,
    })
    await sync(device, [first])
    const late = await sync(device, [second, third])
    expect(late).toMatchObject({ results: [], taken: [second.id, third.id] })
    expect(await inA((tx) => listLog(tx, opening.fields.id))).toHaveLength(1)
    expect((await inA((tx) => findOps(tx, [third.id]))).get(third.id)).toMatchObject({
      outcome: 'accepted',
      blockedOn: null,
    })
  })

  it('[P6] keeps the op as it was sent with its outcome', async () => {
    const job = await openJob()
    const bad = { ...device.op(logAdd(device, job, note('odd'))), surprise: [1, { b: 2, a: 1 }] }
    await sync(device, [bad])
    const stored = (await inA((tx) => findOps(tx, [bad.id]))).get(bad.id)
    expect(stored).toMatchObject({
      outcome: 'rejected',
      code: 'invalid',
      dseq: bad.dseq,
      raw: JSON.stringify(bad),
    })
  })

  it('[R23] leaves every chain of the shop whole and its numbers dense after all of this', async () => {
    expect(await expectWholeShop(world.a.id)).toBeGreaterThan(6)
  })
})
