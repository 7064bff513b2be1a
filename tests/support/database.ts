// A database of its own for each test file, on the project's own PostgreSQL: a copy of a template that
// is migrated once for each state of the migrations. Copies of dead processes are dropped on the way.
import { createHash, randomBytes } from 'node:crypto'
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import pg from 'pg'
import { type Db, openDb, switchDatabase } from '@/db/client'
import { startDatabase } from '../../scripts/db.mjs'
import { migrateDatabase } from '../../scripts/migrate'
import { seedDatabase } from '../../scripts/seed'

export const TEST_PASSWORD = 'a demo password for tests'

export type TestDatabase = {
  name: string
  adminUrl: string
  ownerUrl: string
  appUrl: string
  workUrl: string
  /** Pools as the app role, as the owner and as the superuser (to tamper with). */
  app: Db
  owner: Db
  admin: Db
  close: () => Promise<void>
}

/**
 * Answers a fresh database and makes it the one behind asShop in this process. `seeded`: with both demo
 * shops (their password is TEST_PASSWORD). Close it in afterAll.
 */
export async function openTestDatabase({ seeded = false } = {}): Promise<TestDatabase> {
  const server = await startDatabase({ databaseName: 'farbench_test' })
  const name = `farbench_test_${process.pid}_${randomBytes(4).toString('hex')}`
  const template = await ensureTemplate(server.adminUrl, seeded)
  await withAdmin(server.adminUrl, async (client) => {
    await client.query(`create database ${name} template ${template} owner farbench_owner`)
    await client.query(`revoke all on database ${name} from public`)
    await client.query(`grant connect on database ${name} to farbench_app, farbench_work`)
  })
  const { adminUrl, ownerUrl, appUrl, workUrl } = addressesOf(server, name)
  await switchDatabase(appUrl)
  const [app, owner, admin] = [openDb(appUrl, 20), openDb(ownerUrl, 2), openDb(adminUrl, 2)]
  const close = async () => {
    await switchDatabase(null)
    await Promise.all([app.destroy(), owner.destroy(), admin.destroy()])
    await withAdmin(server.adminUrl, (client) =>
      client.query(`drop database if exists ${name} with (force)`),
    )
  }
  return { name, adminUrl, ownerUrl, appUrl, workUrl, app, owner, admin, close }
}

type Server = Awaited<ReturnType<typeof startDatabase>>

function addressesOf(server: Server, name: string) {
  const at = (url: string) => {
    const moved = new URL(url)
    moved.pathname = `/${name}`
    return moved.href
  }
  return {
    adminUrl: at(server.adminUrl),
    ownerUrl: at(server.ownerUrl),
    appUrl: at(server.appUrl),
    workUrl: at(server.workUrl),
  }
}

async function withAdmin<T>(url: string, run: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  try {
    return await run(client)
  } finally {
    await client.end()
  }
}

/** Made by the first process that needs it while the others wait on an advisory lock. */
async function ensureTemplate(adminUrl: string, seeded: boolean): Promise<string> {
  const name = `farbench_template_${sourceKey(seeded)}`
  return await withAdmin(adminUrl, async (client) => {
    await client.query('select pg_advisory_lock(7244302)')
    const { rows } = await client.query('select datname from pg_database')
    const names = rows.map((row: { datname: string }) => row.datname)
    if (names.includes(name)) return name
    await dropStale(client, names, seeded ? 'seeded' : 'empty')
    const making = `${name}_making`
    await client.query(`drop database if exists ${making} with (force)`)
    const { ownerUrl, workUrl } = await startDatabase({ databaseName: making })
    await migrateDatabase({ ownerUrl, workUrl })
    if (seeded) await seedDatabase(ownerUrl, TEST_PASSWORD)
    await client.query(`alter database ${making} rename to ${name}`)
    return name
  })
}

/** Drops copies whose process is gone, and templates of another state of the sources. */
async function dropStale(client: pg.Client, names: string[], kind: string): Promise<void> {
  for (const name of names) {
    const pid = /^farbench_test_(\d+)_/.exec(name)?.[1]
    const isDead = pid !== undefined && !isAlive(Number(pid))
    const isOld = name.startsWith(`farbench_template_${kind}_`)
    if (isDead || isOld) await client.query(`drop database if exists ${name} with (force)`)
  }
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0)
    return true
  } catch {
    return false
  }
}

const root = fileURLToPath(new URL('../..', import.meta.url))

function sourceKey(seeded: boolean): string {
  const hash = createHash('sha256')
  const folders = seeded ? ['migrations', 'db/codebook', 'scripts'] : ['migrations']
  for (const folder of folders) {
    for (const file of readdirSync(join(root, folder), {
      recursive: true,
      encoding: 'utf8',
    }).sort()) {
      if (file.endsWith('.ts')) hash.update(file).update(readFileSync(join(root, folder, file)))
    }
  }
  return `${seeded ? 'seeded' : 'empty'}_${hash.digest('hex').slice(0, 12)}`
}
