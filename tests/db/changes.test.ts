import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop, asShopOn, openDb } from '@/db/client'
import { changesAfter, type LogCursor, pullPage } from '@/db/queries/change-log'
import {
  type Change,
  lastChange,
  lockShop,
  takeChanges,
  takeJobNumbers,
} from '@/db/queries/changes'
import { assignJob, findJob, setJobStand } from '@/db/queries/jobs'
import { insertMachines } from '@/db/queries/machines'
import { openTestDatabase, type TestDatabase } from '../support/database'
import {
  AT,
  addJob,
  machineOf,
  makeJob,
  makeShop,
  newId,
  STAND,
  type TestShop,
} from '../support/shop-fixture'

let test: TestDatabase
beforeAll(async () => {
  test = await openTestDatabase()
})
afterAll(() => test.close())

const machineChange = (id: string): Change => ({ entity: 'machine', id, jobId: null })
const owned = () => makeShop({ owner: ['owner'] })
const wait = (ms: number) => new Promise((done) => setTimeout(done, ms))
const codeOf = (promise: Promise<unknown>) =>
  promise.then(
    () => 'no error',
    (error: { code?: string }) => error.code ?? String(error),
  )
/** Writes one machine; waits a while between writing and numbering, and again before the commit. */
const write = (shop: TestShop, id: string, [before, after] = [0, 0]) =>
  asShop(shop.id, async (tx) => {
    await insertMachines(tx, [machineOf(id)])
    await wait(before)
    const seq = await takeChanges(tx, [machineChange(id)])
    await wait(after)
    return seq
  })
const numbersOf = async (shop: TestShop) =>
  (await asShop(shop.id, (tx) => changesAfter(tx, { seq: 0, limit: 100_000 }))).map(
    ({ seq }) => seq,
  )
/** Delays from a seed, so that a failure can be had again. */
function seededDelays(seed: number) {
  let state = seed
  return (most: number) => {
    state = (state * 1103515245 + 12345) % 2147483648
    return (state / 2147483648) * most
  }
}
const oneTo = (last: number) => Array.from({ length: last }, (_, n) => n + 1)

describe('[P7] change numbers', () => {
  it('[P7] are dense and in the order asked for', async () => {
    const shop = await owned()
    const before = await asShop(shop.id, lastChange)
    const ids = [newId(), newId(), newId()]
    const last = await asShop(shop.id, async (tx) => {
      await insertMachines(tx, ids.map(machineOf))
      return takeChanges(tx, [...ids].reverse().map(machineChange))
    })
    const told = await asShop(shop.id, (tx) => changesAfter(tx, { seq: before, limit: 10 }))
    expect(told.map(({ seq, id }) => [seq, id])).toEqual(
      [...ids].reverse().map((id, n) => [before + n + 1, id]),
    )
    expect(last).toBe(before + 3)
    expect(await asShop(shop.id, (tx) => takeChanges(tx, []))).toBe(last)
  })

  it('[P7] miss nothing for a concurrent puller while eight writers commit after random delays', async () => {
    const shop = await owned()
    const puller = shop.people.owner!
    const written = new Set<string>()
    const pulled: string[] = []
    let cursor: LogCursor | null = null
    const pullNext = async () => {
      const page = await asShop(shop.id, (tx) =>
        pullPage(tx, { actor: { personId: puller.id }, cursor, limit: 7 }),
      )
      if (page.kind !== 'page') throw new Error(page.kind)
      return page
    }
    const writing: { isDone: boolean } = { isDone: false }
    const pull = async () => {
      for (;;) {
        const wasDone = writing.isDone
        const page = await pullNext()
        expect(page.cursor.seq).toBeGreaterThanOrEqual(cursor?.seq ?? 0)
        cursor = page.cursor
        pulled.push(...page.rows.filter((row) => row.entity === 'machine').map((row) => row.id))
        if (wasDone && !page.more) return
      }
    }
    const delay = seededDelays(20261201)
    const writer = async () => {
      for (let n = 0; n < 25; n++) {
        const id = newId()
        await write(shop, id, [delay(12), delay(6)])
        written.add(id)
      }
    }
    const pulling = pull()
    await Promise.all(Array.from({ length: 8 }, writer))
    writing.isDone = true
    await pulling
    const missed = [...written].filter((id) => !pulled.includes(id))
    expect(missed).toEqual([])
    expect(pulled.length).toBe(new Set(pulled).size)
    const numbers = await numbersOf(shop)
    expect(numbers).toEqual(oneTo(numbers.length))
    expect(numbers.length).toBe(3 + 200)
  })

  it('[P7] the same writers and puller catch a cursor on a plain sequence', async () => {
    await sql`create table naive (id bigserial primary key)`.execute(test.admin)
    const writers = openDb(test.adminUrl, 8)
    const delay = seededDelays(20261201)
    const writing: { isDone: boolean } = { isDone: false }
    const pulled = new Set<number>()
    const pull = async () => {
      let last = 0
      for (;;) {
        const wasDone = writing.isDone
        const { rows } = await sql<{
          id: number
        }>`select id from naive where id > ${last} order by id`.execute(test.admin)
        for (const { id } of rows) pulled.add(id)
        last = rows.at(-1)?.id ?? last
        if (wasDone) return
      }
    }
    const writer = async () => {
      for (let n = 0; n < 25; n++) {
        await writers.transaction().execute(async (tx) => {
          await sql`insert into naive default values`.execute(tx)
          await wait(delay(12))
        })
      }
    }
    const pulling = pull()
    await Promise.all(Array.from({ length: 8 }, writer))
    writing.isDone = true
    await pulling
    await writers.destroy()
    await sql`drop table naive`.execute(test.admin)
    expect(200 - pulled.size).toBeGreaterThan(0)
  })

  it('[P7] leave no hole when a writer rolls back or is killed after taking numbers', async () => {
    const shop = await owned()
    await write(shop, newId())
    const fails = asShop(shop.id, async (tx) => {
      const id = newId()
      await insertMachines(tx, [machineOf(id)])
      await takeChanges(tx, [machineChange(id), machineChange(newId())])
      throw new Error('changed my mind')
    })
    await expect(fails).rejects.toThrow('changed my mind')
    const killed = asShop(shop.id, async (tx) => {
      const id = newId()
      await insertMachines(tx, [machineOf(id)])
      await takeChanges(tx, [machineChange(id)])
      const { rows } = await sql<{ pid: number }>`select pg_backend_pid() as pid`.execute(tx)
      await sql`select pg_terminate_backend(${rows[0]?.pid ?? 0})`.execute(test.admin)
      await sql`select 1`.execute(tx)
    })
    expect(await codeOf(killed)).not.toBe('no error')
    const seq = await write(shop, newId())
    const numbers = await numbersOf(shop)
    expect(numbers).toEqual(oneTo(numbers.length))
    expect(seq).toBe(numbers.length)
  })

  it('[P7] tell the listeners once per call, with shop and number and nothing else', async () => {
    const { listenForChanges } = await import('@/db/listen')
    const shop = await owned()
    const heard: [string, number][] = []
    const listener = listenForChanges(
      { onChange: (id, seq) => heard.push([id, seq]), onResync: () => undefined },
      test.appUrl,
    )
    await listener.ready
    const ids = [newId(), newId()]
    const seq = await asShop(shop.id, async (tx) => {
      await insertMachines(tx, ids.map(machineOf))
      return takeChanges(tx, ids.map(machineChange))
    })
    await expect.poll(() => heard).toEqual([[shop.id, seq]])
    await listener.close()
  })

  it('[P7] a listener whose connection is cut comes back and asks to read again', async () => {
    const { listenForChanges } = await import('@/db/listen')
    const shop = await owned()
    const heard: number[] = []
    let resyncs = 0
    const listener = listenForChanges(
      {
        onChange: (_, seq) => heard.push(seq),
        onResync: () => {
          resyncs += 1
        },
      },
      test.appUrl,
    )
    await listener.ready
    await sql`select pg_terminate_backend(pid) from pg_stat_activity
      where datname = ${test.name} and query ilike 'listen %'`.execute(test.admin)
    await expect.poll(() => resyncs).toBe(1)
    const seq = await write(shop, newId())
    await expect.poll(() => heard).toEqual([seq])
    await listener.close()
  })
})

describe('[P7] rows without a number', () => {
  it('[P7] are refused at commit: insert, update and delete', async () => {
    const shop = await owned()
    const id = newId()
    const insert = asShop(shop.id, (tx) => insertMachines(tx, [machineOf(id)]))
    expect(await codeOf(insert)).toBe('FB002')
    expect(
      await asShop(shop.id, (tx) =>
        tx.selectFrom('machine').select('id').where('id', '=', id).execute(),
      ),
    ).toEqual([])
    const update = asShop(shop.id, (tx) => tx.updateTable('machine').set({ hours: 5 }).execute())
    expect(await codeOf(update)).toBe('FB002')
    const remove = asShop(shop.id, (tx) => tx.deleteFrom('personContact').execute())
    expect(await codeOf(remove)).toBe('FB002')
  })

  it('[P7] are refused when the number is of an earlier transaction, or of another row', async () => {
    const shop = await owned()
    const update = (change: Change[]) =>
      asShop(shop.id, async (tx) => {
        await tx.updateTable('machine').set({ hours: 7 }).execute()
        await takeChanges(tx, change)
      })
    expect(await codeOf(update([machineChange(newId())]))).toBe('FB002')
    expect(await codeOf(update([]))).toBe('FB002')
    expect(await codeOf(update([machineChange(shop.machineId)]))).toBe('no error')
  })

  it('[P7] are refused on every pulled table', async () => {
    const { rows } = await sql<{ name: string }>`
      select tgrelid::regclass::text as name from pg_trigger
      where tgname = 'change_number' and tgdeferrable and tginitdeferred and tgenabled = 'O' order by 1
    `.execute(test.admin)
    expect(rows.map((row) => row.name)).toEqual([
      'bag',
      'code_book_version',
      'job',
      'job_assignment',
      'log_entry',
      'machine',
      'machine_model',
      'membership',
      'meter_profile',
      'part_line',
      'part_request',
      'person',
      'person_contact',
      'photo',
      'shop',
    ])
  })

  it('[P11] a job that is closed or assigned needs a whole change', async () => {
    const shop = await owned()
    const owner = shop.people.owner!
    const jobId = await makeJob(shop, owner)
    const close = (whole: boolean) =>
      asShop(shop.id, async (tx) => {
        await setJobStand(tx, {
          id: jobId,
          stand: { ...STAND, state: 'closed' },
          by: { deviceId: null, at: AT },
        })
        await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole }])
      })
    const assign = (whole: boolean) =>
      asShop(shop.id, async (tx) => {
        await assignJob(tx, { jobId, personId: owner.id })
        await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole }])
      })
    expect(await codeOf(assign(false))).toBe('FB003')
    expect(await codeOf(close(false))).toBe('FB003')
    expect(await codeOf(assign(true))).toBe('no error')
    expect(await codeOf(close(true))).toBe('no error')
    expect(await asShop(shop.id, (tx) => findJob(tx, jobId))).toMatchObject({
      state: 'closed',
      assignedTo: [owner.id],
    })
  })
})

describe('[D5] the counter as a lock', () => {
  it('[D5] gives up after two seconds, and the waiting transaction leaves no trace', async () => {
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

  it('[D5] a writer that hangs while it holds the lock is ended after five seconds', async () => {
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
