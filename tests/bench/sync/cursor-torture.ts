// B1: writers and a reader at the same time, on the product's own SQL functions and on four cursors that
// look right in review. Every figure is a count, not a time.
import pg from 'pg'
import { asShopOn, openDb } from '@/db/client'
import { type LogCursor, pullPage } from '@/db/queries/change-log'
import { takeChanges } from '@/db/queries/changes'
import { insertMachines } from '@/db/queries/machines'
import type { TestDatabase } from '../../support/database'
import { machineOf, makeShop, newId } from '../../support/shop-fixture'
import { seeded } from './records'

/** What a reader made of the writers' rows. */
export type Torture = {
  name: string
  writers: number
  written: number
  missed: number
  doubled: number
  ghosts: number
  /** Numbers that a page passed over; null where the cursor has no numbers to count. */
  holes: number | null
}

type Load = { writers: number; rows: number; delayMs: number; seed: number }
type Delay = () => Promise<void>
/** Writes one row and commits, or rolls back when told to. */
type Write = (id: string, how: { lose: boolean; delay: Delay }) => Promise<void>
type Read = () => Promise<{ ids: string[]; holes: number }>
type Bed = { write: Write; read: Read; countsHoles: boolean; close(): Promise<void> }

const SLOW = { writers: 16, delayMs: 6 } as const
const PLAIN = { writers: 2, delayMs: 0 } as const

/** Runs the product's cursor and the naive ones under both loads; `rows` per writer. */
export async function tortureAll(db: TestDatabase, rows: number): Promise<Torture[]> {
  const told: Torture[] = []
  for (const load of [SLOW, PLAIN]) {
    const each = load === PLAIN ? rows * 8 : rows
    for (const [name, open] of Object.entries(BEDS)) {
      const bed = await open(db)
      told.push(await torture(name, bed, { ...load, rows: each, seed: 7 }))
      await bed.close()
    }
  }
  return told
}

async function torture(name: string, bed: Bed, load: Load): Promise<Torture> {
  const written = new Set<string>()
  const lost = new Set<string>()
  const seen: string[] = []
  let holes = 0
  const writing = new AbortController()
  const look = async () => {
    const page = await bed.read()
    seen.push(...page.ids)
    holes += page.holes
    return page.ids.length
  }
  const reading = (async () => {
    while (!writing.signal.aborted) {
      await look()
      await new Promise((done) => setImmediate(done))
    }
  })()
  await Promise.all(
    Array.from({ length: load.writers }, async (_, at) => {
      const share = seeded(load.seed * 100 + at)
      const delay: Delay = () =>
        load.delayMs === 0
          ? Promise.resolve()
          : new Promise((done) => setTimeout(done, share() * load.delayMs))
      for (let row = 0; row < load.rows; row += 1) {
        const id = newId()
        const lose = share() < 0.1
        ;(lose ? lost : written).add(id)
        await bed.write(id, { lose, delay })
      }
    }),
  )
  writing.abort()
  await reading
  while ((await look()) > 0);
  const once = new Set(seen)
  return {
    name,
    writers: load.writers,
    written: written.size,
    missed: [...written].filter((id) => !once.has(id)).length,
    doubled: seen.length - once.size,
    ghosts: [...once].filter((id) => !written.has(id)).length,
    holes: bed.countsHoles ? holes : null,
  }
}

/** Thrown to roll back. */
class Lost extends Error {}
const forgiven = (error: unknown): void => {
  if (!(error instanceof Lost)) throw error
}

/** The product: rows by its queries, numbers by take_changes, read by the page of a pull. */
async function ourBed(db: TestDatabase): Promise<Bed> {
  const shop = await makeShop({ owner: ['owner'] })
  const [writing, reading] = [openDb(db.appUrl, 20), openDb(db.appUrl, 2)]
  const actor = { personId: shop.people.owner!.id }
  let cursor: LogCursor | null = null
  const read: Read = async () => {
    const page = await asShopOn(reading, shop.id, (tx) =>
      pullPage(tx, { actor, cursor, limit: 500 }),
    )
    if (page.kind !== 'page') throw new Error(`pull answered ${page.kind}`)
    const from: number = cursor?.seq ?? 0
    cursor = page.cursor
    const holes = page.cursor.seq - from - page.rows.length
    const machines = page.rows.filter((row) => row.entity === 'machine')
    return { ids: machines.map((row) => row.id), holes }
  }
  // The shop's own first rows are not the writers'.
  while ((await read()).ids.length > 0);
  const write: Write = async (id, { lose, delay }) => {
    await asShopOn(writing, shop.id, async (tx) => {
      await insertMachines(tx, [machineOf(id)])
      await delay()
      await takeChanges(tx, [{ entity: 'machine', id, jobId: null }])
      await delay()
      if (lose) throw new Lost()
    }).catch(forgiven)
  }
  const close = async () => {
    await Promise.all([writing.destroy(), reading.destroy()])
  }
  return { write, read, countsHoles: true, close }
}

type Naive = {
  /** Run after the row was written and before the commit. */
  late?: string
  /** Reads what is after the cursor. */
  rows: string
  /** Where the next reading begins, from the rows or by a statement of its own. */
  next: 'last row' | { statement: string }
  start: string
}

let tables = 0

/** A cursor over a table of its own; with no delay each row is one autocommit statement. */
async function naiveBed(db: TestDatabase, naive: Naive): Promise<Bed> {
  tables += 1
  const table = `bench_naive_${tables}`
  const pool = new pg.Pool({ connectionString: db.ownerUrl, max: 20 })
  const reader = new pg.Client(db.ownerUrl)
  await reader.connect()
  await reader.query(`create table ${table} (id uuid primary key, seq bigserial,
    at timestamptz not null default now(), xid xid8 not null default pg_current_xact_id())`)
  let after = naive.start
  const read: Read = async () => {
    const { rows } = await reader.query<{ id: string; place: string }>(
      naive.rows.replace('naive', table),
      [after],
    )
    if (typeof naive.next === 'object') {
      const { rows: told } = await reader.query<{ next: string }>(naive.next.statement)
      after = told[0]?.next ?? after
    } else after = rows.at(-1)?.place ?? after
    return { ids: rows.map(({ id }) => id), holes: 0 }
  }
  const insert = `insert into ${table} (id) values ($1)`
  const write: Write = async (id, { lose, delay }) => {
    const client = await pool.connect()
    try {
      await client.query('begin')
      await client.query(insert, [id])
      await delay()
      if (naive.late) await client.query(naive.late)
      await delay()
      await client.query(lose ? 'rollback' : 'commit')
    } finally {
      client.release()
    }
  }
  const close = async () => {
    await Promise.all([pool.end(), reader.end()])
  }
  return { write, read, countsHoles: false, close }
}

const BY_SEQ = 'select id, seq::text as place from naive where seq > $1 order by seq limit 500'
const BEDS: Record<string, (db: TestDatabase) => Promise<Bed>> = {
  'per-shop counter (the product)': ourBed,
  bigserial: (db) => naiveBed(db, { rows: BY_SEQ, next: 'last row', start: '0' }),
  'updated_at = now()': (db) =>
    naiveBed(db, {
      rows: 'select id, at::text as place from naive where at > $1::timestamptz order by at limit 500',
      next: 'last row',
      start: '-infinity',
    }),
  'lock taken after nextval': (db) =>
    naiveBed(db, {
      late: 'select pg_advisory_xact_lock(41)',
      rows: BY_SEQ,
      next: 'last row',
      start: '0',
    }),
  'xid8 horizon read a statement later': (db) =>
    naiveBed(db, {
      rows: 'select id from naive where xid >= $1::xid8',
      next: { statement: 'select pg_snapshot_xmin(pg_current_snapshot())::text as next' },
      start: '0',
    }),
}
