// S11, what no other test holds yet. The lost phone: lost-phone.test.ts; the old session, the shared tablet and
// the stranger: shared-phone.test.ts; the new version: client/store-life.test.ts; no shop set: db/lock-down.test.ts.
import { IDBObjectStore as FDBObjectStore } from 'fake-indexeddb'
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest'
import { findOps } from '@/db/queries/sync-ops'
import { countUnsent } from '@/lib/sync/client/keepsake'
import { databases, newBrowser, startApp } from '../support/field-app'
import { machineAdd, partRequestAsk } from '../support/field-ops'
import { FieldWorld, note, photo } from '../support/field-world'
import { RealShop } from '../support/real-shop'
import { phoneOf, signIn, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let at: FieldWorld
beforeAll(async () => {
  at = await FieldWorld.open()
})
afterAll(() => at.world.close())
afterEach(() => {
  vi.restoreAllMocks()
})

/** Storage that takes so many photos more and then has no room for another. */
function roomForPhotos(count: number) {
  let left = count
  const { put } = FDBObjectStore.prototype
  vi.spyOn(FDBObjectStore.prototype, 'put').mockImplementation(function (
    this: IDBObjectStore,
    value: unknown,
    key?: IDBValidKey,
  ) {
    if (this.name === 'photoBytes') {
      if (left === 0) throw new DOMException('The quota has been exceeded.', 'QuotaExceededError')
      left -= 1
    }
    return put.call(this, value, key)
  })
}

describe('[S11] storage that runs full', () => {
  it('[S11] [fault 20] [P21] at the third photo: said at once, the words kept, nothing unsent deleted', async () => {
    const { app, line, jobId } = await at.atWork('mechanic')
    line.fault = 'noLine'
    await app.phone().record([note(app, jobId, 'before the photos')])
    const photos = [photo(app, jobId), photo(app, jobId), photo(app, jobId)]
    const [one, two, three] = photos as [(typeof photos)[0], (typeof photos)[0], (typeof photos)[0]]
    roomForPhotos(2)
    for (const kept of [one, two]) await app.phone().record([kept.entry], { photos: [kept.kept] })
    const { db } = app.phone().core
    const before = await db.outbox.toArray()
    await expect(app.phone().record([three.entry], { photos: [three.kept] })).rejects.toMatchObject(
      { kind: 'noRoomForPhoto' },
    )
    await app.phone().record([note(app, jobId, 'what the third photo would have shown')])
    const after = await db.outbox.toArray()
    expect(after.slice(0, before.length)).toEqual(before)
    expect(await db.photoBytes.count()).toBe(2)
    expect(await countUnsent(db)).toBe(6)
    vi.restoreAllMocks()
    line.fault = 'none'
    await app.sync()
    const log = await at.entriesOf(jobId)
    expect(log.map((row) => row.body.kind)).toEqual(['note', 'photo', 'photo', 'note'])
    expect(await countUnsent(db)).toBe(0)
    await app.end()
  })
})

describe('[S11] after nine days', () => {
  it('[S11] [P18] everything is readable without a session, before and after it was sent', async () => {
    const browser = newBrowser()
    const { app, line, jobId } = await at.atWork('second', browser)
    line.fault = 'noLine'
    for (let day = 1; day <= 12; day += 1)
      await app.phone().record([note(app, jobId, `day ${day}`)])
    await app.phone().sender.idle()
    await app.end()
    browser.clock.ms += 9 * 24 * 3600 * 1000
    line.cookie = null
    const back = startApp(line.fetch, browser)
    expect(await back.opened()).toMatchObject({ kind: 'ready' })
    const { db, cache, keys } = back.phone().core
    const readable = async () => {
      const rows = await db.row.where('entity').equals('logEntry').toArray()
      const opened = await Promise.all(rows.map((row) => cache.row(keys, row)))
      return opened.filter((row) => (row as { jobId: string }).jobId === jobId).length
    }
    expect(await readable()).toBe(12)
    line.fault = 'none'
    await back.sync()
    expect(await readable()).toBe(12)
    expect(await at.entriesOf(jobId)).toHaveLength(12)
    expect(back.phone().sender.state.get().need).toBe('signIn')
    await back.end()
  })
})

describe('[S11] two people on one tablet', () => {
  it('[S11] [fault 12] [SO2] the second finds no photo, draft or unsent item of the first in their store', async () => {
    const browser = newBrowser()
    const { app, line, jobId } = await at.atWork('mechanic', browser)
    const first = app.phone()
    line.fault = 'noLine'
    const kept = photo(app, jobId)
    await first.record([kept.entry], { photos: [kept.kept] })
    const draft = first.drafts.of('note')
    draft.set('Half a sen')
    await draft.written()
    expect(await app.store.tryToSend()).toBe(2)
    await app.store.signOut()
    await app.end()
    const other = new RealShop((await signIn(at.world.a, 'guide')).cookie)
    const g2 = startApp(other.fetch, browser)
    await g2.opened()
    await g2.sync()
    const { db } = g2.phone().core
    expect(await db.photo.count()).toBe(0)
    expect(await db.photoBytes.count()).toBe(0)
    expect(await db.draft.count()).toBe(0)
    expect(await db.outbox.count()).toBe(0)
    const rows = await db.row.where('entity').equals('logEntry').toArray()
    expect(rows.filter((row) => row.jobId === jobId)).toEqual([])
    // Both stores lie on the tablet, each under its own person.
    const names = (await databases(browser)).filter((name) => name.includes(at.world.a.id))
    expect(names).toHaveLength(2)
    expect(await at.entriesOf(jobId)).toEqual([])
    await g2.end()
  })
})

describe('[S11] a hand-made push', () => {
  it('[S11] [P11] of a guide: a release, a part order and a machine are refused and kept as refused', async () => {
    const { device } = await phoneOf(at.world.a, 'guide')
    const { jobId } = await at.atWork('mechanic')
    const move = (to: 'closed' | 'waitingParts') =>
      device.op({
        kind: 'job.move',
        entityId: jobId,
        jobId,
        fields: { from: 'open', to, reason: null },
      })
    const forged = [
      { ...move('closed'), kind: 'machine.release' },
      move('closed'),
      device.op(partRequestAsk(jobId)),
      device.op(machineAdd()),
    ]
    const answer = await sync(device, forged)
    expect(answer.results.map((result) => ('code' in result ? result.code : ''))).toEqual([
      'unknown_kind',
      'forbidden',
      'forbidden',
      'forbidden',
    ])
    const kept = await at.inA((tx) =>
      findOps(
        tx,
        forged.map((op) => op.id),
      ),
    )
    expect(forged.map((op) => kept.get(op.id)?.outcome)).toEqual(Array(4).fill('rejected'))
    expect(forged.map((op) => kept.get(op.id)?.raw)).toEqual(forged.map((op) => JSON.stringify(op)))
    await expectWholeShop(at.world.a.id)
  })
})
