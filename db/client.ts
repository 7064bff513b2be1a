// One pool per process, as role farbench_app. Every statement about a shop runs inside asShop, which
// sets app.shop_id for that transaction alone: a forgotten asShop sees nothing, because row-level
// security compares with it. It costs two round trips, one to begin and one to end, and queries still
// name the shop.
import { CamelCasePlugin, CompiledQuery, Kysely, PostgresDialect, type Transaction } from 'kysely'
import pg from 'pg'
import { env } from '@/lib/env'
import type { Id } from '@/lib/model/id'
import { AppError } from '@/lib/model/result'
import type { Database } from './tables/database'

export type Db = Kysely<Database>
/** A transaction bound to one shop; only asShop makes one. Queries filter on `shopId` themselves, too. */
export type ShopTx = Transaction<Database> & { readonly shopId: Id; readonly [shopBound]: true }
/** A transaction with no shop: every table is empty in it; for the sign-in functions. */
export type NoShopTx = Transaction<Database> & { readonly [noShop]: true }

declare const shopBound: unique symbol
declare const noShop: unique symbol

type Opened = { url: string; db: Db; pool: pg.Pool }
const OPENED = Symbol.for('farbench.db')
const holder = globalThis as { [key: symbol]: Opened | undefined }

/** The pool of this process, opened at the first use from DATABASE_URL. */
function appDb(): Db {
  return opened().db
}

/** The address behind appDb, for the connection that listens. */
export function appDbUrl(): string {
  return opened().url
}

function opened(): Opened {
  const present = holder[OPENED]
  if (present) return present
  const url = env().DATABASE_URL
  const made = openAt(url)
  holder[OPENED] = made
  return made
}

/** Makes `url` the address of this process (null: the setting again); for scripts and tests. */
export async function switchDatabase(url: string | null): Promise<void> {
  const before = holder[OPENED]
  holder[OPENED] = url === null ? undefined : openAt(url)
  await before?.db.destroy()
}

function openAt(url: string): Opened {
  const pool = openPool(url, 10)
  return { url, pool, db: dbOf(pool) }
}

/** Opens a pool of its own; the caller destroys it. */
export const openDb = (url: string, max = 10): Db => dbOf(openPool(url, max))

function openPool(url: string, max: number): pg.Pool {
  const pool = new pg.Pool({
    connectionString: url,
    max,
    // Who finds every connection taken for so long is answered `busy` and comes back (a choice: longer
    // than the 5 s after which a hanging writer is ended).
    connectionTimeoutMillis: 8_000,
    types: { getTypeParser },
    // lock_timeout and the idle limit bind writers that hold the counter (sync.md section 1).
    options: '-c timezone=UTC -c lock_timeout=2000 -c idle_in_transaction_session_timeout=5000',
  })
  // A connection that the server ends emits an error, idle or in use; without a listener that would end
  // the process. The pool drops it, and whoever uses it has the trouble from its own query.
  pool.on('error', () => undefined)
  pool.on('connect', (client) => client.on('error', () => undefined))
  return pool
}

const dbOf = (pool: pg.Pool): Db =>
  new Kysely<Database>({
    dialect: new PostgresDialect({ pool }),
    plugins: [new CamelCasePlugin({ maintainNestedObjectKeys: true })],
  })

/** Runs `run` in one transaction that sees `shopId` and nothing else; rolls back when it throws. */
export function asShop<T>(shopId: Id, run: (tx: ShopTx) => Promise<T>): Promise<T> {
  return asShopOn(appDb(), shopId, run)
}

/** As asShop, on a pool of one's own (the seed runs as farbench_owner). */
export function asShopOn<T>(db: Db, shopId: Id, run: (tx: ShopTx) => Promise<T>): Promise<T> {
  return inTransaction(db, { shopId, lightly: false }, run)
}

/**
 * As asShop, for what may be lost with the last second before a crash of the database, like when a phone
 * was last heard: its commit does not wait for the disk. Nothing that was promised to anybody belongs here.
 */
export function asShopLightly<T>(shopId: Id, run: (tx: ShopTx) => Promise<T>): Promise<T> {
  return inTransaction(appDb(), { shopId, lightly: true }, run)
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i

function inTransaction<T>(
  db: Db,
  { shopId, lightly }: { shopId: Id; lightly: boolean },
  run: (tx: ShopTx) => Promise<T>,
): Promise<T> {
  return db.connection().execute(async (connection) => {
    const say = (text: string) =>
      connection.executeQuery<{ command?: string }>(CompiledQuery.raw(text))
    // Begin and shop in one round trip. Statements sent as one take no parameters: hence the check.
    if (!UUID.test(shopId)) throw new AppError('badShopId')
    const light = lightly ? `, set_config('synchronous_commit', 'off', true)` : ''
    await say(`begin; select set_config('app.shop_id', '${shopId}', true)${light}`)
    try {
      const done = await run(Object.assign(connection, { shopId }) as unknown as ShopTx)
      const { rows } = await say('commit')
      // What PostgreSQL says to a commit after a statement that failed and was not told to anybody.
      if (rows[0]?.command === 'ROLLBACK') throw new AppError('transactionAborted')
      return done
    } catch (error) {
      // A connection that cannot roll back is dead, and the pool lets go of it.
      await say('rollback').catch(() => undefined)
      throw error
    }
  })
}

/** Runs one look-up that comes before a shop is known; tables answer nothing in here. */
export function lookUp<T>(run: (db: NoShopTx) => Promise<T>): Promise<T> {
  // A single statement is a transaction of its own.
  return appDb()
    .connection()
    .execute((connection) => run(connection as unknown as NoShopTx))
}

/**
 * Runs one statement that is a transaction of its own and is asked all the time: it is prepared once on each
 * connection, under its name. Columns come in camel case.
 */
export async function askOften<R>(statement: {
  name: string
  text: string
  values: unknown[]
}): Promise<R[]> {
  const client = await opened().pool.connect()
  try {
    const { rows } = await client.query<Record<string, unknown>>(statement)
    return rows.map(
      (row) =>
        Object.fromEntries(Object.entries(row).map(([key, value]) => [camel(key), value])) as R,
    )
  } finally {
    client.release()
  }
}

const camel = (name: string): string =>
  name.replaceAll(/_([a-z])/g, (_, letter: string) => letter.toUpperCase())

/** Runs the look-ups that come before a shop is known; tables answer nothing in here. */
export function withNoShop<T>(run: (tx: NoShopTx) => Promise<T>): Promise<T> {
  return appDb()
    .transaction()
    .execute((tx) => run(tx as NoShopTx))
}

/** Instants as ISO text with milliseconds; bigint as number, which holds every amount and count here. */
function getTypeParser(oid: number, format?: 'text' | 'binary') {
  if (oid === pg.types.builtins.TIMESTAMPTZ) return toInstant
  if (oid === pg.types.builtins.INT8) return Number
  return format === 'binary' ? pg.types.getTypeParser(oid, 'binary') : pg.types.getTypeParser(oid)
}

/** PostgreSQL writes `2026-12-01 09:30:00.123+00` in a session that keeps UTC. */
function toInstant(text: string): string {
  return new Date(`${text.replace(' ', 'T')}:00`).toISOString()
}
