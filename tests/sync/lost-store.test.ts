import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { findDevice } from '@/db/queries/devices'
import { dayOf, keep, readKeepsakes } from '@/lib/sync/client/keepsake'
import { lostIsRead, lostOf } from '@/lib/sync/client/lost'
import { newBrowser, startApp, type TestBrowser } from '../support/field-app'
import { jobOpen, logAdd, note as noteBody } from '../support/field-ops'
import { newIndexed } from '../support/phone'
import { deskOf, type OwnersDesk } from '../support/quarantine-world'
import { RealShop } from '../support/real-shop'
import { openSyncWorld, phoneOf, type SyncWorld, signIn, sync } from '../support/sync-world'

let world: SyncWorld
let desk: OwnersDesk
beforeAll(async () => {
  world = await openSyncWorld()
  desk = deskOf((await signIn(world.a, 'owner')).cookie)
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
const DAY = Date.UTC(2026, 10, 24, 9, 40)

/** The browser cleared every database of ours (seven days unused, or its user did). */
const clear = (browser: TestBrowser) => {
  browser.indexed = newIndexed()
}

async function appOf(who: string, browser: TestBrowser, fault: RealShop['fault'] = 'none') {
  const line = new RealShop((await signIn(world.a, who)).cookie)
  line.fault = fault
  const app = startApp(line.fetch, browser)
  await app.opened()
  return { app, line }
}

/** A phone that has sent a job and then lost its store with so many unsent notes in it. */
async function lostWith(count: number, browser = newBrowser(DAY)) {
  const { app, line } = await appOf('mechanic', browser)
  const opening = jobOpen(world.a.machineId)
  const jobId = opening.fields.id
  await app.phone().record([opening])
  await app.sync()
  line.fault = 'noLine'
  for (let i = 0; i < count; i += 1) {
    const words = { kind: 'note' as const, words: `note ${i}` }
    await app.phone().record([app.phone().entry(jobId, words, { bookVersion: 1 })])
  }
  await app.phone().sender.idle()
  const { deviceId } = app.phone()
  await app.end()
  clear(browser)
  return { browser, deviceId, jobId }
}

describe('[P22] an emptied store', () => {
  it('[P22] [fault 21] with 7 unsent records is told at the next sign-in, once, with its day', async () => {
    const today = dayOf(Date.now(), 'Etc/UTC')
    const { browser, deviceId } = await lostWith(7)
    browser.clock.ms += 8 * 24 * 3600 * 1000
    const { app } = await appOf('mechanic', browser)
    expect(await lostOf(app.phone().core.db)).toEqual({ ops: 7, lastOn: today })
    const audit = await inA((tx) => listAudit(tx, null))
    expect(audit.filter((one) => one.entityId === deviceId).at(-1)).toMatchObject({
      action: 'device.lost',
      detail: { lostOps: 7, lastOn: today, replacedBy: app.phone().deviceId },
    })
    expect((await desk.phone(deviceId)).gone).toMatchObject({ lostOps: 7, lastOn: today })
    expect(await app.phone().core.db.row.count()).toBeGreaterThan(0)
    await lostIsRead(app.phone().core.db)
    expect(await lostOf(app.phone().core.db)).toBeNull()
    await app.end()
    const again = await appOf('mechanic', browser)
    expect(await lostOf(again.app.phone().core.db)).toBeNull()
    await again.app.end()
  })

  it('[P22] counts what the shop never had, whatever the phone remembers of it', async () => {
    const { browser, deviceId } = await lostWith(0)
    keep(browser.keeper, deviceId, {
      deviceId,
      dseq: 1,
      unsent: 5,
      day: '2026-11-24',
      deleted: null,
    })
    const { app } = await appOf('mechanic', browser)
    expect(await lostOf(app.phone().core.db)).toBeNull()
    expect((await desk.phone(deviceId)).gone).toMatchObject({ lostOps: 0 })
    await app.end()
  })

  it('[P22] tells nothing on a fresh phone of a new person, nor on a second one', async () => {
    for (const browser of [newBrowser(), newBrowser()]) {
      const { app } = await appOf('second', browser)
      expect(await lostOf(app.phone().core.db)).toBeNull()
      await app.end()
    }
  })

  it('[P22] tells nobody of another person’s store on the same phone', async () => {
    const { browser, deviceId } = await lostWith(3)
    const { app } = await appOf('guide', browser)
    expect(await lostOf(app.phone().core.db)).toBeNull()
    expect((await desk.phone(deviceId)).gone).toBeNull()
    await app.end()
    const { app: own } = await appOf('mechanic', browser)
    expect(await lostOf(own.phone().core.db)).toMatchObject({ ops: 3 })
    await own.end()
  })

  it('[P22] survives one copy of what it remembers, and words it cannot read', () => {
    const one = {
      deviceId: world.a.machineId,
      dseq: 4,
      unsent: 1,
      day: '2026-11-24',
      deleted: null,
    }
    const read = (...words: string[]) =>
      readKeepsakes({ read: () => words, write: () => undefined })
    expect(read('not json', JSON.stringify([one, { odd: 1 }]))).toEqual([one])
    expect(read(JSON.stringify([one]), JSON.stringify([{ ...one, dseq: 6 }]))).toEqual([
      { ...one, dseq: 6 },
    ])
    expect(dayOf(Date.UTC(2026, 10, 24, 3), 'Etc/GMT+6')).toBe('2026-11-23')
  })
})

describe('[P22] holes in a phone’s numbers', () => {
  it('[P22] are told when a push skips numbers, and until they are filled', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    const job = device.op(opening)
    const ops = Array.from({ length: 6 }, (_, i) =>
      device.op(logAdd(device, opening.fields.id, noteBody(`n${i}`))),
    )
    expect((await sync(device, [job, ops[0]])).missing).toEqual([])
    expect((await sync(device, [ops[2], ops[5]])).missing).toEqual([
      [3, 3],
      [5, 6],
    ])
    expect((await sync(device, [])).missing).toEqual([])
    expect((await desk.phone(device.id)).missing).toBe(3)
    expect((await sync(device, [ops[1]])).missing).toEqual([[5, 6]])
    expect((await sync(device, [ops[3], ops[4]])).missing).toEqual([])
    expect(await inA((tx) => findDevice(tx, device.id))).toMatchObject({ gapsToldAt: null })
    expect((await desk.phone(device.id)).missing).toBe(0)
  })

  it('[P22] are filled by the phone from what it still holds of sent work', async () => {
    const browser = newBrowser()
    const { app } = await appOf('mechanic', browser)
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    const write = (words: string) =>
      app.phone().record([app.phone().entry(jobId, { kind: 'note', words }, { bookVersion: 1 })])
    await app.phone().record([opening])
    for (const words of ['one', 'two', 'three']) await write(words)
    await app.sync()
    const { deviceId } = app.phone()
    // The shop has lost two of them, as a half-restored backup would.
    await world.db.admin
      .deleteFrom('syncOp')
      .where('deviceId', '=', deviceId)
      .where('dseq', 'in', [2, 3])
      .execute()
    const { db } = app.phone().core
    // A number that was never sent makes the shop look.
    const stamp = await db.meta.get('stamp')
    const value = stamp?.value as { dseq: number; hlc: string }
    await db.meta.put({ name: 'stamp', value: { ...value, dseq: value.dseq + 1 } })
    await write('four')
    await app.sync()
    const held = await inA((tx) =>
      tx.selectFrom('syncOp').select('dseq').where('deviceId', '=', deviceId).execute(),
    )
    expect(held.map((row) => row.dseq).sort()).toEqual([1, 2, 3, 4, 6])
    await app.end()
  })
})
