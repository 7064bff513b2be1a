// Faults 1, 4, 6 and 10 of the fault list: what may happen between the shop's program and its database.
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/sync/route'
import { asShop, switchDatabase } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { listLog } from '@/db/queries/log-entries'
import { insertMachines } from '@/db/queries/machines'
import { findOps } from '@/db/queries/sync-ops'
import { openDatabaseLine } from '../support/database-line'
import { jobOpen, logAdd, machineAdd, note } from '../support/field-ops'
import { note as noteOf } from '../support/phone-world'
import type { RawDevice } from '../support/raw-device'
import { realPhone, statesOf } from '../support/real-phone'
import { machineOf, newId } from '../support/shop-fixture'
import { exchangeOf, openSyncWorld, phoneOf, type SyncWorld, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'
import { machineChange, wait } from '../support/writers'

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
const idsPulled = async () => {
  const { pull } = await sync(device, [], { cookie })
  return pull.kind === 'page' ? pull.rows.map((row) => row.id) : []
}

/** A job, twelve lines of its log, and in the middle a step the shop refuses. */
function batchOf(from: RawDevice) {
  const opening = jobOpen(world.a.machineId)
  const jobId = opening.fields.id
  const lines = Array.from({ length: 12 }, (_, i) => from.op(logAdd(from, jobId, note(`l${i}`))))
  const stale = from.op({
    kind: 'job.move',
    entityId: jobId,
    jobId,
    fields: { from: 'closed', to: 'open', reason: null },
  })
  const ops = [from.op(opening), ...lines.slice(0, 6), stale, ...lines.slice(6)]
  return { jobId, ops, stale, lines }
}

/**
 * How long the transactions of fault 6 stay open, ms: longer than any wait that ends by itself (locks are
 * waited for 2 s). The fault's own 60 s: `HELD_MS=60000 npm test -- unit faults-commit`.
 */
const HELD_MS = Number(process.env.HELD_MS ?? 2_300)

describe('the connection of the shop’s program, cut at a commit', () => {
  it.each(['before', 'after'] as const)(
    '[fault 1] [P4] [P6] cut %s the commit was done: asked again, each op is there once, with the same answer',
    async (how) => {
      const line = await openDatabaseLine(world.db.appUrl)
      await switchDatabase(line.url)
      const { jobId, ops, stale, lines } = batchOf(device)
      const cut = line.cutCommit(how)
      const lost = await POST(device.push(ops))
      await cut
      // The phone hears that the shop is busy, and keeps everything.
      expect(lost.status).toBe(503)
      expect(Number(lost.headers.get('retry-after'))).toBeGreaterThan(0)
      await switchDatabase(world.db.appUrl)
      await line.close()
      const stored = await inA((tx) =>
        findOps(
          tx,
          ops.map((op) => op.id),
        ),
      )
      expect(stored.size).toBe(how === 'before' ? 0 : ops.length)
      const first = await exchangeOf(device.push(ops))
      const second = await exchangeOf(device.push(ops))
      for (const answer of [first, second]) {
        expect(answer.taken).toEqual(ops.map((op) => op.id))
        expect(answer.results.find((result) => result.opId === stale.id)).toEqual({
          opId: stale.id,
          result: 'rejected',
          code: 'stale_status',
          field: 'fields.from',
          detail: 'open',
        })
      }
      const others = second.results.filter((result) => result.opId !== stale.id)
      expect(new Set(others.map((result) => result.result))).toEqual(new Set(['duplicate']))
      const log = await inA((tx) => listLog(tx, jobId))
      expect(log.map((entry) => entry.id)).toEqual(lines.map((op) => op.entityId))
      await expectWholeShop(world.a.id)
    },
  )
})

describe('writers and readers at once', () => {
  it('[fault 4] [P7] of two that began one way and commit the other, a reader between misses neither', async () => {
    await idsPulled()
    const [early, late] = [newId(), newId()]
    let wrote: () => void = () => undefined
    let goOn: () => void = () => undefined
    const hasWritten = new Promise<void>((done) => {
      wrote = done
    })
    const mayCommit = new Promise<void>((done) => {
      goOn = done
    })
    const slow = inA(async (tx) => {
      await insertMachines(tx, [machineOf(early)])
      wrote()
      await mayCommit
      await takeChanges(tx, [machineChange(early)])
    })
    await hasWritten
    await inA(async (tx) => {
      await insertMachines(tx, [machineOf(late)])
      await takeChanges(tx, [machineChange(late)])
    })
    expect(await idsPulled()).toEqual([late])
    goOn()
    await slow
    expect(await idsPulled()).toEqual([early])
    expect(await idsPulled()).toEqual([])
  })

  it(
    '[fault 6] [P7] a transaction left open in another shop, and one in another database, delay nothing',
    async () => {
      const elsewhere = new URL(world.db.adminUrl)
      elsewhere.pathname = '/postgres'
      const holders = [world.db.adminUrl, elsewhere.href].map(
        (connectionString) => new pg.Client({ connectionString }),
      )
      const [shopB, other] = holders as [pg.Client, pg.Client]
      await Promise.all(holders.map((client) => client.connect()))
      // Both have written, so both hold the horizon of old rows back; one holds its shop's counter as well.
      await shopB.query('begin')
      await shopB.query('update shop_counter set seq = seq where shop_id = $1', [world.b.id])
      await other.query('begin')
      await other.query('create temp table held_open (at int)')
      const until = Date.now() + HELD_MS
      for (let rounds = 0; Date.now() < until || rounds < 3; rounds += 1) {
        const op = device.op(machineAdd())
        const { taken, results, pull } = await sync(device, [op], { cookie })
        expect({ taken, results }).toEqual({ taken: [op.id], results: [] })
        expect(pull).toMatchObject({ kind: 'page', rows: [{ id: op.entityId }] })
        await wait(HELD_MS / 100)
      }
      for (const client of holders) {
        const { rows } = await client.query<{ age: number }>(
          'select extract(epoch from clock_timestamp() - now())::float as age',
        )
        expect(rows[0]?.age).toBeGreaterThan(HELD_MS / 1000)
      }
      await Promise.all(holders.map((client) => client.end()))
    },
    HELD_MS + 20_000,
  )
})

describe('a database that lets nobody in', () => {
  it('[fault 10] [P16] with no connection left the phone backs off, sets nothing aside, and sends all afterwards', async () => {
    const delays: number[] = []
    const timer = {
      after: (ms: number) => {
        delays.push(ms)
        return () => undefined
      },
    }
    const { phone } = await realPhone(world.a, 'mechanic', { ports: { timer } })
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    const name = new URL(world.db.appUrl).pathname.slice(1)
    const limit = (of: number) => pgAdmin(`alter database ${name} connection limit ${of}`)
    await limit(0)
    await switchDatabase(world.db.appUrl)
    await phone.record([opening, noteOf(phone, jobId, 'Kept'), noteOf(phone, jobId, 'Too')])
    await phone.sync()
    expect(await statesOf(phone)).toEqual(['waiting', 'waiting', 'waiting'])
    // The shop said 5 s; the phone adds its own share of a busy shop's pause.
    expect(delays.at(-1)).toBeGreaterThanOrEqual(5_000)
    await limit(-1)
    await phone.sync()
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, stuckCount: 0 })
    expect(await inA((tx) => listLog(tx, jobId))).toHaveLength(2)
  })

  it('[fault 10] [P16] with every connection of the program taken it answers that it is busy, and does not hang', async () => {
    const busy = Array.from({ length: 10 }, () =>
      asShop(world.b.id, (tx) =>
        tx.selectNoFrom((eb) => eb.fn('pg_sleep', [eb.val(30)]).as('slept')).execute(),
      ).catch((error: unknown) => error),
    )
    await wait(100)
    const op = device.op(machineAdd())
    const answer = await POST(device.push([op]))
    expect(answer.status).toBe(503)
    expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(0)
    await pgAdmin(`select pg_cancel_backend(pid) from pg_stat_activity
      where datname = '${world.db.name}' and usename = 'farbench_app' and query like '%pg_sleep%'`)
    await Promise.all(busy)
    expect((await sync(device, [op])).taken).toEqual([op.id])
    await expectWholeShop(world.a.id)
  })

  async function pgAdmin(text: string) {
    const client = new pg.Client({ connectionString: world.db.adminUrl })
    await client.connect()
    await client.query(text)
    await client.end()
  }
})
