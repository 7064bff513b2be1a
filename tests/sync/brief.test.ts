import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { ownRuns, runsOf, unfolded } from '@/lib/sync/protocol/brief'
import { type PullRow, type SyncResponse, syncResponse } from '@/lib/sync/protocol/message'
import type { Op } from '@/lib/sync/protocol/op'
import { jobOpen, logAdd, machineAdd, note } from '../support/field-ops'
import type { RawDevice } from '../support/raw-device'
import { openSyncWorld, phoneOf, type SyncWorld, sync } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

/** A phone that is up to date, with a job of its own at the shop. */
async function atWork() {
  const { device, cookie } = await phoneOf(world.a, 'mechanic')
  const machine = machineAdd()
  const job = jobOpen(machine.fields.id)
  await sync(device, [device.op(machine), device.op(job)], { cookie })
  return { device, cookie, jobId: job.fields.id }
}

const notes = (device: RawDevice, jobId: string, count: number): Op[] =>
  Array.from({ length: count }, (_, n) =>
    device.op(logAdd(device, jobId, note(`Plug is dry, look ${n}`))),
  )
const rowsOf = ({ pull }: SyncResponse) => (pull.kind === 'page' ? pull.rows : [])
const ownOf = ({ pull }: SyncResponse) => (pull.kind === 'page' ? (pull.own ?? []) : [])
const withoutHash = (row: unknown) => ({ ...(row as object), hash: undefined })

describe('[P5] a brief answer', () => {
  it('[P9] says of own entries no word again, and unfolds to what the long answer says', async () => {
    const { device, cookie, jobId } = await atWork()
    const before = device.cursor
    const ops = notes(device, jobId, 40)
    const answer = await sync(device, ops, { cookie, brief: true })
    expect(answer.taken).toEqual([])
    expect(answer.takenNumbers).toEqual([[ops[0]!.dseq, ops.at(-1)!.dseq]])
    expect(rowsOf(answer)).toEqual([])
    expect(ownOf(answer)).toHaveLength(1)
    const long = unfolded(answer, ops)!
    expect(long.taken).toEqual(ops.map((op) => op.id))
    const cursor = device.cursor
    device.cursor = before
    const whole = await sync(device, [], { cookie })
    expect(device.cursor).toEqual(cursor)
    // Put together from the ops that were sent, and marked as such.
    const rows: PullRow[] = rowsOf(long)
    const own = rows.map(({ own, ...row }) => ({ own, ...row, row: withoutHash(row.row) }))
    expect(own.map((row) => row.own)).toEqual(ops.map(() => true))
    expect(own.map(({ own: _, ...row }) => row)).toEqual(
      rowsOf(whole).map((row) => ({ ...row, row: withoutHash(row.row) })),
    )
  })

  it('[P4] is the same for ops sent again whose answer was lost', async () => {
    const { device, cookie, jobId } = await atWork()
    const before = device.cursor
    const ops = notes(device, jobId, 5)
    const first = unfolded(await sync(device, ops, { cookie, brief: true }), ops)!
    device.cursor = before
    const again = unfolded(await sync(device, ops, { cookie, brief: true }), ops)!
    expect(again.taken).toEqual(first.taken)
    expect(rowsOf(again)).toEqual(rowsOf(first))
  })

  it('[P5] leaves out what the shop refused, and tells other rows in full', async () => {
    const { device, cookie, jobId } = await atWork()
    const other = await phoneOf(world.a, 'second')
    const foreign = notes(other.device, jobId, 2)
    await sync(other.device, foreign)
    const [good, bad, late] = notes(device, jobId, 3) as [Op, Op, Op]
    const refused = { ...bad, fields: { ...bad.fields, jobId: 'no id' } }
    const ops = [good, refused, late] as Op[]
    const answer = await sync(device, ops, { cookie, brief: true })
    expect(answer.results).toMatchObject([{ opId: bad.id, result: 'rejected', code: 'invalid' }])
    expect(answer.takenNumbers).toEqual([[good.dseq, late.dseq]])
    expect(ownOf(answer).map(({ dseq, count }) => [dseq, count])).toEqual([
      [good.dseq, 1],
      [late.dseq, 1],
    ])
    expect(rowsOf(answer).map((row) => row.id)).toEqual(foreign.map((op) => op.entityId))
    expect(rowsOf(answer).every((row) => !('hash' in (row.row as object)))).toBe(true)
  })

  it('[P4] never passes off a used id as an own entry', async () => {
    const { device, cookie, jobId } = await atWork()
    const [first] = notes(device, jobId, 1) as [Op]
    await sync(device, [first], { cookie })
    const other = { ...device.op(logAdd(device, jobId, note('Something else'))), id: first.id }
    const answer = await sync(device, [other], { cookie, brief: true })
    expect(answer.results).toMatchObject([{ opId: first.id, code: 'id_reuse' }])
    expect(ownOf(answer)).toEqual([])
  })

  it('[P13] goes to nobody who did not ask', async () => {
    const { device, cookie, jobId } = await atWork()
    const ops = notes(device, jobId, 3)
    const answer = await sync(device, ops, { cookie })
    expect(answer.taken).toEqual(ops.map((op) => op.id))
    expect(answer.takenNumbers).toBeUndefined()
    expect(ownOf(answer)).toEqual([])
    expect(rowsOf(answer).every((row) => 'hash' in (row.row as object))).toBe(true)
  })
})

describe('[P17] unfolding', () => {
  const answer = (changes: object) =>
    syncResponse.parse({
      protocol: 2,
      serverTime: '2026-11-24T18:40:00.000Z',
      taken: [],
      results: [],
      pull: { kind: 'notAsked' },
      ...changes,
    })

  it('[P17] takes no answer that speaks of ops never sent', () => {
    expect(unfolded(answer({ takenNumbers: [[1, 2]] }), [])).toBeUndefined()
    expect(unfolded(answer({ takenNumbers: [[1, 10_000_000_000]] }), [])).toBeUndefined()
    const run = { dseq: 7, seq: 1, order: 1, count: 1, receivedAt: '2026-11-24T18:40:00.000Z' }
    const cursor = {
      epoch: 'e',
      shop: '01980000-0000-7000-8000-000000000001',
      scopeVersion: 1,
      seq: 1,
    }
    const pull = { kind: 'page', rows: [], own: [run], cursor, more: false }
    expect(unfolded(answer({ pull }), [])).toBeUndefined()
  })

  it('[P5] makes runs of what follows on, and only of that', () => {
    expect(runsOf([])).toEqual([])
    expect(runsOf([3, 1, 2, 2, 7])).toEqual([
      [1, 3],
      [7, 7],
    ])
    const entry = { dseq: 4, seq: 10, order: 2, receivedAt: 'now' }
    const next = { dseq: 5, seq: 11, order: 3, receivedAt: 'now' }
    expect(ownRuns([entry, next])).toEqual([{ ...entry, count: 2 }])
    for (const odd of [{ seq: 12 }, { order: 4 }, { dseq: 6 }, { receivedAt: 'later' }])
      expect(ownRuns([entry, { ...next, ...odd }])).toHaveLength(2)
  })
})
