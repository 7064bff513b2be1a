import Dexie from 'dexie'
import {
  IDBDatabase as FDBDatabase,
  IDBObjectStore as FDBObjectStore,
  IDBTransaction as FDBTransaction,
  forceCloseDatabase,
} from 'fake-indexeddb'
import { afterEach, describe, expect, test, vi } from 'vitest'
import { PhoneDb } from '@/lib/sync/client/phone-db'
import { createPhone, MECHANIC, newIndexed, type TestPhone } from '../../support/phone'
import { atWork, note, outbox, states } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

afterEach(() => {
  vi.restoreAllMocks()
})

const noLine = () => Promise.reject(new TypeError('Failed to fetch'))
const NAME = `farbench-${MECHANIC.shopId}-${MECHANIC.personId}`

/** The store exactly as version 1 of the app made it. */
class FirstVersion extends Dexie {
  constructor(indexed: ReturnType<typeof newIndexed>) {
    super(NAME, { cache: 'disabled', ...indexed })
    this.version(1).stores({
      row: 'key, entity, [entity+jobId], gen',
      outbox: 'dseq, &opId, state, jobId, unsettled',
      photo: 'hash, state, jobId',
      draft: 'key',
      meta: 'name',
      key: 'name',
    })
  }
}

/** A store of version 1 with 12 unsent ops, made by the real program and carried over table by table. */
async function firstStore() {
  const shop = new ShopDouble()
  const { phone, machine, job, jobId } = await atWork(shop)
  shop.fault = () => ({ noLine: true })
  const notes = Array.from({ length: 10 }, (_, index) => note(phone, jobId, `Note ${index}`))
  await phone.record([machine, job, ...notes])
  const draft = phone.phone.drafts.of('note')
  draft.set('Half a sen')
  await draft.written()
  const indexed = newIndexed()
  const old = new FirstVersion(indexed)
  for (const name of ['row', 'outbox', 'photo', 'draft', 'meta', 'key']) {
    await old.table(name).bulkPut(await phone.phone.core.db.table(name).toArray())
  }
  phone.kill()
  shop.fault = () => null
  return { shop, indexed, old, jobId }
}

/** Dies at the n-th thing that an upgrade of the store does. */
function killUpgrade(at: number) {
  let steps = 0
  const { createObjectStore } = FDBDatabase.prototype
  const { createIndex } = FDBObjectStore.prototype
  const step = () => {
    steps += 1
    if (steps === at) throw new DOMException('killed', 'AbortError')
  }
  vi.spyOn(FDBDatabase.prototype, 'createObjectStore').mockImplementation(function (
    this: IDBDatabase,
    ...args
  ) {
    step()
    const made = createObjectStore.apply(this, args)
    step()
    return made
  })
  vi.spyOn(FDBObjectStore.prototype, 'createIndex').mockImplementation(function (
    this: IDBObjectStore,
    ...args
  ) {
    step()
    return createIndex.apply(this, args)
  })
  return { died: () => steps >= at }
}

describe('[P25] a newer version of the store', () => {
  test('[fault 19] [S11] killed at every step of the upgrade: the old one goes on with all 12 ops, and the new one sends them', async () => {
    let at = 1
    for (;;) {
      const { shop, indexed, old } = await firstStore()
      const before = await old.table('outbox').toArray()
      old.close()
      const death = killUpgrade(at)
      const dying = new PhoneDb(MECHANIC.shopId, MECHANIC.personId, indexed)
      const opened = await dying.open().then(
        () => true,
        () => false,
      )
      dying.close()
      vi.restoreAllMocks()
      expect(opened).toBe(!death.died())
      if (!death.died()) break
      // Old program, same store: nothing is missing and nothing was rewritten.
      const still = new FirstVersion(indexed)
      expect(await still.table('outbox').toArray()).toEqual(before)
      expect(await still.table('draft').count()).toBe(1)
      expect(still.backendDB().version).toBe(10)
      still.close()
      const phone = await createPhone({ fetch: shop.fetch, ports: { indexed } })
      expect(await states(phone)).toEqual(Array.from({ length: 12 }, () => 'waiting'))
      await phone.phone.enrol()
      await phone.sync()
      expect(shop.ops.size).toBe(12)
      expect(phone.phone.drafts.of('note')).toBeDefined()
      phone.kill()
      at += 1
    }
    expect(at).toBeGreaterThan(4)
  }, 60_000)

  test('the outbox is not rewritten: its records are the same bytes before and after', async () => {
    const { indexed, old } = await firstStore()
    const before = await old.table('outbox').toArray()
    old.close()
    const put = vi.spyOn(FDBObjectStore.prototype, 'put')
    const renewed = new PhoneDb(MECHANIC.shopId, MECHANIC.personId, indexed)
    expect(await renewed.outbox.toArray()).toEqual(before)
    expect(
      put.mock.contexts.filter((store) => (store as IDBObjectStore).name === 'outbox'),
    ).toEqual([])
    renewed.close()
  })

  test('[fault 19] with the old tab open neither hangs, and each sees what the other keeps', async () => {
    const { shop, indexed, old } = await firstStore()
    old.on('versionchange', () => old.close({ disableAutoOpen: false }))
    const phone = await createPhone({ fetch: noLine, ports: { indexed } })
    expect(await states(phone)).toHaveLength(12)
    expect(await old.table('outbox').count()).toBe(12)
    await phone.phone.core.db.meta.put({ name: 'fetchedAt', value: 'now' })
    expect(await old.table('meta').get('fetchedAt')).toMatchObject({ value: 'now' })
    old.close()
    phone.kill()
    expect(shop.ops.size).toBe(0)
  })

  test('[fault 19] a tab that does not let go is told of, and the store opens once it is closed', async () => {
    const { indexed, old } = await firstStore()
    await old.open()
    old.on('versionchange', () => false)
    const { Phone } = await import('@/lib/sync/client/phone')
    const spare = await createPhone({ fetch: noLine })
    let told = 0
    const opening = Phone.open({
      actor: MECHANIC,
      ports: spare.ports,
      indexed,
      onBlocked: () => {
        told += 1
        old.close()
      },
    })
    const phone = await opening
    expect(told).toBeGreaterThan(0)
    expect(await phone.core.db.outbox.count()).toBe(12)
    phone.close()
    spare.kill()
  })
})

/** Lets what is asked of the store fail so often, as a browser does after a time in the background. */
function deadConnection(times: number, name: 'InvalidStateError' | 'UnknownError') {
  let left = times
  const { objectStore } = FDBTransaction.prototype
  vi.spyOn(FDBTransaction.prototype, 'objectStore').mockImplementation(function (
    this: IDBTransaction,
    store: string,
  ) {
    if (left > 0) {
      left -= 1
      throw new DOMException('Connection to Indexed Database server lost', name)
    }
    return objectStore.call(this, store)
  })
  return { left: () => left }
}

describe('[P25] a connection that dies', () => {
  async function working(): Promise<{ shop: ShopDouble; phone: TestPhone; jobId: string }> {
    const world = await atWork()
    await world.phone.record([world.machine, world.job])
    world.shop.fault = () => ({ noLine: true })
    return world
  }

  test.each(['InvalidStateError', 'UnknownError'] as const)(
    '[fault 22] %s: a record is kept after one opening anew, once',
    async (name) => {
      const { phone, jobId } = await working()
      const dead = deadConnection(1, name)
      await phone.record([note(phone, jobId, 'Kept')])
      expect(dead.left()).toBe(0)
      expect((await outbox(phone)).map((record) => record.dseq)).toEqual([1, 2, 3])
      expect(phone.phone.core.db.life.lost.get()).toBe(false)
    },
  )

  test('[fault 22] a connection the browser has closed by force is opened anew', async () => {
    const { phone, jobId } = await working()
    forceCloseDatabase(phone.phone.core.db.backendDB() as never)
    await phone.record([note(phone, jobId, 'Kept')])
    expect((await outbox(phone)).map((record) => record.dseq)).toEqual([1, 2, 3])
  })

  test('a record whose word was lost with the connection is not kept twice', async () => {
    const { phone, jobId } = await working()
    const { db } = phone.phone.core
    const real = db.life.run.bind(db.life)
    let broken = false
    vi.spyOn(db.life, 'run').mockImplementation((work) =>
      real(async () => {
        const done = await work()
        if (broken || done !== 'written') return done
        broken = true
        throw new DOMException('lost', 'UnknownError')
      }),
    )
    await phone.record([note(phone, jobId, 'Once')])
    expect(broken).toBe(true)
    expect((await outbox(phone)).map((record) => record.dseq)).toEqual([1, 2, 3])
  })

  test('what a screen watches goes on after the opening anew', async () => {
    const { phone, jobId } = await working()
    const log = phone.phone.log(jobId)
    const leave = log.subscribe(() => undefined)
    await vi.waitFor(() => expect(log.get()).toEqual([]))
    deadConnection(1, 'UnknownError')
    await phone.record([note(phone, jobId, 'Seen')])
    await vi.waitFor(() => expect(log.get()).toHaveLength(1))
    leave()
  })

  test('[fault 22] dead twice in a row asks for the page to be loaded again, and loses nothing', async () => {
    const { shop, phone, jobId } = await working()
    await phone.record([note(phone, jobId, 'Before')])
    deadConnection(1_000, 'UnknownError')
    await expect(phone.phone.record([note(phone, jobId, 'Not kept')])).rejects.toMatchObject({
      kind: 'storeLost',
    })
    expect(phone.phone.core.db.life.lost.get()).toBe(true)
    vi.restoreAllMocks()
    phone.kill()
    shop.fault = () => null
    const again = await createPhone({ fetch: shop.fetch, ports: { indexed: phone.indexed } })
    await again.sync()
    expect(shop.rowsOf('logEntry')).toHaveLength(1)
  })

  test('[fault 22] the sender opens the store anew in the middle of its work and sends everything once', async () => {
    const { shop, phone, jobId } = await working()
    await phone.record([note(phone, jobId, 'To send')])
    shop.fault = () => null
    deadConnection(1, 'InvalidStateError')
    await phone.sync()
    expect(shop.rowsOf('logEntry')).toHaveLength(1)
    expect(await states(phone)).toEqual(['done', 'done', 'done'])
  })
})
