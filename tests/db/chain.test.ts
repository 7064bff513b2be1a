import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { canonicalText, linkHash, verifyChain } from '@/db/chain'
import { asShop } from '@/db/client'
import { type AuditEntry, appendAudit, listAudit, verifyAudit } from '@/db/queries/audit'
import { takeChanges } from '@/db/queries/changes'
import { appendLogEntries, listLog, verifyLog } from '@/db/queries/log-entries'
import { erasePerson, findActor, listPeople } from '@/db/queries/people'
import type { Id } from '@/lib/model/id'
import { openTestDatabase, type TestDatabase } from '../support/database'
import {
  AT,
  entryOf,
  makeEntries,
  makeJob,
  makeShop,
  newId,
  type TestPerson,
  type TestShop,
} from '../support/shop-fixture'

let test: TestDatabase
let shop: TestShop
let by: TestPerson

beforeAll(async () => {
  test = await openTestDatabase()
  shop = await makeShop({ mechanic: ['mechanic'], second: ['mechanic'] })
  by = shop.people.mechanic!
})
afterAll(() => test.close())

const verify = (jobId: Id) => asShop(shop.id, (tx) => verifyLog(tx, jobId))

describe('[R23] the chain of a job log', () => {
  it('[R23] hashes as SHA-256 of known texts do', () => {
    // SHA-256 of one line feed, by coreutils sha256sum: no forerunner, empty text.
    expect(linkHash(null, '')).toBe(
      '01ba4719c80b6fe911b091a7c05124b64eeece964e09c058ef8f9805daca546b',
    )
    expect(linkHash(null, 'abc')).not.toBe(linkHash('a', 'bc'))
  })

  it('[R23] writes canonical text as RFC 8785 section 3.2.2 and 3.2.3 show', () => {
    expect(
      canonicalText(
        JSON.parse(
          '{"numbers":[333333333.33333329,1E30,4.50,2e-3,0.000000000000000000000000001],' +
            '"string":"\\u20ac$\\u000F\\u000aA\'\\u0042\\u0022\\u005c\\\\\\"\\/","literals":[null,true,false]}',
        ),
      ),
    ).toBe(
      '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
    )
  })

  it('[R23] numbers entries per job in server order and verifies over several pushes', async () => {
    const [jobId, otherJob] = [await makeJob(shop, by), await makeJob(shop, by)]
    await makeEntries(shop, { jobId, by, count: 3 })
    await makeEntries(shop, { jobId: otherJob, by, count: 2 })
    await makeEntries(shop, { jobId, by: shop.people.second!, count: 2 })
    const log = await asShop(shop.id, (tx) => listLog(tx, jobId))
    expect(log.map((entry) => entry.order)).toEqual([1, 2, 3, 4, 5])
    expect(await verify(jobId)).toEqual({ ok: true, value: 5 })
    expect(await verify(otherJob)).toEqual({ ok: true, value: 2 })
  })

  it('[R23] appends a mixed batch of several jobs to each chain', async () => {
    const jobs = [await makeJob(shop, by), await makeJob(shop, by)] as const
    const entries = Array.from({ length: 40 }, (_, n) => entryOf(jobs[n % 2] ?? jobs[0], by))
    const rows = await asShop(shop.id, async (tx) => {
      const appended = await appendLogEntries(tx, { entries, receivedAt: AT })
      await takeChanges(
        tx,
        entries.map(({ id, jobId }) => ({ entity: 'logEntry', id, jobId })),
      )
      return appended
    })
    expect(rows.map((row) => row.id)).toEqual(entries.map((entry) => entry.id))
    for (const jobId of jobs) {
      expect(await verify(jobId)).toEqual({ ok: true, value: 20 })
      const stored = await asShop(shop.id, (tx) => listLog(tx, jobId))
      expect(stored).toEqual(rows.filter((row) => row.jobId === jobId))
    }
  })

  it('[R23] keeps one unbroken chain while eight writers append at once', async () => {
    const jobId = await makeJob(shop, by)
    await Promise.all(Array.from({ length: 8 }, () => makeEntries(shop, { jobId, by, count: 5 })))
    expect(await verify(jobId)).toEqual({ ok: true, value: 40 })
  })

  it('[R23] keeps a reading to the last digit, odd words and order of keys included', async () => {
    const jobId = await makeJob(shop, by)
    const words = 'Zündspule "1" \\ 0.1 + 0.2\n\u2028 \u{1F527} \u0007'
    const entry = entryOf(jobId, by, {
      kind: 'proofRun',
      starts: 12,
      minutes: 10.1,
      faults: 0,
      hot: true,
      words,
      boundExact: 0.22092219194555585,
      boundRuleOfThree: 0.25,
    })
    await asShop(shop.id, async (tx) => {
      await appendLogEntries(tx, { entries: [entry], receivedAt: AT })
      await takeChanges(tx, [{ entity: 'logEntry', id: entry.id, jobId }])
    })
    const [row] = await asShop(shop.id, (tx) => listLog(tx, jobId))
    expect(row?.body).toEqual(entry.body)
    expect(await verify(jobId)).toEqual({ ok: true, value: 1 })
  })
})

describe('[R23] tampering by a superuser is found', () => {
  /** Five entries, then one changed behind the product's back with every check of the table off. */
  async function tampered(statement: (jobId: Id) => string): Promise<unknown> {
    const jobId = await makeJob(shop, by)
    await makeEntries(shop, { jobId, by, count: 5 })
    await sql`alter table log_entry drop constraint if exists log_entry_hash`.execute(test.admin)
    await test.admin.connection().execute(async (one) => {
      await sql`set session_replication_role = replica`.execute(one)
      await sql.raw(statement(jobId)).execute(one)
      await sql`set session_replication_role = origin`.execute(one)
    })
    return await verify(jobId)
  }
  const third = (jobId: Id) => `where job_id = '${jobId}' and order_no = 3`

  it('[R23] a body changed', async () => {
    const change = (jobId: Id) =>
      `update log_entry set body = '{"kind":"note","words":"Plug was dry"}' ${third(jobId)}`
    expect(await tampered(change)).toEqual({
      ok: false,
      problem: { kind: 'wrongColumns', order: 3 },
    })
  })

  it('[R23] an author changed', async () => {
    const change = (jobId: Id) =>
      `update log_entry set author_id = '${shop.people.second!.id}' ${third(jobId)}`
    expect(await tampered(change)).toEqual({
      ok: false,
      problem: { kind: 'wrongColumns', order: 3 },
    })
  })

  it('[R23] the canonical text changed with it', async () => {
    const change = (jobId: Id) =>
      `update log_entry set canonical = replace(canonical, 'wet', 'dry') ${third(jobId)}`
    expect(await tampered(change)).toEqual({ ok: false, problem: { kind: 'wrongHash', order: 3 } })
  })

  it('[R23] the hash made to fit its text', async () => {
    const change = (
      jobId: Id,
    ) => `update log_entry set canonical = replace(canonical, 'wet', 'dry'),
      body = '{"kind":"note","words":"Plug was dry"}',
      hash = encode(sha256(convert_to(prev_hash || chr(10) || replace(canonical, 'wet', 'dry'), 'UTF8')), 'hex') ${third(jobId)}`
    expect(await tampered(change)).toEqual({
      ok: false,
      problem: { kind: 'wrongForerunner', order: 4 },
    })
  })

  it('[R23] an entry taken out of the middle', async () => {
    const change = (jobId: Id) => `delete from log_entry ${third(jobId)}`
    expect(await tampered(change)).toEqual({ ok: false, problem: { kind: 'gap', order: 3 } })
  })

  it('[R23] two entries changed about', () => {
    const link = (order: number, prevHash: string | null, canonical: string) => ({
      order,
      prevHash,
      canonical,
      hash: linkHash(prevHash, canonical),
    })
    const first = link(1, null, 'a')
    const second = link(2, first.hash, 'b')
    expect(verifyChain([first, second])).toEqual({ ok: true, value: 2 })
    expect(verifyChain([second, first])).toEqual({ ok: false, problem: { kind: 'gap', order: 1 } })
  })
})

describe('[R23] the audit trail', () => {
  const entry = (jobId: Id | null, action: string): AuditEntry => ({
    id: newId(),
    jobId,
    at: AT,
    actorId: by.id,
    deviceId: null,
    action,
    entity: 'job',
    entityId: jobId ?? 'x',
    detail: { from: 'open', minutes: 1.5 },
  })

  it('[R23] is chained per job, and per shop for what belongs to none', async () => {
    const jobId = await makeJob(shop, by)
    const entries = [
      entry(jobId, 'job.open'),
      entry(null, 'device.revoke'),
      entry(jobId, 'job.close'),
    ]
    await asShop(shop.id, (tx) => appendAudit(tx, entries))
    await asShop(shop.id, (tx) => appendAudit(tx, [entry(null, 'price.set')]))
    const actions = async (of: Id | null) =>
      (await asShop(shop.id, (tx) => listAudit(tx, of))).map(({ action }) => action)
    expect(await actions(jobId)).toEqual(['job.open', 'job.close'])
    expect(await actions(null)).toEqual(['device.revoke', 'price.set'])
    expect(await asShop(shop.id, (tx) => verifyAudit(tx, jobId))).toEqual({ ok: true, value: 2 })
    expect(await asShop(shop.id, (tx) => verifyAudit(tx, null))).toEqual({ ok: true, value: 2 })
  })

  it('[R23] finds a changed detail', async () => {
    const jobId = await makeJob(shop, by)
    await asShop(shop.id, (tx) => appendAudit(tx, [entry(jobId, 'job.open')]))
    await sql`update audit_entry set detail = '{}' where job_id = ${jobId}`.execute(test.admin)
    expect(await asShop(shop.id, (tx) => verifyAudit(tx, jobId))).toEqual({
      ok: false,
      problem: { kind: 'wrongColumns', order: 1 },
    })
  })
})

it('[R23] erasing a person leaves every chain intact and no name anywhere', async () => {
  const world = await makeShop({ mechanic: ['mechanic'] })
  const person = world.people.mechanic!
  const jobId = await makeJob(world, person)
  await makeEntries(world, { jobId, by: person, count: 4 })
  await asShop(world.id, (tx) =>
    appendAudit(tx, [
      {
        id: newId(),
        jobId,
        at: AT,
        actorId: person.id,
        deviceId: person.deviceId,
        action: 'job.open',
        entity: 'job',
        entityId: jobId,
        detail: {},
      },
    ]),
  )
  await asShop(world.id, async (tx) => {
    await erasePerson(tx, { personId: person.id, now: AT })
    await takeChanges(tx, [{ entity: 'person', id: person.id, jobId: null }])
  })
  expect(await asShop(world.id, (tx) => verifyLog(tx, jobId))).toEqual({ ok: true, value: 4 })
  expect(await asShop(world.id, (tx) => verifyAudit(tx, jobId))).toEqual({ ok: true, value: 1 })
  expect((await asShop(world.id, listPeople))[0]).toMatchObject({ id: person.id, name: null })
  expect((await asShop(world.id, (tx) => findActor(tx, person.id)))?.name).toBeNull()
  const tables = await sql<{ name: string }>`select relname as name from pg_class
    where relnamespace = 'public'::regnamespace and relkind = 'r'`.execute(test.admin)
  for (const { name } of tables.rows) {
    const { rows } = await sql<{ n: number }>`select count(*)::int as n from ${sql.table(name)} t
      where t::text like ${`%${person.name}%`} and shop_id = ${world.id}
        or t::text like ${`%${person.email}%`}`.execute(test.admin)
    expect(rows[0]?.n, name).toBe(0)
  }
})
