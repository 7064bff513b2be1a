import { IDBObjectStore as FDBObjectStore } from 'fake-indexeddb'
import { afterEach, describe, expect, test, vi } from 'vitest'
import { freeRoom } from '@/lib/sync/client/free-room'
import { readMeta } from '@/lib/sync/client/phone-db'
import { RoomWatch } from '@/lib/sync/client/room'
import type { OpInput } from '@/lib/sync/protocol/op'
import { newBrowser, startApp } from '../../support/field-app'
import { jobOpen, machineAdd } from '../../support/field-ops'
import { createPhone, testClock } from '../../support/phone'
import { atWork, note, outbox, photoOf, states } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

afterEach(() => {
  vi.restoreAllMocks()
  vi.unstubAllGlobals()
})

const full = () => new DOMException('The quota has been exceeded.', 'QuotaExceededError')

/**
 * A phone without room: writing into a store named by `isFull` fails as in a browser. What the test frees
 * by deleting makes room again when `isFull` says so.
 */
function noRoomFor(isFull: (store: string, value: unknown) => boolean) {
  const { put, add } = FDBObjectStore.prototype
  vi.spyOn(FDBObjectStore.prototype, 'put').mockImplementation(function (
    this: IDBObjectStore,
    value: unknown,
    key?: IDBValidKey,
  ) {
    if (isFull(this.name, value)) throw full()
    return put.call(this, value, key)
  })
  vi.spyOn(FDBObjectStore.prototype, 'add').mockImplementation(function (
    this: IDBObjectStore,
    value: unknown,
    key?: IDBValidKey,
  ) {
    if (isFull(this.name, value)) throw full()
    return add.call(this, value, key)
  })
}

const jobMove = (jobId: string): OpInput => ({
  kind: 'job.move',
  jobId,
  fields: { from: 'open', to: 'underWay', reason: null },
})

/** The browser's storage manager with so much used of 100 MB. */
function storage(usedShare: number, kept = false) {
  const manager = {
    asked: 0,
    usage: usedShare * 100_000_000,
    persisted: () => Promise.resolve(kept),
    persist() {
      manager.asked += 1
      return Promise.resolve(kept)
    },
    estimate: () => Promise.resolve({ quota: 100_000_000, usage: manager.usage }),
  }
  vi.stubGlobal('navigator', { storage: manager })
  return manager
}

describe('[P21] room on the phone', () => {
  test('a record without room frees small copies of sent photos, and is kept at the second try', async () => {
    const { phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job])
    const { db } = phone.phone.core
    const thumb = new Uint8Array(40_000)
    const sent = { jobId, mime: 'image/jpeg', size: 9, since: 1, reason: null, uploaded: 9 }
    await db.photo.put({ ...sent, hash: 'a'.repeat(64), state: 'sent', sentAt: 1, thumb })
    let freed = false
    db.photo.hook('updating', (changes) => {
      if ('thumb' in changes) freed = true
    })
    noRoomFor((store) => store === 'outbox' && !freed)
    await phone.record([note(phone, jobId, 'Kept at the second try')])
    expect((await outbox(phone)).map((record) => record.kind)).toContain('log.add')
    expect(await db.photo.toArray()).toMatchObject([{ state: 'sent', thumb: null }])
  })

  test('[fault 20] when that is not enough, closed jobs go; a closed job with unsent work and open ones stay', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job, note(phone, jobId, 'Open')])
    const opening = shop.row('job', jobId) as object
    for (const [index, id] of ['a', 'b'].entries()) {
      const other = `01980000-0000-7000-8000-00000000070${index}`
      shop.put('job', other, { ...opening, id: other, number: `J-9${id}`, state: 'closed' }, other)
    }
    await phone.sync()
    expect(await phone.rows('job')).toHaveLength(3)
    shop.fault = () => ({ noLine: true })
    const unsentIn = '01980000-0000-7000-8000-000000000700'
    await phone.record([note(phone, unsentIn, 'Unsent in a closed job')])
    const { db } = phone.phone.core
    let freed = false
    db.row.hook('deleting', () => {
      freed = true
    })
    noRoomFor((store) => store === 'outbox' && !freed)
    await phone.record([note(phone, jobId, 'Kept')])
    vi.restoreAllMocks()
    const left = (await phone.rows('job')) as { id: string }[]
    expect(left.map((row) => row.id).sort()).toEqual([unsentIn, jobId].sort())
    expect((await phone.see(phone.phone.log(jobId))).length).toBe(2)
    expect((await phone.see(phone.phone.unsent)).count).toBe(2)
  })

  test('[P21] a job that was let go of comes back whole when it is opened again', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    await phone.record([
      machine,
      job,
      note(phone, jobId, 'Open'),
      note(phone, jobId, 'Older entry'),
    ])
    const opening = shop.row('job', jobId) as object
    const entries = phone.phone.log(jobId)
    expect(await phone.see(entries)).toHaveLength(2)
    shop.put('job', jobId, { ...opening, state: 'closed' }, jobId)
    await phone.sync()
    const { db } = phone.phone.core
    expect(await freeRoom(phone.phone.core)).toBe(true)
    expect(await db.row.where('entity').equals('logEntry').count()).toBe(0)
    // Closed jobs may change without coming back to work: nothing is pulled anew for that.
    const gen = await readMeta(db, 'gen')
    shop.put('job', jobId, { ...opening, state: 'closed', weather: 'Sleet' }, jobId)
    await phone.sync()
    expect(await readMeta(db, 'gen')).toBe(gen)
    shop.put('job', jobId, { ...opening, state: 'open' }, jobId)
    await phone.sync()
    expect(await phone.rows('job')).toMatchObject([{ id: jobId, state: 'open' }])
    expect(await db.row.where('entity').equals('logEntry').count()).toBe(2)
  })

  test('[P21] a phone without any room opens all the same, and shows what it holds', async () => {
    const shop = new ShopDouble()
    const browser = newBrowser(testClock().now())
    const first = startApp(shop.fetch, browser)
    await first.opened()
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    await first.phone().record([machine, job])
    // As a sender leaves them that may not look into the rows: still to be worked out.
    await first.phone().core.db.outbox.toCollection().modify({ unsettled: 1 })
    await first.end()
    noRoomFor(() => true)
    const again = startApp(shop.fetch, browser)
    expect(await again.opened()).toMatchObject({ kind: 'ready' })
    const rows = await again.phone().core.db.row.where('entity').equals('job').toArray()
    expect(rows.map((row) => row.id)).toEqual([job.fields.id])
    await again.end()
  })

  test('[P21] what waits goes out though no row can be worked out for want of room', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job])
    shop.fault = () => ({ noLine: true })
    await phone.record([jobMove(jobId)])
    shop.fault = () => null
    // As a sender leaves it that may not look into the rows: still to be worked out.
    await phone.phone.core.db.outbox.where('state').equals('waiting').modify({ unsettled: 1 })
    noRoomFor((store) => store === 'row')
    await phone.sync()
    expect(shop.row('job', jobId)).toMatchObject({ state: 'underWay' })
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0 })
  })

  test('[P1] with nothing left to free it says so, and nothing of the record is there', async () => {
    const { phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job])
    noRoomFor((store) => store === 'row')
    await expect(phone.record([note(phone, jobId, 'Too much')])).rejects.toMatchObject({
      kind: 'storeFull',
    })
    vi.restoreAllMocks()
    expect(await states(phone)).toEqual(['done', 'done'])
    await phone.record([note(phone, jobId, 'Fits again')])
    expect((await outbox(phone)).at(-1)?.dseq).toBe(3)
  })

  test('[fault 20] a photo is refused where the words still fit: photos stop before records', async () => {
    const { phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job])
    noRoomFor((store) => store === 'photoBytes')
    await expect(
      phone.record([note(phone, jobId, 'With a photo')], { photos: [photoOf(jobId)] }),
    ).rejects.toMatchObject({ kind: 'noRoomForPhoto' })
    await phone.record([note(phone, jobId, 'Words alone')])
    vi.restoreAllMocks()
    const log = await phone.see(phone.phone.log(jobId))
    expect(log.map((line) => line.entry.body)).toEqual([{ kind: 'note', words: 'Words alone' }])
    expect(await phone.phone.core.db.photo.count()).toBe(0)
  })

  test('with 96 of 100 parts used photos are refused before anything is written', async () => {
    expect(storage(0.96).asked).toBe(0)
    const { phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job])
    await expect(
      phone.record([note(phone, jobId, 'x')], { photos: [photoOf(jobId)] }),
    ).rejects.toMatchObject({ kind: 'noRoomForPhoto' })
    await phone.record([note(phone, jobId, 'Words')])
    expect((await phone.see(phone.phone.log(jobId))).length).toBe(1)
  })

  test('the browser is asked once to keep the store, and what it says is shown', async () => {
    const manager = storage(0.5, true)
    const { phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job])
    await phone.record([note(phone, jobId, 'One')])
    expect(manager.asked).toBe(1)
    expect(phone.phone.room.state.get()).toEqual({
      storageKept: true,
      quotaShare: 0.5,
      freeBytes: 50_000_000,
    })
    expect(await phone.see(phone.phone.unsent)).toMatchObject({
      storageKept: true,
      quotaShare: 0.5,
      freeBytes: 50_000_000,
    })
  })

  test('it is looked again and again how much is used', async () => {
    const manager = storage(0.5)
    const rings: (() => void)[] = []
    const timer = {
      after: (_ms: number, run: () => void) => {
        rings.push(run)
        return () => undefined
      },
    }
    const room = new RoomWatch()
    room.watch(timer, () => undefined)
    await vi.waitFor(() => expect(room.state.get().quotaShare).toBe(0.5))
    manager.usage = 85_000_000
    rings.at(-1)?.()
    await vi.waitFor(() => expect(room.state.get().quotaShare).toBe(0.85))
    room.end()
    rings.at(-1)?.()
    expect(rings).toHaveLength(2)
  })

  test('who comes while it is looked has that look; one after the browser was asked knows its answer', async () => {
    const manager = storage(0.5)
    const estimate = vi.spyOn(manager, 'estimate')
    const room = new RoomWatch()
    await Promise.all([room.look(), room.look(), room.look()])
    expect(estimate).toHaveBeenCalledTimes(1)
    await Promise.all([room.look(), room.askToKeep()])
    expect(estimate).toHaveBeenCalledTimes(3)
    expect(room.state.get().storageKept).toBe(false)
  })

  test('[fault 20] [P8] a page that finds no room moves no cursor, is told, and holds up no sending', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job])
    const cursor = await readMeta(phone.phone.core.db, 'cursor')
    for (let index = 0; index < 4; index += 1) {
      const id = `01980000-0000-7000-8000-00000000080${index}`
      shop.put('job', id, { ...(shop.row('job', jobId) as object), id, number: `J-8${index}` }, id)
    }
    shop.fault = () => ({ noLine: true })
    await phone.record([note(phone, jobId, 'Goes out all the same')])
    shop.fault = () => null
    noRoomFor((store, value) => store === 'row' && (value as { base: unknown }).base !== null)
    await phone.sync()
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, needs: 'room' })
    expect(shop.rowsOf('logEntry')).toHaveLength(1)
    expect(await readMeta(phone.phone.core.db, 'cursor')).toEqual(cursor)
    expect(await phone.rows('job')).toHaveLength(1)
    vi.restoreAllMocks()
    await phone.sync()
    expect(await phone.rows('job')).toHaveLength(5)
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ needs: null })
    phone.kill()
    const again = await createPhone({ fetch: shop.fetch, ports: { indexed: phone.indexed } })
    expect(await again.rows('job')).toHaveLength(5)
  })
})
