import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { lockShop, takeChanges } from '@/db/queries/changes'
import { listLog } from '@/db/queries/log-entries'
import type { Cursor, PullRow } from '@/lib/sync/protocol/message'
import { jobOpen, logAdd, machineAdd, note } from '../support/field-ops'
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
const rowsOf = (pull: Awaited<ReturnType<typeof sync>>['pull']) =>
  pull.kind === 'page' ? pull.rows : []

/** Sends until everything is taken, as a phone does that is told to retry. */
async function sendAll(from: RawDevice, ops: { id: string }[]): Promise<void> {
  let waiting = ops
  while (waiting.length > 0) {
    const { taken, results } = await exchangeOf(from.push(waiting))
    expect(
      results.filter((result) => result.result !== 'retry' && result.result !== 'duplicate'),
    ).toEqual([])
    waiting = waiting.filter((op) => !taken.includes(op.id))
  }
}

/** Locks the shop's counter as a writer that hangs; answers how it lets go. */
async function holdCounter(shopId: string): Promise<() => Promise<void>> {
  const gate = () => {
    let open: () => void = () => undefined
    const promise = new Promise<void>((resolve) => {
      open = resolve
    })
    return { promise, open }
  }
  const [held, locked] = [gate(), gate()]
  const holder = asShop(shopId, async (tx) => {
    await lockShop(tx)
    locked.open()
    await held.promise
  })
  await locked.promise
  return () => {
    held.open()
    return holder
  }
}

/** A small fixed random source (mulberry32), so that a failing run can be run again. */
function dice(seed: number): () => number {
  let a = seed
  return () => {
    a = (a + 0x6d2b79f5) | 0
    let t = Math.imul(a ^ (a >>> 15), 1 | a)
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
}

describe('POST /api/sync, pulling', () => {
  it('[fault 4] [P7] misses nothing and repeats nothing while 10 writers write and 3 readers read', async () => {
    const readers = await Promise.all(
      ['owner', 'mechanic', 'dispatcher'].map((who) => phoneOf(world.a, who)),
    )
    const writers = await Promise.all(
      Array.from({ length: 10 }, () => phoneOf(world.a, 'mechanic')),
    )
    for (const reader of readers) await pullAll(reader.device, reader.cookie)
    const done = new AbortController()
    const written: string[] = []
    const writes = writers.map(async ({ device: writer }, index) => {
      const roll = dice(index + 1)
      const opening = jobOpen(world.a.machineId)
      await sendAll(writer, [writer.op(opening)])
      for (let batch = 0; batch < 6; batch++) {
        const ops = Array.from({ length: 1 + Math.floor(roll() * 12) }, (_, i) =>
          writer.op(logAdd(writer, opening.fields.id, note(`${index}.${batch}.${i}`))),
        )
        written.push(...ops.map((op) => op.entityId))
        await sendAll(writer, ops)
      }
    })
    const reads = readers.map(async ({ device: reader, cookie: its }) => {
      const rows: PullRow[] = []
      let last = reader.cursor?.seq ?? 0
      const drain = async () => {
        const { pull } = await sync(reader, [], { cookie: its })
        expect(pull.kind).toBe('page')
        for (const row of rowsOf(pull)) {
          expect(row.seq).toBeGreaterThan(last)
          last = row.seq
          rows.push(row)
        }
        expect(reader.cursor?.seq).toBeGreaterThanOrEqual(last)
      }
      while (!done.signal.aborted) await drain()
      await drain()
      return rows
    })
    await Promise.all(writes)
    done.abort()
    for (const rows of await Promise.all(reads)) {
      const entries = rows.filter((row) => row.entity === 'logEntry').map((row) => row.id)
      expect(entries).toHaveLength(written.length)
      expect(new Set(entries)).toEqual(new Set(written))
      expect(rows.every((row) => row.state === 'present' && row.row !== null)).toBe(true)
    }
    await expectWholeShop(world.a.id)
  })

  it('[fault 5] [P7] leaves no ghost of a write that was rolled back, and no hole', async () => {
    await pullAll(device, cookie)
    const machine = machineAdd()
    const failed = inA(async (tx) => {
      await tx
        .insertInto('machine')
        .values({ ...machine.fields, shopId: tx.shopId, features: '{}' })
        .execute()
      await takeChanges(tx, [{ entity: 'machine', id: machine.fields.id, jobId: null }])
      throw new Error('rolled back')
    })
    await expect(failed).rejects.toThrow('rolled back')
    expect(await pullAll(device, cookie)).toEqual([])
    const op = device.op(machine)
    const { pull } = await sync(device, [op], { cookie })
    expect(rowsOf(pull).map((row) => row.id)).toEqual([machine.fields.id])
    await expectWholeShop(world.a.id)
  })

  it('[P7] is not delayed by a long transaction of another shop', async () => {
    const letGo = await holdCounter(world.b.id)
    const op = device.op(machineAdd())
    const { taken, pull } = await sync(device, [op], { cookie })
    expect(taken).toEqual([op.id])
    expect(rowsOf(pull).map((row) => row.id)).toEqual([op.entityId])
    await letGo()
  })

  it('[fault 7] [P7] asks the phone to retry while somebody holds its shop’s counter, and takes it afterwards', async () => {
    const letGo = await holdCounter(world.a.id)
    const op = device.op(machineAdd())
    const began = Date.now()
    const answer = await sync(device, [op])
    expect(answer).toMatchObject({ taken: [], results: [{ opId: op.id, result: 'retry' }] })
    // lock_timeout is 2 s (sync.md section 1).
    expect(Date.now() - began).toBeLessThan(4_000)
    await letGo()
    expect(await sync(device, [op])).toMatchObject({ taken: [op.id], results: [] })
  })

  it('[P7] pages through a long log and ends where the shop stands', async () => {
    const { device: fresh, cookie: its } = await phoneOf(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    await sync(device, [device.op(opening)])
    for (let part = 0; part < 3; part++) {
      const words = 'w'.repeat(1500)
      await sendAll(
        device,
        Array.from({ length: 200 }, () =>
          device.op(logAdd(device, opening.fields.id, note(words))),
        ),
      )
    }
    const first = await sync(fresh, [], { cookie: its })
    expect(first.pull).toMatchObject({ kind: 'page', more: true })
    expect(Buffer.byteLength(JSON.stringify(rowsOf(first.pull)))).toBeLessThan(300 * 1024)
    const rows = [...rowsOf(first.pull), ...(await pullAll(fresh, its))]
    expect(new Set(rows.map((row) => `${row.entity}:${row.id}`)).size).toBe(rows.length)
    expect(
      rows.filter((row) => row.jobId === opening.fields.id && row.entity === 'logEntry'),
    ).toHaveLength(600)
  })

  it('[P10] tells a phone that was away what is gone; only what it wrote into meanwhile stands again (M8)', async () => {
    const { device: old, cookie: its } = await phoneOf(world.a, 'mechanic')
    const [gone, used] = [machineAdd(), machineAdd()]
    await sync(device, [device.op(gone), device.op(used)])
    await pullAll(old, its)
    const held = [old.op(machineAdd()), old.op(jobOpen(used.fields.id))]
    for (let i = 0; i < 3; i++) await sync(device, [device.op(machineAdd())])
    await inA(async (tx) => {
      await tx
        .updateTable('machine')
        .set({ deletedAt: new Date().toISOString() })
        .where('id', 'in', [gone.fields.id, used.fields.id])
        .execute()
      const change = { entity: 'machine', jobId: null, state: 'deleted' } as const
      await takeChanges(tx, [
        { ...change, id: gone.fields.id },
        { ...change, id: used.fields.id },
      ])
    })
    const { taken, results, pull } = await sync(old, held, { cookie: its })
    expect(taken).toEqual(held.map((op) => op.id))
    expect(results).toEqual([])
    expect(rowsOf(pull)).toContainEqual(
      expect.objectContaining({ id: gone.fields.id, state: 'deleted', row: null }),
    )
    const fresh = await phoneOf(world.a, 'mechanic')
    const ids = (await pullAll(fresh.device, fresh.cookie)).map((row) => row.id)
    expect(ids).not.toContain(gone.fields.id)
    expect(ids).toContain(used.fields.id)
    expect(ids).toContain(held[0]?.entityId)
  })

  it('[fault 28] [P12] starts over after a restore, and after a forged, foreign or future cursor', async () => {
    await pullAll(device, cookie)
    const stand = device.cursor as Cursor
    const odd: Cursor[] = [
      { ...stand, epoch: 'another' },
      { ...stand, shop: world.b.id },
      { ...stand, scopeVersion: stand.scopeVersion + 1 },
      { ...stand, seq: stand.seq + 1_000 },
    ]
    for (const cursor of odd) {
      const { pull } = await exchangeOf(device.push([], { cookie, cursor }))
      expect(pull).toEqual({ kind: 'reset', cursor: { ...stand, seq: 0 } })
    }
    await sql`update shop_counter set epoch = 'restored' where shop_id = ${world.a.id}`.execute(
      world.db.admin,
    )
    const { pull } = await exchangeOf(device.push([], { cookie, cursor: stand }))
    expect(pull).toEqual({ kind: 'reset', cursor: { ...stand, epoch: 'restored', seq: 0 } })
  })

  it('[fault 27] [P12] takes ops again that a restored backup had lost, and others only once', async () => {
    const opening = jobOpen(world.a.machineId)
    const ops = [
      device.op(opening),
      device.op(logAdd(device, opening.fields.id, note('kept'))),
      device.op(logAdd(device, opening.fields.id, note('lost'))),
    ]
    await sync(device, ops.slice(0, 2))
    const offered = await sync(device, ops)
    expect(offered.taken).toEqual(ops.map((op) => op.id))
    expect((await inA((tx) => listLog(tx, opening.fields.id))).map((row) => row.body)).toEqual([
      note('kept'),
      note('lost'),
    ])
  })

  it('[P9] two phones that wrote into one job end with the same rows, in the same order', async () => {
    const left = await phoneOf(world.a, 'mechanic')
    const right = await phoneOf(world.a, 'owner')
    const opening = jobOpen(world.a.machineId)
    await sync(left.device, [left.device.op(opening)])
    await Promise.all(
      [left, right].flatMap(({ device: from }) =>
        Array.from({ length: 5 }, (_, i) =>
          sendAll(from, [from.op(logAdd(from, opening.fields.id, note(`${from.id} ${i}`)))]),
        ),
      ),
    )
    const seen = await Promise.all(
      [left, right].map(async ({ device: from, cookie: its }) => {
        const rows = await pullAll(from, its)
        return rows
          .filter((row) => row.jobId === opening.fields.id)
          .map((row) => JSON.stringify([row.entity, row.row]))
      }),
    )
    expect(seen[0]).toHaveLength(11)
    expect(seen[0]).toEqual(seen[1])
    for (const { device: from, cookie: its } of [left, right])
      expect(await pullAll(from, its)).toEqual([])
  })
})
