// Two versions of the app in one shop (P13): what an app of the version before hears and may send.
import { gzipSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/sync/route'
import { asShop } from '@/db/client'
import { listLog } from '@/db/queries/log-entries'
import { PROTOCOL, type PullAnswer, type PullRow } from '@/lib/sync/protocol/message'
import { OP_SCHEMA } from '@/lib/sync/protocol/op'
import { upgradeOp } from '@/lib/sync/server/upgrade'
import { jobOpen, logAdd, note } from '../support/field-ops'
import { openSyncWorld, phoneOf, pullAll, type SyncWorld, sync } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

/** A request as the app of protocol 1 sent it, to the letter. */
const fromOlder = (phone: Awaited<ReturnType<typeof phoneOf>>, ops: unknown[], cursor: unknown) =>
  phone.device.send(
    gzipSync(
      JSON.stringify({
        protocol: 1,
        schema: 1,
        clientTime: phone.device.now(),
        ops,
        cursor,
        pull: true,
      }),
    ),
    { cookie: phone.cookie },
    ops,
  )

/** Every row that the app of protocol 1 is told, from the start. */
async function pulledBy(phone: Awaited<ReturnType<typeof phoneOf>>): Promise<PullRow[]> {
  const rows: PullRow[] = []
  for (let cursor: unknown = null; ; ) {
    const answer = await POST(fromOlder(phone, [], cursor))
    const { pull } = (await answer.json()) as { pull: PullAnswer }
    if (pull.kind !== 'page') throw new Error(pull.kind)
    rows.push(...pull.rows)
    cursor = pull.cursor
    if (!pull.more) return rows
  }
}

describe('an app of the version before', () => {
  it('[P13] is answered in its own protocol and hears of nothing newer', async () => {
    const phone = await phoneOf(world.a, 'mechanic')
    const answer = await POST(fromOlder(phone, [], null))
    const said = (await answer.json()) as Record<string, unknown>
    expect(answer.status).toBe(200)
    expect(Object.keys(said).sort()).toEqual(['protocol', 'pull', 'results', 'serverTime', 'taken'])
    expect(said.protocol).toBe(PROTOCOL - 1)
  })

  it('[P13] hands over its work in the shape of then, and the shop takes all of it', async () => {
    const phone = await phoneOf(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    const made = [
      opening,
      ...Array.from({ length: 20 }, (_, n) => logAdd(phone.device, jobId, note(`line ${n}`))),
    ].map((input) => ({ ...phone.device.op(input), schema: 1 }))
    const said = (await (await POST(fromOlder(phone, made, null))).json()) as {
      taken: string[]
      results: unknown[]
    }
    expect(said.taken).toEqual(made.map((op) => op.id))
    expect(said.results).toEqual([])
    expect(await asShop(world.a.id, (tx) => listLog(tx, jobId))).toHaveLength(20)
  })

  it('[P13] [fault 30] writes into one job with an app of this version, and both see it all', async () => {
    const older = await phoneOf(world.a, 'mechanic')
    const newer = await phoneOf(world.a, 'second')
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    await POST(fromOlder(older, [{ ...older.device.op(opening), schema: 1 }], null))
    await sync(newer.device, [newer.device.op(logAdd(newer.device, jobId, note('from the newer')))])
    const line = {
      ...older.device.op(logAdd(older.device, jobId, note('from the older'))),
      schema: 1,
    }
    await POST(fromOlder(older, [line], null))
    const log = await asShop(world.a.id, (tx) => listLog(tx, jobId))
    expect(log.map(({ body }) => body.kind === 'note' && body.words)).toEqual([
      'from the newer',
      'from the older',
    ])
    const [held, heldByOlder] = [await pullAll(newer.device, newer.cookie), await pulledBy(older)]
    const ofJob = (rows: readonly PullRow[]) => rows.filter((row) => row.jobId === jobId)
    expect(ofJob(held)).toHaveLength(3)
    expect(ofJob(heldByOlder)).toEqual(ofJob(held))
  })
})

describe('this version', () => {
  it('[P13] says what it holds beyond the batch, and is answered with every field of protocol 2', async () => {
    const phone = await phoneOf(world.a, 'mechanic')
    const held = { ops: 7, photos: 2, oldestAt: '2026-11-24T09:40:00.000Z' }
    const said = await sync(phone.device, [], {
      cookie: phone.cookie,
      held,
      canary: phone.device.id,
    })
    expect(said).toMatchObject({ protocol: 2, order: 'none', missing: [], lost: null })
  })

  it('[P13] brings an op of schema 1 up to schema 2 without losing a field', () => {
    const op = { id: 'x', kind: 'job.move', fields: { from: 'open', to: 'assigned' }, base: 7 }
    expect(upgradeOp({ ...op, schema: 1 })).toEqual({ ...op, schema: OP_SCHEMA })
    expect(upgradeOp({ ...op, schema: OP_SCHEMA })).toEqual({ ...op, schema: OP_SCHEMA })
  })
})
