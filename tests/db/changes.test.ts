import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop, openDb } from '@/db/client'
import { listenForChanges } from '@/db/listen'
import { changesAfter, type LogCursor, pullPage } from '@/db/queries/change-log'
import { type Change, lastChange, takeChanges } from '@/db/queries/changes'
import { assignJob, findJob, setJobStand } from '@/db/queries/jobs'
import { insertMachines } from '@/db/queries/machines'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { AT, machineOf, makeJob, newId, STAND } from '../support/shop-fixture'
import {
  codeOf,
  machineChange,
  numbersOf,
  oneTo,
  owned,
  seededDelays,
  wait,
  write,
} from '../support/writers'

let test: TestDatabase
beforeAll(async () => {
  test = await openTestDatabase()
})
afterAll(() => test.close())

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

  it('[fault 4] [P7] miss nothing for a concurrent puller while eight writers commit after random delays', async () => {
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

  it('[fault 5] [P7] leave no hole when a writer rolls back or is killed after taking numbers', async () => {
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
      'code_book_heard',
      'code_book_version',
      'code_book_withdrawal',
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
