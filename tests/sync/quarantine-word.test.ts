import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { takeChanges } from '@/db/queries/changes'
import { findJob } from '@/db/queries/jobs'
import { listLog } from '@/db/queries/log-entries'
import { setRoles } from '@/db/queries/people'
import type { Op } from '@/lib/sync/protocol/op'
import { jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import { deskOf, type OwnersDesk } from '../support/quarantine-world'
import type { RawDevice } from '../support/raw-device'
import {
  openSyncWorld,
  phoneOf,
  problemOf,
  type SyncWorld,
  signIn,
  sync,
} from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

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

describe('the owner’s word', () => {
  it('[Q5] applies an accepted op as its person’s, with change number and record', async () => {
    const { device, jobId } = await revoked()
    const op = entry(device, jobId, 'Plug was wet')
    await sync(device, [op])
    const { items } = await desk.phone(device.id)
    expect(items).toMatchObject([
      { opId: op.id, kind: 'log.add', jobId, entry: { body: { words: 'Plug was wet' } } },
    ])
    expect(items[0]?.jobWords).toMatch(/^J-\d+, Starts, runs/)
    const answer = await desk.decided(device.id, { decision: 'accept', opId: op.id })
    expect(answer).toEqual([{ opId: op.id, is: 'accepted', file: 'none' }])
    expect(await log(jobId)).toMatchObject([
      { authorId: device.owner.personId, deviceId: device.id, body: { words: 'Plug was wet' } },
    ])
    const again = await desk.decided(device.id, { decision: 'accept', opId: op.id })
    expect(again).toMatchObject([{ is: 'accepted' }])
    expect(await log(jobId)).toHaveLength(1)
    const audit = await inA((tx) => listAudit(tx, null))
    expect(audit.filter((one) => one.entityId === op.id)).toMatchObject([
      { action: 'quarantine.accepted', actorId: world.a.people.owner?.id },
    ])
    await expectWholeShop(world.a.id)
  })

  it('[Q5] judges with the roles of the day it was revoked, not with today’s', async () => {
    const { device, jobId } = await revoked('both')
    const ask = device.op(partRequestAsk(jobId))
    await sync(device, [ask])
    const personId = device.owner.personId
    await inA(async (tx) => {
      await setRoles(tx, { personId, roles: ['guide'] })
      await takeChanges(tx, [{ entity: 'person', id: personId, jobId: null }])
    })
    const answer = await desk.decided(device.id, { decision: 'accept', opId: ask.id })
    expect(answer).toMatchObject([{ is: 'accepted' }])
  })

  it('[Q5] says what the rules would refuse, and leaves it where it is', async () => {
    const { device, jobId } = await revoked('guide')
    const machine = device.op(machineAdd())
    const stale = device.op({
      kind: 'job.move',
      jobId,
      entityId: jobId,
      fields: { from: 'waitingParts', to: 'underWay', reason: null },
    })
    await sync(device, [machine, stale])
    const word = (op: Op) => desk.decided(device.id, { decision: 'accept', opId: op.id })
    expect(await word(machine)).toMatchObject([{ is: 'left', code: 'forbidden' }])
    expect(await word(stale)).toMatchObject([
      { is: 'left', code: 'stale_status', detail: expect.stringContaining('open') },
    ])
    expect((await stored()).map((op) => op.opId)).not.toContain(stale.id)
    const { items } = await desk.phone(device.id)
    expect(items.map((item) => item.decision)).toEqual([null, null])
  })

  it('[Q6] refuses with a reason, on record, and keeps what was refused', async () => {
    const { device, jobId } = await revoked()
    const op = entry(device, jobId)
    await sync(device, [op])
    const none = await desk.decide(device.id, { decision: 'refuse', opId: op.id, reason: '' })
    expect(none.status).toBe(400)
    const form = { decision: 'refuse', opId: op.id, reason: 'Not written by Test mechanic' }
    expect(await desk.decided(device.id, form)).toEqual([{ opId: op.id, is: 'refused' }])
    expect(await log(jobId)).toEqual([])
    expect((await desk.phone(device.id)).items).toMatchObject([
      { decision: 'refused', reason: form.reason, entry: { body: { words: 'late' } } },
    ])
    const audit = await inA((tx) => listAudit(tx, null))
    expect(audit.filter((one) => one.entityId === op.id)).toMatchObject([
      { action: 'quarantine.refused' },
    ])
    const late = await desk.decide(device.id, { decision: 'accept', opId: op.id })
    expect(await problemOf(late)).toMatchObject({ status: 409, kind: 'decidedBefore' })
    expect((await sync(device, [op])).taken).toEqual([op.id])
    expect(await log(jobId)).toEqual([])
  })

  it('[Q5] takes all of a phone in the order it was made, and what waits for a parent after it', async () => {
    const { device } = await revoked()
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    const job = device.op(opening)
    const entries = ['one', 'two', 'three'].map((words) => entry(device, jobId, words))
    const [one, two, three] = entries
    await sync(device, [three, job, one, two])
    const before = await desk.decided(device.id, { decision: 'accept', opId: one?.id ?? '' })
    expect(before).toMatchObject([{ is: 'left', code: 'waits', detail: jobId }])
    const all = await desk.decided(device.id, { decision: 'accept', opId: null })
    expect(all.map((item) => item.is)).toEqual(Array(4).fill('accepted'))
    expect((await log(jobId)).map((row) => row.body)).toMatchObject([
      { words: 'one' },
      { words: 'two' },
      { words: 'three' },
    ])
    expect(await inA((tx) => findJob(tx, jobId))).toMatchObject({ openedBy: device.owner.personId })
    await expectWholeShop(world.a.id)
  })

  it('[Q6] refuses all of a phone for one reason', async () => {
    const { device, jobId } = await revoked()
    await sync(device, [entry(device, jobId), entry(device, jobId)])
    const form = { decision: 'refuse', opId: null, reason: 'Found by a stranger' }
    expect(await desk.decided(device.id, form)).toMatchObject([
      { is: 'refused' },
      { is: 'refused' },
    ])
    expect(await log(jobId)).toEqual([])
  })
})
