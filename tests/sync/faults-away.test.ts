// Faults 11, 13, 14 and 18 of the fault list: phones that were away, or whose clock or shop changed meanwhile.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { findDevice } from '@/db/queries/devices'
import { listFieldWrites } from '@/db/queries/field-history'
import { assignJob, findJob } from '@/db/queries/jobs'
import { listLog } from '@/db/queries/log-entries'
import { revokeMembership, setRoles } from '@/db/queries/people'
import { revokeSession } from '@/db/queries/sign-in'
import { findOps } from '@/db/queries/sync-ops'
import { databases } from '../support/field-app'
import { jobOpen, logAdd, note as noteBody, partRequestAsk } from '../support/field-ops'
import { opsOf } from '../support/field-sets'
import { FieldWorld, note as noteOf } from '../support/field-world'
import { testClock } from '../support/phone'
import { note } from '../support/phone-world'
import { realPhone, statesOf } from '../support/real-phone'
import { exchangeOf, phoneOf, pullAll, type SyncWorld, signIn, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let at: FieldWorld
let world: SyncWorld
beforeAll(async () => {
  at = await FieldWorld.open()
  world = at.world
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
const logOf = (jobId: string) => inA((tx) => listLog(tx, jobId))
const DAY_MS = 24 * 3_600_000
const YEAR_MS = 365 * DAY_MS

it('[fault 11] [P18] three weeks without a session, and one that ends in the middle of a pull: pushes go on, nothing is dropped', async () => {
  const clock = testClock(Date.now())
  const { phone, line, sessionId } = await realPhone(world.a, 'mechanic', { ports: { clock } })
  const opening = jobOpen(world.a.machineId)
  const jobId = opening.fields.id
  await phone.record([opening])
  await phone.sync()
  // Meanwhile another phone fills more pages than one.
  const { device } = await phoneOf(world.a, 'second')
  const long = 'w'.repeat(1_900)
  const lines = Array.from({ length: 260 }, () => device.op(logAdd(device, jobId, noteBody(long))))
  await sync(device, lines)
  line.asked.length = 0
  line.after = async () => {
    await inA((tx) => revokeSession(tx, { id: sessionId, now: new Date().toISOString() }))
  }
  await phone.sync()
  expect(line.asked.length).toBeGreaterThan(1)
  expect((await phone.see(phone.phone.unsent)).needs).toBe('signIn')
  const held = (await phone.rows('logEntry')).length
  expect(held).toBeGreaterThan(0)
  expect(held).toBeLessThan(260)
  for (let week = 1; week <= 3; week += 1) {
    clock.pass(7 * DAY_MS)
    await phone.record([note(phone, jobId, `week ${week}`)])
    await phone.sync()
    expect(await phone.see(phone.phone.unsent)).toMatchObject({
      count: 0,
      stuckCount: 0,
      needs: 'signIn',
    })
  }
  expect(
    (await logOf(jobId)).filter((row) => row.authorId === phone.phone.actor.personId),
  ).toHaveLength(3)
  expect((await phone.see(phone.phone.log(jobId))).length).toBe(held + 3)
  line.after = () => Promise.resolve()
  line.cookie = (await signIn(world.a, 'mechanic')).cookie
  await phone.sync()
  expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, needs: null })
  expect(await phone.rows('logEntry')).toHaveLength(263)
})

describe('[fault 13] what changed at the shop while the phone was away', () => {
  it('[fault 13] [P11] a role taken away: its rows leave the phone, its op is refused, the evidence is taken', async () => {
    const { phone, line } = await realPhone(world.b, 'owner')
    const own = jobOpen(world.b.machineId)
    const jobId = own.fields.id
    await phone.record([own])
    await phone.sync()
    const { device } = await phoneOf(world.b, 'second')
    const foreign = jobOpen(world.b.machineId)
    const of = foreign.fields.id
    await sync(device, [device.op(foreign), device.op(logAdd(device, of, noteBody('theirs')))])
    await asShop(world.b.id, async (tx) => {
      await assignJob(tx, { jobId: of, personId: world.b.people.second?.id ?? '' })
      await takeChanges(tx, [{ entity: 'job', id: of, jobId: of, whole: true }])
    })
    await phone.sync()
    const ids = async () => ((await phone.rows('job')) as { id: string }[]).map((row) => row.id)
    expect(await ids()).toContain(of)
    line.fault = 'noLine'
    await phone.record([note(phone, jobId, 'seen while away'), partRequestAsk(jobId)])
    const { personId } = phone.phone.actor
    await asShop(world.b.id, async (tx) => {
      await setRoles(tx, { personId, roles: ['guide'] })
      await takeChanges(tx, [{ entity: 'person', id: personId, jobId: null }])
    })
    line.fault = 'none'
    await phone.sync()
    expect(await ids()).toEqual([jobId])
    const raw = await phone.phone.core.db.row.toArray()
    expect(raw.filter((row) => row.id === of || row.jobId === of)).toEqual([])
    const view = await phone.see(phone.phone.unsent)
    expect(view.items).toMatchObject([{ kind: 'partRequest.ask', state: 'stuck' }])
    expect((await asShop(world.b.id, (tx) => listLog(tx, jobId))).map((row) => row.body)).toEqual([
      noteBody('seen while away'),
    ])
  })

  it('[fault 13] [Q1] [Q2] a membership that ended: nothing is shown, all lies in quarantine, the phone is empty', async () => {
    const { app, browser, line, jobId } = await at.atWork('guide')
    const { deviceId, actor } = app.phone()
    line.fault = 'noLine'
    for (const words of ['one', 'two']) await app.phone().record([noteOf(app, jobId, words)])
    await app.phone().sender.idle()
    await inA(async (tx) => {
      await revokeMembership(tx, { personId: actor.personId, now: new Date().toISOString() })
      await takeChanges(tx, [{ entity: 'person', id: actor.personId, jobId: null }])
    })
    line.fault = 'none'
    await app.sync()
    expect(await logOf(jobId)).toEqual([])
    expect((await at.desk.phone(deviceId)).items).toMatchObject([
      { why: 'membershipEnded', decision: null },
      { why: 'membershipEnded', decision: null },
    ])
    expect(app.store.session.get()).toEqual({ kind: 'signedOut', emptied: true })
    expect((await databases(browser)).filter((name) => name.includes(world.a.id))).toEqual([])
    await app.end()
  })
})

it('[fault 14] [M3] [M5] clocks 3 days ahead, a year back and in another zone: order kept, nothing refused, flagged', async () => {
  const clock = testClock(Date.now())
  let zone = 'Etc/GMT+6'
  const { phone, line } = await realPhone(world.a, 'mechanic', {
    ports: { clock, zone: () => zone },
  })
  const opening = jobOpen(world.a.machineId)
  const jobId = opening.fields.id
  await phone.record([opening])
  await phone.sync()
  line.fault = 'noLine'
  const write = (words: string) =>
    phone.record([
      note(phone, jobId, words),
      { kind: 'job.set', jobId, fields: { field: 'weather', value: words } },
    ])
  const right = clock.now()
  clock.set(right + 3 * DAY_MS)
  await write('three days ahead')
  clock.set(right - YEAR_MS)
  await write('a year back')
  zone = 'Etc/GMT-12'
  clock.set(right + 60_000)
  await write('another zone')
  line.fault = 'none'
  await phone.sync()
  expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, stuckCount: 0 })
  const log = await logOf(jobId)
  expect(log.map((row) => (row.body.kind === 'note' ? row.body.words : ''))).toEqual([
    'three days ahead',
    'a year back',
    'another zone',
  ])
  const offBy = log.map((row) => Date.parse(row.happenedAt) - right)
  expect(offBy[0]).toBeGreaterThan(2 * DAY_MS)
  expect(offBy[1]).toBeLessThan(-300 * DAY_MS)
  expect(log[2]?.zone).toBe('Etc/GMT-12')
  // When the shop had them stands beside what the phone claimed.
  expect(log.every((row) => Math.abs(Date.parse(row.receivedAt) - Date.now()) < 60_000)).toBe(true)
  expect(await inA((tx) => findJob(tx, jobId))).toMatchObject({ weather: 'another zone' })
  const kept = await inA((tx) => listFieldWrites(tx, [jobId]))
  expect(kept.filter(({ write: one }) => one.clockOdd).length).toBeGreaterThan(0)
  const device = await inA((tx) => findDevice(tx, phone.phone.deviceId))
  expect(Math.abs(device?.clockOffsetMs ?? 0)).toBeGreaterThan(30_000)

  const other = await phoneOf(world.a, 'second')
  const base = (await pullAll(other.device, other.cookie)).find((row) => row.id === jobId)?.seq
  const later = opsOf(other.device).setJob(jobId, { field: 'weather', value: 'clear' }, base ?? 0)
  expect((await sync(other.device, [later])).results).toEqual([])
  expect(await inA((tx) => findJob(tx, jobId))).toMatchObject({ weather: 'clear' })
})

describe('[fault 18] an old app with unsent work', () => {
  it('[fault 18] [P13] hears 426 and keeps it; updated, its 500 ops of the old shape are all taken', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    const ops = [
      opening,
      ...Array.from({ length: 499 }, (_, i) => logAdd(device, jobId, noteBody(`n${i}`))),
    ].map((input) => ({ ...device.op(input), schema: 1 }))
    const ids = ops.map((op) => op.id)
    await expect(exchangeOf(device.push(ops, { protocol: 0, schema: 1 }))).rejects.toThrow('426')
    expect((await inA((tx) => findOps(tx, ids))).size).toBe(0)
    const said = await sync(device, ops)
    expect(said).toMatchObject({ taken: ids, results: [] })
    expect(await logOf(jobId)).toHaveLength(499)
    const stored = await inA((tx) => findOps(tx, ids))
    expect(stored.get(ids[7] ?? '')?.raw).toBe(JSON.stringify(ops[7]))
  })

  it('[fault 18] [P13] on the phone: nothing is set aside, the update is asked for, then all goes', async () => {
    const { phone, line } = await realPhone(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    line.fault = 'noLine'
    await phone.record([opening, note(phone, opening.fields.id, 'Kept over the update')])
    line.fault = 'none'
    line.instead = Response.json({ kind: 'tooOld', status: 426 }, { status: 426 })
    await phone.sync()
    expect(await statesOf(phone)).toEqual(['waiting', 'waiting'])
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 2, needs: 'updateApp' })
    line.instead = null
    await phone.sync()
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, needs: null })
    expect(await logOf(opening.fields.id)).toHaveLength(1)
  })
})

it('[R23] leaves every chain of the shop whole after all of this', async () => {
  expect(await expectWholeShop(world.a.id)).toBeGreaterThan(4)
})
