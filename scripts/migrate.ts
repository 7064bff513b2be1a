// Brings the database to the newest migration: the project's own (Kysely) as farbench_owner, then
// the task queue's as farbench_work. Idempotent; two at once wait for each other, by one lock around both.
import { readdir } from 'node:fs/promises'
import { join, resolve } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { runMigrations } from 'graphile-worker'
import { Kysely, type Migration, Migrator, PostgresDialect } from 'kysely'
import pg from 'pg'

const folder = resolve(fileURLToPath(new URL('../migrations', import.meta.url)))

/** Key of the advisory lock (a choice); roles are brought in line under another (db-roles.mjs). */
const MIGRATING = 7_244_302

export type MigrateAddresses = { ownerUrl: string; workUrl: string }

/** Runs what is missing and answers the names of the migrations that ran. */
export async function migrateDatabase({ ownerUrl, workUrl }: MigrateAddresses): Promise<string[]> {
  const pool = new pg.Pool({ connectionString: ownerUrl, max: 2 })
  const db = new Kysely<unknown>({ dialect: new PostgresDialect({ pool }) })
  const lock = new pg.Client({ connectionString: ownerUrl })
  try {
    await lock.connect()
    await lock.query('select pg_advisory_lock($1)', [MIGRATING])
    const migrator = new Migrator({
      db,
      provider: { getMigrations: readMigrations },
      migrationTableSchema: 'farbench_migration',
    })
    const { error, results } = await migrator.migrateToLatest()
    if (error) {
      const failed =
        results?.find((result) => result.status === 'Error')?.migrationName ?? 'before any'
      throw new Error(`Migration ${failed} failed`, { cause: error })
    }
    await migrateQueue(pool, workUrl)
    return (results ?? []).map((result) => result.migrationName)
  } finally {
    // The lock goes with its connection.
    await lock.end()
    await db.destroy()
  }
}

/** Migration files only; each exports `up`. */
async function readMigrations(): Promise<Record<string, Migration>> {
  const files = (await readdir(folder))
    .filter((name) => /^\d{8}T\d{4}_[a-z_]+\.ts$/.test(name))
    .sort()
  const loaded = await Promise.all(
    files.map(async (file) => {
      const module: Migration = await import(
        /* @vite-ignore */ pathToFileURL(join(folder, file)).href
      )
      return [file.slice(0, -3), module] as const
    }),
  )
  return Object.fromEntries(loaded)
}

/** The queue makes its own schema; only for that moment may its role create one. */
async function migrateQueue(pool: pg.Pool, workUrl: string): Promise<void> {
  const name = pg.escapeIdentifier(new URL(workUrl).pathname.slice(1))
  await pool.query(`grant create on database ${name} to farbench_work`)
  try {
    await runMigrations({ connectionString: workUrl })
  } finally {
    await pool.query(`revoke create on database ${name} from farbench_work`)
  }
}

async function addresses(): Promise<MigrateAddresses> {
  const { DATABASE_OWNER_URL: ownerUrl, DATABASE_WORK_URL: workUrl } = process.env
  if (ownerUrl && workUrl) return { ownerUrl, workUrl }
  const { startDatabase } = await import('./db.mjs')
  return startDatabase()
}

if (process.argv[1] && resolve(process.argv[1]) === fileURLToPath(import.meta.url)) {
  const ran = await migrateDatabase(await addresses())
  console.log(ran.length === 0 ? 'Nothing to migrate' : `Migrated: ${ran.join(', ')}`)
}
