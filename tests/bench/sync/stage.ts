// A database of its own, the product under `next start` and the floor app beside it.
import { join } from 'node:path'
import { encode } from 'next-auth/jwt'
import { asShop } from '@/db/client'
import { insertSession } from '@/db/queries/sign-in'
import type { Actor } from '@/lib/model/person'
import { openTestDatabase, type TestDatabase } from '../../support/database'
import {
  makeJob,
  makeShop,
  newId,
  type TestPerson,
  type TestShop,
} from '../../support/shop-fixture'
import { type Served, serve } from './serve'

const SECRET = 'a secret of the bench alone, thirty-two characters and more'

export type Stage = {
  db: TestDatabase
  product: Served
  floor: Served
  close(): Promise<void>
}

const NEXT = 'node_modules/next/dist/bin/next'
const FLOOR = join('tests', 'bench', 'floor')

/** Starts the product on this database; `preload` is a module that Node loads before it. */
export const serveProduct = (
  db: Pick<TestDatabase, 'appUrl'>,
  more: { preload?: string; env?: Record<string, string> } = {},
): Promise<Served> =>
  serve({
    args: (port) => [
      ...(more.preload === undefined ? [] : ['--import', more.preload]),
      ...[NEXT, 'start', '-H', '127.0.0.1', '-p', String(port)],
    ],
    path: '/api/health',
    env: (base) => ({
      DATABASE_URL: db.appUrl,
      NEXTAUTH_SECRET: SECRET,
      NEXTAUTH_URL: base,
      MAIL_URL: 'smtp://127.0.0.1:1',
      FILES_URL: 'http://127.0.0.1:1',
      FILES_BUCKET: 'bench',
      FILES_KEY: 'bench-key',
      FILES_SECRET: 'bench-secret',
      FILES_STAGE: join(process.cwd(), '.data', 'bench-stage'),
      ...more.env,
    }),
  })

/** Opens everything; the builds of both apps must be there. */
export async function openStage(): Promise<Stage> {
  const db = await openTestDatabase()
  const opened: Served[] = []
  const close = async () => {
    await Promise.all(opened.map((served) => served.stop()))
    await db.close()
  }
  try {
    await makeFloorTables(db)
    const product = await serveProduct(db)
    opened.push(product)
    const floor = await serve({
      args: (port) => [NEXT, 'start', FLOOR, '-H', '127.0.0.1', '-p', String(port)],
      path: '/nothing-here',
      env: () => ({ FLOOR_DATABASE_URL: db.ownerUrl }),
    })
    opened.push(floor)
    return { db, product, floor, close }
  } catch (error) {
    await close()
    throw error
  }
}

/** The floor's tables lie in the same database: the same disk, the same settings, no security on rows. */
async function makeFloorTables(db: TestDatabase): Promise<void> {
  const { sql } = await import('kysely')
  await sql`
    create table floor_record (seq bigserial primary key, shop_id uuid not null, id uuid not null unique,
      body jsonb not null, taken_at timestamptz not null default now());
    create index floor_record_shop on floor_record (shop_id, seq);
    create table floor_key (device_id uuid primary key, jwk jsonb not null);
  `.execute(db.owner)
}

export type Worker = { shop: TestShop; person: TestPerson; actor: Actor; jobId: string }

/** A shop of so many mechanics, each with a job of their own. */
export async function makeCrew(count: number): Promise<Worker[]> {
  const names = Array.from({ length: count }, (_, index) => `mechanic${index}`)
  const shop = await makeShop(Object.fromEntries(names.map((name) => [name, ['mechanic']])))
  const crew: Worker[] = []
  for (const name of names) {
    const person = shop.people[name]!
    const jobId = await makeJob(shop, person)
    const actor: Actor = {
      shopId: shop.id,
      personId: person.id,
      roles: person.roles,
      name: person.name,
    }
    crew.push({ shop, person, actor, jobId })
  }
  return crew
}

/** The cookie of a session of that person, as the sign-in would make it. */
export async function cookieOf({ shop, person }: Worker): Promise<{ name: string; value: string }> {
  const sid = newId()
  const now = Date.now()
  await asShop(shop.id, (tx) =>
    insertSession(tx, {
      id: sid,
      personId: person.id,
      createdAt: new Date(now - 1000).toISOString(),
      expiresAt: new Date(now + 24 * 3_600_000).toISOString(),
    }),
  )
  const token = { sub: person.id, sid }
  const value = await encode({ secret: SECRET, maxAge: 24 * 3600, token })
  return { name: 'next-auth.session-token', value }
}
