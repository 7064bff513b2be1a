import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { asShop } from '@/db/client'
import { listLog } from '@/db/queries/log-entries'
import { findOps } from '@/db/queries/sync-ops'
import type { Op } from '@/lib/sync/protocol/op'
import { fullOp, fullRow, shortOp, shortRow } from '@/lib/sync/protocol/short'
import { jobOpen, logAdd, machineAdd, note } from '../support/field-ops'
import { openSyncWorld, phoneOf, type SyncWorld, sync } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

const plain = (value: unknown) => JSON.parse(JSON.stringify(value)) as unknown

describe('[P9] the short form of ops and rows', () => {
  it('leaves out what is said beside it, and the reader puts it back', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const said = { dev: device.id, personId: world.a.people.mechanic!.id }
    // All of it in one millisecond, as on a phone: what is written at the time of its op is left out.
    vi.useFakeTimers({ toFake: ['Date'] })
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    const entry = device.op(logAdd(device, jobId, note('Spark is weak')))
    const move = { kind: 'job.move', entityId: jobId, jobId } as const
    const fields = { from: 'open', to: 'underWay', reason: null } as const
    const ops: Op[] = [
      device.op(machineAdd()),
      device.op(opening),
      { ...entry, id: entry.entityId },
      // Of somebody else, or not as the others: nothing may be left out that would come back as ours.
      { ...entry, dev: world.a.id, entityId: world.b.id },
      device.op({ ...move, fields }),
    ]
    vi.useRealTimers()
    for (const op of ops) {
      const short = plain(shortOp(op, said))
      expect(fullOp(short, said)).toEqual(op)
      expect(JSON.stringify(short).length).toBeLessThan(JSON.stringify(op).length)
    }
    const short = plain(shortOp(ops[2] as Op, said)) as { fields: object }
    const left = ['writtenAt', 'authorId', 'deviceId', 'id', 'jobId', 'supersedes']
    for (const key of left) expect(Object.keys(short.fields)).not.toContain(key)
  })

  it('keeps anything that is no op as it is', () => {
    const said = { dev: world.a.id, personId: world.b.id }
    for (const odd of [null, 7, 'words', [], [{}]]) expect(fullOp(odd, said)).toEqual(odd)
    expect(fullOp({ kind: 'log.add', fields: null }, said)).toMatchObject({ fields: null })
    const row = { entity: 'photo', id: 'x', jobId: null, row: { id: 'x' } }
    expect(shortRow(row)).toBe(row)
    expect(fullRow({ ...row, entity: 'logEntry', row: null })).toMatchObject({ row: null })
  })

  it('[P4] is the same op to the shop in either form, and settled once', async () => {
    const { device, cookie } = await phoneOf(world.a, 'mechanic')
    const said = { dev: device.id, personId: device.owner.personId }
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    const made = device.op(logAdd(device, jobId, note('Told once')))
    const ops = [device.op(opening), { ...made, id: made.entityId }] as Op[]
    const brief = await sync(
      device,
      ops.map((op) => shortOp(op, said)),
      { cookie, brief: true },
    )
    expect(brief.takenNumbers).toEqual([[1, 2]])
    const inFull = await sync(device, ops, { cookie })
    expect(inFull.results).toEqual(ops.map((op) => ({ opId: op.id, result: 'duplicate' })))
    const log = await asShop(world.a.id, (tx) => listLog(tx, jobId))
    expect(log).toMatchObject([{ ...ops[1]?.fields }])
    const stored = await asShop(world.a.id, (tx) =>
      findOps(
        tx,
        ops.map((op) => op.id),
      ),
    )
    for (const op of ops) expect(JSON.parse(stored.get(op.id)?.raw ?? '')).toEqual(op)
  })

  it('reads rows in short from a pull that asks for it, and in full from one that does not', async () => {
    const { device, cookie } = await phoneOf(world.a, 'mechanic')
    const { device: other, cookie: its } = await phoneOf(world.a, 'dispatcher')
    const opening = jobOpen(world.a.machineId)
    const made = device.op(logAdd(device, opening.fields.id, note('For the desk')))
    await sync(device, [device.op(opening), { ...made, id: made.entityId }], { cookie })
    const rowOf = async (more: { brief?: boolean }) => {
      other.cursor = null
      const { pull } = await sync(other, [], { cookie: its, ...more })
      return pull.kind === 'page' ? pull.rows.find((row) => row.id === made.entityId) : undefined
    }
    const [long, short] = [await rowOf({}), await rowOf({ brief: true })]
    expect(long?.row).toMatchObject(made.fields)
    expect(Object.keys(short?.row as object)).not.toContain('jobId')
    const { hash: _, ...words } = (long?.row ?? {}) as { hash?: string }
    expect(short && fullRow(short)).toEqual({ ...long, row: words })
  })
})
