import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as getMe } from '@/app/api/me/route'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { takeChanges } from '@/db/queries/changes'
import { listLog } from '@/db/queries/log-entries'
import { revokeMembership } from '@/db/queries/people'
import type { Op } from '@/lib/sync/protocol/op'
import { jobOpen, logAdd, note, partRequestAsk } from '../support/field-ops'
import { deskOf, type OwnersDesk } from '../support/quarantine-world'
import { RawDevice } from '../support/raw-device'
import {
  enrolAt,
  exchangeOf,
  openSyncWorld,
  phoneOf,
  problemOf,
  type SyncWorld,
  signIn,
  sync,
} from '../support/sync-world'

let world: SyncWorld
let desk: OwnersDesk
let owner: string
beforeAll(async () => {
  world = await openSyncWorld()
  owner = (await signIn(world.a, 'owner')).cookie
  desk = deskOf(owner)
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
const NONE_HELD = { ops: 0, photos: 0, oldestAt: null }
const rawOf = (op: Op) => JSON.stringify(op)

/** A phone with a job of its own at the shop, taken out by the owner. */
async function revoked(who = 'mechanic') {
  const { device, cookie } = await phoneOf(world.a, who)
  const opening = jobOpen(world.a.machineId)
  await sync(device, [device.op(opening)], { cookie })
  expect((await desk.revoke(device.id)).status).toBe(200)
  return { device, cookie, jobId: opening.fields.id }
}
const entry = (device: RawDevice, jobId: string, words = 'late') =>
  device.op(logAdd(device, jobId, note(words)))
const log = (jobId: string) => inA((tx) => listLog(tx, jobId))
const stored = () => inA((tx) => tx.selectFrom('syncOp').select('opId').execute())
const kept = () => inA((tx) => tx.selectFrom('quarantineOp').selectAll().execute())
const actions = async () => (await inA((tx) => listAudit(tx, null))).map((one) => one.action)

describe('a revoked phone', () => {
  it('[Q1] is shown nothing at once, also with a copied session', async () => {
    const { device, cookie } = await revoked()
    const answer = await sync(device, [], { cookie })
    expect(answer.pull).toEqual({ kind: 'signIn' })
    const me = new Request('http://shop.invalid/api/me', { headers: { cookie } })
    expect((await getMe(me)).status).toBe(401)
    expect(await actions()).toContain('device.revoked')
  })

  it('[Q1] cannot enrol a copied session’s phone, nor its own key ever again', async () => {
    const { device, cookie } = await revoked()
    const copied = (await phoneOf(world.a, 'second')).device
    expect((await enrolAt(copied, cookie)).status).toBe(401)
    const { cookie: again } = await signIn(world.a, 'mechanic')
    expect(await problemOf(await enrolAt(device, again))).toMatchObject({
      status: 403,
      kind: 'deviceRevoked',
    })
    expect((await sync(device, [], { cookie: again })).pull).toEqual({ kind: 'signIn' })
  })

  it('[Q2] fills no shop: past 10,000 items its work stays on the phone until the owner has decided', async () => {
    const { device, jobId } = await revoked()
    await inA((tx) =>
      sql`insert into quarantine_op (shop_id, op_id, device_id, person_id, roles, dseq, kind, raw, why, received_at)
        select ${world.a.id}, ${device.id} || n, ${device.id}, ${device.owner.personId}, '{}', 1000 + n,
          'log.add', '{}', 'deviceRevoked', now() from generate_series(1, 9999) n`.execute(tx),
    )
    const [last, more] = [entry(device, jobId, 'fits'), entry(device, jobId, 'one too many')]
    expect((await sync(device, [last])).taken).toEqual([last.id])
    const told = await sync(device, [last, more], { held: NONE_HELD })
    expect(told).toMatchObject({ taken: [], order: 'none' })
    expect(told.results).toEqual([last, more].map(({ id }) => ({ opId: id, result: 'retry' })))
    expect((await sync(device, [last])).taken).toEqual([last.id])
  })

  it('[Q2] hands everything over, as it was sent and whatever its time, and touches no job', async () => {
    const { device, jobId } = await revoked()
    const before = await stored()
    device.skewMs = -400 * 24 * 3600 * 1000
    const old = entry(device, jobId, 'a year ago')
    device.skewMs = 3 * 24 * 3600 * 1000
    const ops = [old, entry(device, jobId, 'in three days'), device.op(partRequestAsk(jobId))]
    const strange = { id: 'no uuid at all', dseq: 9, kind: 'job.eat', more: 'ä' }
    const answer = await sync(device, [...ops, strange], { held: { ...NONE_HELD, ops: 2 } })
    expect(answer.taken).toEqual([...ops.map((op) => op.id), strange.id])
    expect(answer).toMatchObject({ results: [], order: 'none', pull: { kind: 'notAsked' } })
    expect(await log(jobId)).toEqual([])
    expect(await stored()).toEqual(before)
    const rows = (await kept()).filter((row) => row.deviceId === device.id)
    expect(new Set(rows.map((row) => row.raw))).toEqual(
      new Set([...ops.map(rawOf), JSON.stringify(strange)]),
    )
    expect(rows.every((row) => row.why === 'deviceRevoked')).toBe(true)
    expect(await actions()).toContain('quarantine.kept')
  })

  it('[Q2] keeps each op once, however often and at once it comes', async () => {
    const { device, jobId } = await revoked()
    const ops = [entry(device, jobId), entry(device, jobId)]
    const answers = await Promise.all([1, 2, 3].map(() => sync(device, ops)))
    for (const answer of answers) expect(answer.taken).toEqual(ops.map((op) => op.id))
    expect((await kept()).filter((row) => row.deviceId === device.id)).toHaveLength(2)
  })

  it('[Q2] keeps other bytes under a used id as well, and nothing of what the shop had before', async () => {
    const { device, cookie } = await phoneOf(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    const first = device.op(opening)
    const had = entry(device, opening.fields.id, 'had')
    await sync(device, [first, had], { cookie })
    await desk.revoke(device.id)
    const late = entry(device, opening.fields.id, 'late')
    const twin = { ...entry(device, opening.fields.id, 'twin'), id: late.id }
    const fake = { ...entry(device, opening.fields.id, 'fake'), id: had.id }
    const answer = await sync(device, [had, late, twin, fake])
    expect(answer.taken).toEqual([had.id, late.id])
    const rows = (await kept()).filter((row) => row.deviceId === device.id)
    expect(rows.map((row) => row.raw).sort()).toEqual([late, twin, fake].map(rawOf).sort())
  })

  it('[Q4] is told to empty itself when it says that nothing is left, and not before', async () => {
    const { device, cookie, jobId } = await revoked()
    const order = async (held?: typeof NONE_HELD | null) =>
      (await sync(device, [entry(device, jobId)], held === undefined ? {} : { held })).order
    expect(await order()).toBe('none')
    expect(await order(null)).toBe('none')
    expect(await order({ ...NONE_HELD, photos: 1 })).toBe('none')
    expect(await order({ ...NONE_HELD, ops: 1 })).toBe('none')
    expect(await order(NONE_HELD)).toBe('wipe')
    expect(await order(NONE_HELD)).toBe('wipe')
    const wipes = (await inA((tx) => listAudit(tx, null))).filter(
      (one) => one.action === 'device.wipeTold' && one.entityId === device.id,
    )
    expect(wipes).toHaveLength(1)
    expect((await desk.phone(device.id)).wipeToldAt).not.toBeNull()
    const { POST } = await import('@/app/api/sync/route')
    const answer = await POST(device.push([], { cookie, held: NONE_HELD }))
    expect(answer.headers.getSetCookie().join()).toMatch(/next-auth.session-token=; .*Max-Age=0/)
    const other = await signIn(world.a, 'guide')
    const shared = await POST(device.push([], { cookie: other.cookie, held: NONE_HELD }))
    expect(shared.headers.getSetCookie()).toEqual([])
  })

  it('[P13] of protocol 1 is heard as well and answered in its own words', async () => {
    const { device, jobId } = await revoked()
    const op = entry(device, jobId)
    const { POST } = await import('@/app/api/sync/route')
    const answer = await POST(device.push([op], { protocol: 1 }))
    const said = (await answer.json()) as Record<string, unknown>
    expect(said).toMatchObject({ protocol: 1, taken: [op.id] })
    expect(Object.keys(said)).not.toContain('order')
  })

  it('[P18] with an unknown key stays unknown', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    await desk.revoke(device.id)
    const stranger = new RawDevice(device.owner)
    await expect(exchangeOf(stranger.push([]))).rejects.toThrow(/401.*unknownDevice/)
  })

  it('[Q1] only an owner revokes, sees the list, and decides; another shop’s phone is not there', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    for (const who of ['mechanic', 'guide', 'dispatcher', 'parts']) {
      const its = deskOf((await signIn(world.a, who)).cookie)
      expect((await its.revoke(device.id)).status).toBe(403)
      expect((await its.decide(device.id, { decision: 'accept', opId: null })).status).toBe(403)
      await expect(its.phones()).rejects.toThrow('403')
    }
    const stranger = deskOf((await signIn(world.b, 'owner')).cookie)
    expect((await stranger.revoke(device.id)).status).toBe(404)
    expect((await deskOf('').revoke(device.id)).status).toBe(401)
    expect((await desk.revoke(device.id, '   ')).status).toBe(400)
    expect((await desk.phone(device.id)).revoked).toBeNull()
  })
})

describe('the phone of somebody who left', () => {
  it('[Q1] [Q2] pulls nothing and is heard into quarantine, with the roles as they were', async () => {
    const { device, cookie } = await phoneOf(world.b, 'second')
    const opening = jobOpen(world.b.machineId)
    await sync(device, [device.op(opening)], { cookie })
    const { personId } = device.owner
    await asShop(world.b.id, async (tx) => {
      await revokeMembership(tx, { personId, now: new Date().toISOString() })
      await takeChanges(tx, [{ entity: 'person', id: personId, jobId: null }])
    })
    const op = entry(device, opening.fields.id)
    const answer = await sync(device, [op], { cookie, held: NONE_HELD })
    expect(answer).toMatchObject({ taken: [op.id], pull: { kind: 'signIn' }, order: 'wipe' })
    const rows = await asShop(world.b.id, (tx) =>
      tx.selectFrom('quarantineOp').selectAll().execute(),
    )
    expect(rows).toMatchObject([{ opId: op.id, why: 'membershipEnded', roles: ['mechanic'] }])
    const its = deskOf((await signIn(world.b, 'owner')).cookie)
    await its.decided(device.id, { decision: 'accept', opId: op.id })
    const entries = await asShop(world.b.id, (tx) => listLog(tx, opening.fields.id))
    expect(entries).toMatchObject([{ authorId: personId, deviceId: device.id }])
  })
})
