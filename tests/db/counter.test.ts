import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop, asShopOn } from '@/db/client'
import { lockShop, takeChanges, takeJobNumbers } from '@/db/queries/changes'
import { insertMachines } from '@/db/queries/machines'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { addJob, machineOf, newId } from '../support/shop-fixture'
import { codeOf, machineChange, numbersOf, oneTo, owned, wait, write } from '../support/writers'

let test: TestDatabase
beforeAll(async () => {
  test = await openTestDatabase()
})
afterAll(() => test.close())

describe('[D5] the counter as a lock', () => {
  it('[fault 7] [D5] gives up after two seconds, and the waiting transaction leaves no trace', async () => {
    const shop = await owned()
    let release: () => void = () => undefined
    const held = new Promise<void>((done) => {
      release = done
    })
    let locked: () => void = () => undefined
    const isLocked = new Promise<void>((done) => {
      locked = done
    })
    const holder = asShop(shop.id, async (tx) => {
      await lockShop(tx)
      locked()
      await held
    })
    await isLocked
    const began = performance.now()
    expect(await codeOf(write(shop, newId()))).toBe('55P03')
    const tookMs = performance.now() - began
    release()
    await holder
    expect(tookMs).toBeGreaterThan(1900)
    expect(tookMs).toBeLessThan(4000)
    const numbers = await numbersOf(shop)
    expect(numbers).toEqual(oneTo(numbers.length))
  })

  it('[fault 7] [D5] a writer that hangs while it holds the lock is ended after five seconds', async () => {
    const shop = await owned()
    const hanging = asShop(shop.id, async (tx) => {
      await lockShop(tx)
      await wait(5600)
      await sql`select 1`.execute(tx)
    })
    const outcome = codeOf(hanging)
    await wait(5100)
    expect(await codeOf(write(shop, newId()))).toBe('no error')
    expect(await outcome).not.toBe('no error')
  }, 15_000)

  it('[D5] one shop does not wait for another', async () => {
    const [held, free] = [await owned(), await owned()]
    await asShop(held.id, async (tx) => {
      await lockShop(tx)
      const began = performance.now()
      await write(free, newId())
      expect(performance.now() - began).toBeLessThan(1000)
    })
  })

  it('[D5] limits are those of the role, whoever connects with it', async () => {
    const { rows } = await sql<{ name: string }>`select unnest(rolconfig) as name from pg_roles
      where rolname = 'farbench_app' order by 1`.execute(test.admin)
    expect(rows.map((row) => row.name)).toEqual([
      'idle_in_transaction_session_timeout=5s',
      'lock_timeout=2s',
    ])
  })
})

describe('[D6] job numbers', () => {
  it('[D6] have no gaps and no doubles when jobs open at once and some fail', async () => {
    const shop = await owned()
    const by = shop.people.owner!
    const open = async (n: number) => {
      const id = newId()
      await asShop(shop.id, async (tx) => {
        await addJob(tx, { id, shop, by })
        if (n % 4 === 0) throw new Error('lost')
      }).catch(() => undefined)
    }
    await Promise.all(Array.from({ length: 20 }, (_, n) => open(n)))
    const jobs = await asShop(shop.id, (tx) =>
      tx.selectFrom('job').select('number').orderBy('number').execute(),
    )
    expect(jobs.map((job) => job.number)).toEqual(
      oneTo(15).map((n) => `J-${String(n).padStart(4, '0')}`),
    )
  })

  it('[D6] go on past 9999', async () => {
    const shop = await owned()
    await sql`update shop_counter set last_job_number = 9998 where shop_id = ${shop.id}`.execute(
      test.admin,
    )
    const numbers = await asShop(shop.id, (tx) => takeJobNumbers(tx, 3))
    expect(numbers).toEqual(['J-9999', 'J-10000', 'J-10001'])
  })
})

it('[D5] numbers survive a whole transaction over two shops', async () => {
  const [one, two] = [await owned(), await owned()]
  const ids = [newId(), newId()]
  await asShopOn(test.app, one.id, async (tx) => {
    await insertMachines(tx, [machineOf(ids[0]!)])
    await takeChanges(tx, [machineChange(ids[0]!)])
    await sql`select set_config('app.shop_id', ${two.id}, true)`.execute(tx)
    const second = Object.assign(tx, { shopId: two.id })
    await insertMachines(second, [machineOf(ids[1]!)])
    await takeChanges(second, [machineChange(ids[1]!)])
  })
  expect((await numbersOf(one)).length).toBe(4)
  expect((await numbersOf(two)).length).toBe(4)
})
