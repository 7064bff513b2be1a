import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop, asShopOn, type Db, openDb } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { takeChanges } from '@/db/queries/changes'
import { insertPartRequests } from '@/db/queries/part-requests'
import { openTestDatabase, type TestDatabase } from '../support/database'
import {
  AT,
  entryOf,
  makeEntries,
  makeJob,
  makeShop,
  newId,
  requestOf,
  type TestShop,
} from '../support/shop-fixture'

let test: TestDatabase
let home: TestShop
let other: TestShop

/** Every table of schema public, read from the catalog, so that a new one cannot be forgotten. */
async function tableNames(db: Db): Promise<string[]> {
  const { rows } = await sql<{ name: string }>`
    select relname as name from pg_class
    where relnamespace = 'public'::regnamespace and relkind in ('r', 'p') order by 1
  `.execute(db)
  return rows.map((row) => row.name)
}

/** A shop in which every table of the catalog holds at least one row. */
async function fillEveryTable(shop: TestShop): Promise<void> {
  const by = shop.people.owner!
  const jobId = await makeJob(shop, by)
  const [entryId] = await makeEntries(shop, { jobId, by, count: 1 })
  await asShop(shop.id, async (tx) => {
    const request = requestOf(jobId)
    await insertPartRequests(tx, [
      { request, askedBy: by.id, askedOn: by.deviceId, receivedAt: AT },
    ])
    await appendAudit(tx, [
      {
        id: newId(),
        jobId,
        at: AT,
        actorId: by.id,
        deviceId: null,
        action: 'job.open',
        entity: 'job',
        entityId: jobId,
        detail: {},
      },
    ])
    const ids = {
      shop: shop.id,
      job: jobId,
      person: by.id,
      device: by.deviceId,
      machine: shop.machineId,
    }
    const party = newId()
    const [model, meter, bag] = [newId(), newId(), newId()]
    await sql`
      insert into session (shop_id, id, person_id, created_at, expires_at)
        values (${ids.shop}, ${newId()}, ${ids.person}, ${AT}, ${AT});`.execute(tx)
    await sql`insert into party (shop_id, id, kind) values (${ids.shop}, ${party}, 'rider')`.execute(
      tx,
    )
    await sql`insert into party_contact (shop_id, party_id, name) values (${ids.shop}, ${party}, 'N')`.execute(
      tx,
    )
    await sql`insert into machine_model (shop_id, id, maker, model, features, source)
      values (${ids.shop}, ${model}, 'Tarnholt', 'Test', '{}', 'test')`.execute(tx)
    await sql`insert into meter_profile (shop_id, id, name, functions, leads_ohm, per_kelvin, source)
      values (${ids.shop}, ${meter}, 'Meter', '{}', '{"low":0,"high":0}', 0, 'test')`.execute(tx)
    await sql`insert into bag (shop_id, id, person_id, parts, tools, meter_ids)
      values (${ids.shop}, ${bag}, ${ids.person}, '[]', '{}', '{}')`.execute(tx)
    await sql`insert into booking (shop_id, id, machine_id, party_id, from_at, to_at, zone, state)
      values (${ids.shop}, ${newId()}, ${ids.machine}, ${party}, ${AT}, '2026-12-24T18:40:00Z', 'Etc/UTC', 'booked')`.execute(
      tx,
    )
    await sql`insert into code_book_version (shop_id, version, hash, published_at)
      values (${ids.shop}, 1, repeat('a', 64), ${AT})`.execute(tx)
    await sql`insert into code_book_content (shop_id, hash, kind, item_id, body)
      values (${ids.shop}, repeat('c', 64), 'fault', 'x', '{}')`.execute(tx)
    await sql`insert into code_book_item (shop_id, version, kind, item_id, place, hash)
      values (${ids.shop}, 1, 'fault', 'x', 1, repeat('c', 64))`.execute(tx)
    const withdrawal = newId()
    await sql`insert into code_book_withdrawal (shop_id, id, what, item_id, name, hashes, reason, withdrawn_at)
      values (${ids.shop}, ${withdrawal}, 'fault', 'x', 'X', '{}', 'test', ${AT})`.execute(tx)
    await sql`insert into code_book_heard (shop_id, withdrawal_id, person_id, device_id, heard_at, received_at)
      values (${ids.shop}, ${withdrawal}, ${ids.person}, ${ids.device}, ${AT}, ${AT})`.execute(tx)
    await sql`insert into code_book_draft (shop_id, hash, made_at)
      values (${ids.shop}, repeat('a', 64), ${AT})`.execute(tx)
    await sql`insert into code_book_draft_item (shop_id, kind, item_id, place, hash)
      values (${ids.shop}, 'fault', 'x', 1, repeat('c', 64))`.execute(tx)
    await sql`insert into job_assignment (shop_id, job_id, person_id) values (${ids.shop}, ${ids.job}, ${ids.person})`.execute(
      tx,
    )
    await sql`insert into photo (shop_id, hash, job_id, bytes, mime, received_at)
      values (${ids.shop}, repeat('b', 64), ${ids.job}, 9, 'image/jpeg', ${AT})`.execute(tx)
    await sql`insert into sync_op (shop_id, op_id, device_id, dseq, person_id, kind, raw, outcome, received_at)
      values (${ids.shop}, ${newId()}, ${ids.device}, 1, ${ids.person}, 'log.add', '{}', 'accepted', ${AT})`.execute(
      tx,
    )
    await sql`insert into advice (shop_id, id, job_id, at, engine_version, book_version, inputs, shown, acted, chose, person_id, received_at)
      values (${ids.shop}, ${newId()}, ${ids.job}, ${AT}, '1', 1, '{}', '{}', 'followed', 'x', ${ids.person}, ${AT})`.execute(
      tx,
    )
    await sql`insert into contact_plan (shop_id, id, job_id, made_at, made_by, zone, people, next_contact_at)
      values (${ids.shop}, ${newId()}, ${ids.job}, ${AT}, ${ids.person}, 'Etc/UTC', '[]', ${AT})`.execute(
      tx,
    )
    await sql`insert into consent (shop_id, id, job_id, party_id, kind, words, channel, at, zone, received_at)
      values (${ids.shop}, ${newId()}, ${ids.job}, ${party}, 'given', 'I agree', 'signature', ${AT}, 'Etc/UTC', ${AT})`.execute(
      tx,
    )
    await sql`insert into field_history (shop_id, id, entity, entity_id, field, value, ordered_hlc, clock_odd, written_at, received_at, after_seq, state)
      values (${ids.shop}, ${newId()}, 'job', ${ids.job}, 'weather', '{"is":"fog"}', '000000000000-0000', false, ${AT}, ${AT}, 1, 'current')`.execute(
      tx,
    )
    await sql`insert into merging (shop_id, id, entity, entity_id, into_id, merged_at, merged_by, people)
      values (${ids.shop}, ${newId()}, 'job', ${newId()}, ${ids.job}, ${AT}, ${ids.person}, '{}')`.execute(
      tx,
    )
    await sql`insert into quarantine_op (shop_id, op_id, device_id, person_id, roles, dseq, kind, raw, why, received_at)
      values (${ids.shop}, 'q', ${ids.device}, ${ids.person}, '{owner}', 2, 'log.add', '{}', 'deviceRevoked', ${AT})`.execute(
      tx,
    )
    await sql`insert into quarantine_decision (shop_id, op_id, decision, decided_by, decided_at)
      values (${ids.shop}, 'q', 'accepted', ${ids.person}, ${AT})`.execute(tx)
    await takeChanges(tx, [
      { entity: 'partRequest', id: request.id, jobId },
      { entity: 'job', id: jobId, jobId, whole: true },
      { entity: 'machineModel', id: model, jobId: null },
      { entity: 'meterProfile', id: meter, jobId: null },
      { entity: 'bag', id: bag, jobId: null },
      { entity: 'book', id: '1', jobId: null },
      { entity: 'bookWithdrawal', id: withdrawal, jobId: null },
      { entity: 'photo', id: 'b'.repeat(64), jobId },
    ])
  })
  expect(entryId).toBeDefined()
}

const codeOf = (promise: Promise<unknown>) =>
  promise.then(
    () => 'no error',
    (error: { code?: string }) => error.code ?? String(error),
  )

beforeAll(async () => {
  test = await openTestDatabase()
  home = await makeShop({ owner: ['owner'] })
  other = await makeShop({ owner: ['owner'] })
  await fillEveryTable(home)
  await fillEveryTable(other)
})
afterAll(() => test.close())

describe('[D1] every table belongs to a shop', () => {
  it('[D1] has shop_id in its primary key or a unique key', async () => {
    const { rows } = await sql<{ name: string }>`
      select c.relname as name from pg_class c
      where c.relnamespace = 'public'::regnamespace and c.relkind = 'r' and not exists (
        select 1 from pg_index i join pg_attribute a on a.attrelid = c.oid and a.attname = 'shop_id'
        where i.indrelid = c.oid and i.indisunique and a.attnum = any(i.indkey))
    `.execute(test.admin)
    expect(rows).toEqual([])
    expect((await tableNames(test.admin)).length).toBeGreaterThanOrEqual(29)
  })

  it('[D1] has shop_id as the first column of its primary key', async () => {
    const { rows } = await sql<{ name: string }>`
      select c.relname as name from pg_index i join pg_class c on c.oid = i.indrelid
        join pg_attribute a on a.attrelid = c.oid and a.attnum = i.indkey[0]
      where c.relnamespace = 'public'::regnamespace and i.indisprimary and a.attname <> 'shop_id'
    `.execute(test.admin)
    expect(rows).toEqual([])
  })

  it('[D1] includes shop_id in every foreign key', async () => {
    const { rows } = await sql<{ name: string }>`
      select k.conname as name from pg_constraint k
      where k.contype = 'f' and k.connamespace = 'public'::regnamespace and not exists (
        select 1 from pg_attribute a where a.attrelid = k.conrelid and a.attname = 'shop_id'
          and a.attnum = any(k.conkey))
    `.execute(test.admin)
    expect(rows).toEqual([])
  })
})

describe('[D2] row-level security', () => {
  it('[D2] is enabled and forced on every table', async () => {
    const { rows } = await sql<{ name: string }>`
      select relname as name from pg_class
      where relnamespace = 'public'::regnamespace and relkind = 'r'
        and not (relrowsecurity and relforcerowsecurity)
    `.execute(test.admin)
    expect(rows).toEqual([])
  })

  it('[D2] [S11] shows no row of any table while no shop is set, not to the app and not to the owner', async () => {
    for (const name of await tableNames(test.admin)) {
      const count = sql<{ n: number }>`select count(*)::int as n from ${sql.table(name)}`
      expect((await count.execute(test.admin)).rows[0]?.n, `${name} is filled`).toBeGreaterThan(1)
      expect((await count.execute(test.app)).rows[0]?.n, `${name}, app`).toBe(0)
      expect((await count.execute(test.owner)).rows[0]?.n, `${name}, owner`).toBe(0)
    }
  })

  it('[D2] shows of every table the rows of the shop set and none of another', async () => {
    for (const name of await tableNames(test.admin)) {
      const { rows } = await asShop(home.id, (tx) =>
        sql<{ shopId: string }>`select distinct shop_id from ${sql.table(name)}`.execute(tx),
      )
      expect(rows, name).toEqual([{ shopId: home.id }])
    }
  })

  it('[D2] forgets the shop when the transaction ends, on the same connection', async () => {
    const one = await import('@/db/client').then(({ openDb }) => openDb(test.appUrl, 1))
    const seen = await asShopOn(one, home.id, (tx) => tx.selectFrom('job').select('id').execute())
    const after = await one.selectFrom('job').select('id').execute()
    await one.destroy()
    expect(seen.length).toBe(1)
    expect(after).toEqual([])
  })

  it('[D2] refuses to write a row of another shop into any table that the app may write', async () => {
    const { rows } = await sql<{ name: string }>`
      select distinct table_name as name from information_schema.role_table_grants
      where grantee = 'farbench_app' and table_schema = 'public' and privilege_type = 'INSERT'
    `.execute(test.admin)
    expect(rows.length).toBeGreaterThan(20)
    for (const { name } of rows) {
      const columns = await sql<{ name: string }>`select column_name as name
        from information_schema.columns where table_schema = 'public' and table_name = ${name}
          and is_generated = 'NEVER'`.execute(test.admin)
      const list = sql.join(columns.rows.map((column) => sql.id(column.name)))
      const copy = sql`insert into ${sql.table(name)} (${list}) select ${list} from (
        select (jsonb_populate_record(t, jsonb_build_object('shop_id', ${other.id}::text))).*
        from ${sql.table(name)} t) as moved`
      expect(await codeOf(asShop(home.id, (tx) => copy.execute(tx))), name).toBe('42501')
    }
  })

  it('[D2] refuses to move a row to another shop and does not find foreign rows to change', async () => {
    const move = asShop(home.id, (tx) =>
      sql`update machine set shop_id = ${other.id}`.execute(tx).then(() => undefined),
    )
    expect(await codeOf(move)).toBe('42501')
    const found = await asShop(home.id, (tx) =>
      sql`update machine set hours = 1 where shop_id = ${other.id} returning id`.execute(tx),
    )
    expect(found.rows).toEqual([])
  })

  it('[D2] lets the app neither switch the security off nor become another role', async () => {
    for (const text of [
      'alter table job disable row level security',
      'alter table job no force row level security',
      'drop policy of_shop on job',
      'set role farbench_owner',
      'set role farbench_lookup',
      'set row_security = off; select * from job',
      'create table mine (x int)',
      'truncate job cascade',
    ]) {
      expect(await codeOf(sql.raw(text).execute(test.app)), text).toBe('42501')
    }
  })

  it('[D2] gives login roles no way around it', async () => {
    const { rows } = await sql<{ name: string }>`
      select rolname as name from pg_roles
      where rolname like 'farbench%' and (rolsuper or rolbypassrls or rolcreaterole or rolreplication)
    `.execute(test.admin)
    expect(rows).toEqual([{ name: 'farbench_admin' }])
  })
})

describe('[D3] evidence is insert only (R23)', () => {
  const table = [
    'log_entry',
    'audit_entry',
    'advice',
    'consent',
    'contact_plan',
    'code_book_item',
    'code_book_content',
    'code_book_withdrawal',
    'code_book_heard',
    'photo',
    'quarantine_op',
    'quarantine_decision',
  ]

  it.each(table)(
    '[D3] %s: the app can neither update, delete, truncate nor lock rows',
    async (name) => {
      for (const text of [
        `update ${name} set shop_id = shop_id`,
        `delete from ${name}`,
        `truncate ${name} cascade`,
        `select 1 from ${name} for update`,
      ]) {
        const outcome = codeOf(asShop(home.id, (tx) => sql.raw(text).execute(tx)))
        expect(await outcome, text).toBe('42501')
      }
    },
  )

  it('[D3] the app can write neither the change log nor the counter but through its functions', async () => {
    const take = sql`insert into change_log (shop_id, seq, entity, entity_id, state)
      values (${home.id}, 999, 'job', 'x', 'present')`
    expect(await codeOf(asShop(home.id, (tx) => take.execute(tx)))).toBe('42501')
    const set = sql`update shop_counter set seq = 0`
    expect(await codeOf(asShop(home.id, (tx) => set.execute(tx)))).toBe('42501')
  })

  it('[D3] a function of the counter refuses another shop than the one set', async () => {
    const foreign = sql`select * from take_changes(${other.id}, '[{"entity":"shop","id":"x"}]')`
    expect(await codeOf(asShop(home.id, (tx) => foreign.execute(tx)))).toBe('FB001')
    const numbers = sql`select take_job_numbers(${other.id}, 1)`
    expect(await codeOf(asShop(home.id, (tx) => numbers.execute(tx)))).toBe('FB001')
  })

  it('[D3] the work role reads no table of a shop', async () => {
    const work = openDb(test.workUrl, 1)
    for (const name of await tableNames(test.admin)) {
      const read = asShopOn(work, home.id, (tx) =>
        sql`select 1 from ${sql.table(name)}`.execute(tx),
      )
      expect(await codeOf(read), name).toBe('42501')
    }
    await work.destroy()
  })
})

it('[D3] an entry of a made-up place in the chain is refused by the database itself', async () => {
  const by = home.people.owner!
  const jobId = await makeJob(home, by)
  const entry = entryOf(jobId, by)
  const forged = (hash: string, prev: string | null, order: number) =>
    asShop(home.id, async (tx) => {
      await sql`insert into log_entry (shop_id, id, job_id, order_no, happened_at, written_at, zone, author_id,
          device_id, engine_version, kind, body, received_at, canonical, prev_hash, hash)
        values (${home.id}, ${entry.id}, ${jobId}, ${order}, ${AT}, ${AT}, 'Etc/UTC', ${by.id}, ${by.deviceId}, '1',
          'note', '{}', ${AT}, '{}', ${prev}, ${hash})`.execute(tx)
      await takeChanges(tx, [{ entity: 'logEntry', id: entry.id, jobId }])
    })
  expect(await codeOf(forged('0'.repeat(64), null, 1))).toBe('23514')
  const { linkHash } = await import('@/db/chain')
  expect(await codeOf(forged(linkHash('f'.repeat(64), '{}'), 'f'.repeat(64), 2))).toBe('23503')
})
