import { run } from 'graphile-worker'
import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop, withNoShop } from '@/db/client'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { changesAfter } from '@/db/queries/change-log'
import { takeChanges } from '@/db/queries/changes'
import {
  bookHash,
  guideSafeIds,
  publishBook,
  publishedBook,
  publishedVersion,
} from '@/db/queries/code-book'
import { listModels, saveModel } from '@/db/queries/machines'
import { setPassword } from '@/db/queries/people'
import { findSignIn } from '@/db/queries/sign-in'
import { enqueueWork } from '@/db/queries/work'
import { hashPassword, verifyPassword } from '@/lib/auth/password'
import { demoId } from '../../scripts/demo-shop'
import { seedDatabase } from '../../scripts/seed'
import { openTestDatabase, TEST_PASSWORD, type TestDatabase } from '../support/database'
import { AT, makeShop, type TestPerson, type TestShop } from '../support/shop-fixture'

let test: TestDatabase
let shop: TestShop
let by: TestPerson
beforeAll(async () => {
  test = await openTestDatabase({ seeded: true })
  shop = await makeShop({ mechanic: ['mechanic'] })
  by = shop.people.mechanic!
})
afterAll(() => test.close())

describe('[D9] the code book', () => {
  it('[D9] comes back item by item as it was published, with the hash of what is served', async () => {
    const book = await asShop(demoId('1'), (tx) => publishedBook(tx))
    expect(book?.version).toBe(1)
    expect(book?.items).toEqual(BOOK_ITEMS)
    expect(bookHash(book?.items ?? [])).toBe(book?.hash)
    const safe = await asShop(demoId('1'), guideSafeIds)
    const wanted = BOOK_ITEMS.filter((item) => 'guideSafe' in item && item.guideSafe).map(
      (item) => item.id,
    )
    expect([...safe].sort()).toEqual(wanted.sort())
    expect(wanted.length).toBeGreaterThan(0)
  })

  it('[D9] 6,000 items are published within two seconds, and the older version stays', async () => {
    const items = Array.from({ length: 6000 }, (_, n) => ({
      kind: 'spn' as const,
      id: `spn${n}`,
      spn: n,
      name: `Number ${n}`,
      circuit: null,
      tells: null,
      group: 'x',
      confidence: 'x',
      makersDiffer: false,
      source: 'test',
    }))
    const publish = (version: number, of: typeof items) =>
      asShop(shop.id, async (tx) => {
        await publishBook(tx, { version, items: of, publishedAt: AT, publishedBy: by.id })
        await takeChanges(tx, [{ entity: 'book', id: String(version), jobId: null }])
      })
    await publish(1, items.slice(0, 3))
    const began = performance.now()
    await publish(2, items)
    expect(performance.now() - began).toBeLessThan(2000)
    expect(await asShop(shop.id, publishedVersion)).toMatchObject({
      version: 2,
      publishedBy: by.id,
    })
    expect((await asShop(shop.id, (tx) => publishedBook(tx, 1)))?.items).toEqual(items.slice(0, 3))
    expect(await asShop(shop.id, (tx) => publishedBook(tx, 3))).toBeUndefined()
    await expect(publish(2, items)).rejects.toMatchObject({ code: '23505' })
  }, 60_000)
})

describe('[D8] the queue', () => {
  it('[D8] runs a task only when its cause commits, once per key, with the shop stamped on it', async () => {
    const seen: unknown[] = []
    await asShop(shop.id, async (tx) => {
      await enqueueWork(tx, { task: 'note', payload: { n: 1, shopId: 'forged' }, key: 'same' })
      await enqueueWork(tx, { task: 'note', payload: { n: 2 }, key: 'same' })
    })
    const lost = asShop(shop.id, async (tx) => {
      await enqueueWork(tx, { task: 'note', payload: { n: 3 } })
      throw new Error('undone')
    })
    await expect(lost).rejects.toThrow('undone')
    const runner = await run({
      connectionString: test.workUrl,
      noHandleSignals: true,
      pollInterval: 50,
      taskList: {
        note: (payload) => {
          seen.push(payload)
        },
      },
    })
    await expect.poll(() => seen, { timeout: 10_000 }).toEqual([{ n: 2, shopId: shop.id }])
    await runner.stop()
  }, 30_000)

  it('[D8] takes no task without a shop, and the app cannot touch it otherwise', async () => {
    const bare = withNoShop((tx) => sql`select enqueue_work('note', '{}')`.execute(tx))
    await expect(bare).rejects.toMatchObject({ code: 'FB001' })
    const direct = asShop(shop.id, (tx) => sql`select * from graphile_worker.jobs`.execute(tx))
    await expect(direct).rejects.toMatchObject({ code: '42501' })
  })
})

describe('[D10] the demo shops', () => {
  it('[D10] are there for every role, with the password given', async () => {
    for (const mailbox of [
      'mechanic',
      'guide',
      'dispatcher',
      'parts',
      'owner',
      'second',
      'stranger',
    ]) {
      const [found] = await withNoShop((tx) => findSignIn(tx, `${mailbox}@demo.invalid`))
      expect(found?.shopId, mailbox).toBe(demoId(mailbox === 'stranger' ? '2' : '1'))
      if (mailbox === 'mechanic') {
        expect(found?.passwordHash).toMatch(/^scrypt\$131072\$8\$1\$/)
        expect(await verifyPassword(TEST_PASSWORD, found?.passwordHash ?? '')).toBe(true)
      }
    }
  })

  it('[D10] a second run changes nothing and takes no number', async () => {
    const before = await asShop(demoId('1'), (tx) => changesAfter(tx, { seq: 0, limit: 1000 }))
    await seedDatabase(test.ownerUrl, TEST_PASSWORD)
    expect(await asShop(demoId('1'), (tx) => changesAfter(tx, { seq: 0, limit: 1000 }))).toEqual(
      before,
    )
    const entities = new Set(before.map((change) => change.entity))
    expect([...entities].sort()).toEqual([
      'bag',
      'book',
      'machine',
      'machineModel',
      'meterProfile',
      'person',
      'shop',
    ])
  })

  it('[D10] leaves passwords and models that people changed, and gives what is missing', async () => {
    const [mechanic, guide] = await people('mechanic', 'guide')
    const own = await hashPassword('my own password')
    const model = { ...DEMO_MODELS[0]!, model: 'Renamed by a person' }
    await asShop(demoId('1'), async (tx) => {
      await setPassword(tx, { personId: mechanic!.personId, passwordHash: own })
      await saveModel(tx, model)
      await takeChanges(tx, [{ entity: 'machineModel', id: model.id, jobId: null }])
    })
    await test.admin.deleteFrom('credential').where('personId', '=', guide!.personId).execute()
    await seedDatabase(test.ownerUrl, 'another password')
    const [after, given, dispatcher] = await people('mechanic', 'guide', 'dispatcher')
    expect(after?.passwordHash).toBe(own)
    expect(await verifyPassword('another password', given?.passwordHash ?? '')).toBe(true)
    expect(await verifyPassword(TEST_PASSWORD, dispatcher?.passwordHash ?? '')).toBe(true)
    const models = await asShop(demoId('1'), (tx) => listModels(tx))
    expect(models.find(({ id }) => id === model.id)).toEqual(model)
  }, 60_000)

  it('[D10] says when the password given is not that of a shop, and sets it anew on asking', async () => {
    expect(await seedDatabase(test.ownerUrl, 'another password')).toBe(false)
    expect(await seedDatabase(test.ownerUrl, 'third password', { anew: true })).toBe(true)
    for (const found of await people('mechanic', 'dispatcher', 'stranger'))
      expect(await verifyPassword('third password', found?.passwordHash ?? '')).toBe(true)
  }, 60_000)
})

const people = async (...mailboxes: string[]) =>
  await Promise.all(
    mailboxes.map(async (mailbox) => {
      const [found] = await withNoShop((tx) => findSignIn(tx, `${mailbox}@demo.invalid`))
      return found
    }),
  )
