// What was taken back is remembered for 180 days; who was away for longer pulls anew (P10, fault 29).
import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { findPartRequest } from '@/db/queries/part-requests'
import type { Cursor } from '@/lib/sync/protocol/message'
import { pruneChanges } from '@/lib/work/prune-changes'
import { jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import { opsOf } from '../support/field-sets'
import {
  exchangeOf,
  openSyncWorld,
  phoneOf,
  pullAll,
  type SyncWorld,
  sync,
} from '../support/sync-world'

const DAY_MS = 24 * 3_600_000
let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

type Phone = Awaited<ReturnType<typeof phoneOf>>
const away = (days: number) =>
  sql`update change_log set changed_at = changed_at - make_interval(days => ${days})
    where shop_id = ${world.a.id}`.execute(world.db.admin)
const prune = () => pruneChanges({ shopId: world.a.id }, { now: Date.now() })
const pullOf = async (phone: Phone, cursor: Cursor | null) =>
  (await exchangeOf(phone.device.push([], { cookie: phone.cookie, cursor }))).pull

/** A phone that holds a request, and another that takes it back. */
async function takenBack() {
  const keeper = await phoneOf(world.a, 'mechanic')
  const old = await phoneOf(world.a, 'second')
  const opening = jobOpen(world.a.machineId)
  const request = partRequestAsk(opening.fields.id)
  const of = { jobId: opening.fields.id, requestId: request.fields.id }
  await sync(keeper.device, [keeper.device.op(opening), keeper.device.op(request)])
  const rows = await pullAll(old.device, old.cookie)
  expect(rows.map((row) => row.id)).toContain(of.requestId)
  await sync(keeper.device, [opsOf(keeper.device).dropRequest(of)])
  return { keeper, old, of, lineId: request.fields.lines[0]?.id ?? '' }
}

describe('tombstones', () => {
  it('[P10] within 180 days the phone is told what is gone, and nothing is pruned', async () => {
    const { old, of } = await takenBack()
    await away(170)
    await prune()
    await prune()
    const rows = await pullAll(old.device, old.cookie)
    expect(rows.find((row) => row.id === of.requestId)).toMatchObject({ state: 'deleted' })
    await away(-170)
  })

  it('[P10] [fault 29] after 181 days: reset, its unsent work taken, nothing gone comes back', async () => {
    const { keeper, old, of, lineId } = await takenBack()
    await pullAll(keeper.device, keeper.cookie)
    await away(181)
    await prune()
    const announced = await pullOf(old, old.device.cursor)
    expect(announced.kind).toBe('reset')
    await prune()
    const gone = await sql<{ n: number }>`select count(*)::int as n from change_log
      where shop_id = ${world.a.id} and entity_id = ${of.requestId}`.execute(world.db.admin)
    expect(gone.rows[0]?.n).toBe(0)

    const line = old.device.op(logAdd(old.device, of.jobId, note('written before all that')))
    const edit = opsOf(old.device).countLine(of, lineId, 3)
    const said = await sync(old.device, [line, edit], { cookie: old.cookie })
    expect(said.taken).toEqual([line.id, edit.id])
    expect(said.results).toMatchObject([{ opId: edit.id, code: 'no_parent' }])
    expect(said.pull.kind).toBe('reset')
    const rows = await pullAll(old.device, old.cookie)
    expect(rows.map((row) => row.id)).toContain(line.entityId)
    expect(rows.map((row) => row.id)).not.toContain(of.requestId)
    expect(await asShop(world.a.id, (tx) => findPartRequest(tx, of.requestId))).toBeUndefined()
  })

  it('[P10] a phone that was there all the time goes on where it stood', async () => {
    const { keeper } = await takenBack()
    await pullAll(keeper.device, keeper.cookie)
    await away(181)
    await prune()
    await prune()
    const machine = machineAdd()
    await sync(keeper.device, [keeper.device.op(machine)])
    const pull = await pullOf(keeper, keeper.device.cursor)
    expect(pull).toMatchObject({ kind: 'page', rows: [{ id: machine.fields.id }] })
    // And so does an app of the version before: the cursor has the shape it knows.
    expect(Object.keys(keeper.device.cursor ?? {}).sort()).toEqual([
      'epoch',
      'scopeVersion',
      'seq',
      'shop',
    ])
  })

  it('[P10] a pull begun after the pruning is not sent back to its start from the middle', async () => {
    await takenBack()
    await away(181)
    await prune()
    await prune()
    const fresh = await phoneOf(world.a, 'owner')
    const first = await pullOf(fresh, null)
    if (first.kind !== 'page') throw new Error(first.kind)
    const middle = { ...first.cursor, seq: 1 }
    expect((await pullOf(fresh, middle)).kind).toBe('page')
    const [epoch = ''] = middle.epoch.split('.')
    expect((await pullOf(fresh, { ...middle, epoch })).kind).toBe('reset')
  })

  it('[P10] the task comes by itself: taking back puts it into the queue, for after the time', async () => {
    await takenBack()
    const { rows } = await sql<{ runAt: string }>`
      select run_at from graphile_worker.jobs where task_identifier = 'pruneChanges'
        and key like ${`${world.a.id}:%`} order by run_at desc`.execute(world.db.admin)
    const due = Date.parse(rows[0]?.runAt ?? '')
    expect(due).toBeGreaterThan(Date.now() + 180 * DAY_MS)
  })
})
