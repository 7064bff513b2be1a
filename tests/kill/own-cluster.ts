// A PostgreSQL of the test's own, on its own port and in a folder of its own, that may be crashed at will:
// nobody else's database is touched. It ends with this process, however that ends.
import { type ChildProcess, spawn, spawnSync } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import { once } from 'node:events'
import { chmodSync, chownSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import pg from 'pg'
import { openDb, switchDatabase } from '@/db/client'
import { findServer } from '../../scripts/db.mjs'
import { addresses, rolesScript } from '../../scripts/db-roles.mjs'
import { migrateDatabase } from '../../scripts/migrate'
import { freePort } from '../bench/sync/serve'
import type { TestDatabase } from '../support/database'
import { pause } from './tally'

/** `crash`: immediate shutdown. `fast`: sessions are ended and rolled back. `backend`: one working backend is killed, which takes all of them down. */
export const WAYS = ['crash', 'fast', 'backend'] as const
export type Way = (typeof WAYS)[number]

const isRoot = process.getuid?.() === 0
const NAME = 'farbench_kill'
/** The settings of scripts/db.mjs. */
const SETTINGS = [
  'listen_addresses=127.0.0.1',
  'unix_socket_directories=',
  'shared_buffers=64MB',
  'max_connections=120',
  'timezone=UTC',
]

export class OwnCluster {
  readonly #bin = findServer()
  readonly #home = mkdtempSync('/var/tmp/farbench-kill-')
  readonly #data = join(this.#home, 'data')
  readonly #passwords = {
    PG_ADMIN_PASSWORD: randomBytes(16).toString('hex'),
    PG_OWNER_PASSWORD: randomBytes(16).toString('hex'),
    PG_APP_PASSWORD: randomBytes(16).toString('hex'),
    PG_WORK_PASSWORD: randomBytes(16).toString('hex'),
  }
  #port = 0
  #child: ChildProcess | null = null
  #log = ''
  readonly #atExit = () => {
    this.#child?.kill('SIGQUIT')
    // Nothing else can be waited for while a process exits; the server writes to the end.
    Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, 500)
    rmSync(this.#home, { recursive: true, force: true, maxRetries: 5 })
  }

  /** Makes and starts it. */
  static async open(): Promise<OwnCluster> {
    const cluster = new OwnCluster()
    try {
      await cluster.#open()
      return cluster
    } catch (error) {
      await cluster.close()
      throw error
    }
  }

  /** The migrated database, made the one behind asShop in this process; closing it ends the cluster. */
  async database(): Promise<TestDatabase> {
    const script = rolesScript(this.#passwords, NAME)
    const args = ['-qAtX', '-v', 'ON_ERROR_STOP=1', '-h', '127.0.0.1', '-p', String(this.#port)]
    const env = { ...process.env, PGPASSWORD: this.#passwords.PG_ADMIN_PASSWORD }
    const done = spawnSync(
      join(this.#bin, 'psql'),
      [...args, '-U', 'farbench_admin', '-d', 'postgres', '-f', '-'],
      { env, input: script, encoding: 'utf8' },
    )
    if (done.status !== 0) throw new Error(`roles: ${done.stderr}`)
    const at = addresses(this.#passwords, NAME, this.#port)
    await migrateDatabase(at)
    await switchDatabase(at.appUrl)
    const [app, owner, admin] = [openDb(at.appUrl, 2), openDb(at.ownerUrl, 2), openDb(at.adminUrl)]
    const close = async () => {
      await switchDatabase(null)
      await Promise.all([app.destroy(), owner.destroy(), admin.destroy()])
      await this.close()
    }
    return { ...at, name: NAME, app, owner, admin, close }
  }

  /** Takes it down that way and answers once it takes connections again. */
  async restart(way: Way): Promise<void> {
    const watch = await this.#connect()
    // Not events.once: that fails with the error that comes before the end.
    const down = new Promise<void>((done) => watch.once('end', done))
    if (way === 'backend') {
      const { rows } = await watch.query<{ pid: number }>(
        `select pid from pg_stat_activity where usename = 'farbench_app'
         order by (state = 'active') desc, (state = 'idle in transaction') desc limit 1`,
      )
      // Without a session of the app the watching one goes.
      const pid = rows[0]?.pid ?? (await watch.query('select pg_backend_pid() as pid')).rows[0].pid
      process.kill(pid, 'SIGKILL')
      await down
    } else {
      await this.#stop(way === 'crash' ? 'SIGQUIT' : 'SIGINT')
      this.#start()
    }
    await this.#ready()
  }

  async close(): Promise<void> {
    await this.#stop('SIGQUIT')
    process.off('exit', this.#atExit)
    rmSync(this.#home, { recursive: true, force: true })
  }

  async #open(): Promise<void> {
    process.on('exit', this.#atExit)
    mkdirSync(this.#data)
    const passwordFile = join(this.#home, 'password')
    writeFileSync(passwordFile, this.#passwords.PG_ADMIN_PASSWORD, { mode: 0o600 })
    if (isRoot) {
      const owner = Number(spawnSync('id', ['-u', 'postgres'], { encoding: 'utf8' }).stdout)
      for (const path of [this.#home, this.#data, passwordFile]) chownSync(path, owner, -1)
    }
    chmodSync(this.#data, 0o700)
    const [command = '', ...args] = this.#asPostgres([
      join(this.#bin, 'initdb'),
      ...['-D', this.#data, '-U', 'farbench_admin', '--encoding=UTF8', '--locale=C.UTF-8'],
      ...['--auth=scram-sha-256', `--pwfile=${passwordFile}`, '--no-sync'],
    ])
    const made = spawnSync(command, args, { cwd: '/', encoding: 'utf8' })
    rmSync(passwordFile)
    if (made.status !== 0) throw new Error(`initdb: ${made.stderr || made.error}`)
    this.#port = await freePort()
    this.#start()
    await this.#ready()
  }

  /** The command as the data's owner, told to stop at once should this process die. */
  #asPostgres(command: string[]): string[] {
    const uid = isRoot ? ['--reuid=postgres', '--regid=postgres', '--init-groups'] : []
    return ['setpriv', ...uid, '--pdeathsig=QUIT', ...command]
  }

  #start(): void {
    const settings = SETTINGS.flatMap((setting) => ['-c', setting])
    const [command = '', ...args] = this.#asPostgres([
      join(this.#bin, 'postgres'),
      ...['-D', this.#data, '-p', String(this.#port), ...settings],
    ])
    const child = spawn(command, args, { cwd: '/', stdio: ['ignore', 'ignore', 'pipe'] })
    this.#child = child
    child.stderr.on('data', (data) => {
      this.#log = (this.#log + data).slice(-10_000)
    })
  }

  async #stop(signal: 'SIGQUIT' | 'SIGINT'): Promise<void> {
    const child = this.#child
    this.#child = null
    if (!child || child.exitCode !== null || child.signalCode !== null) return
    const gone = once(child, 'exit')
    child.kill(signal)
    await gone
  }

  async #ready(): Promise<void> {
    for (let tries = 0; tries < 600; tries += 1) {
      if (this.#child?.exitCode !== null) throw new Error(`PostgreSQL ended: ${this.#log}`)
      const client = await this.#connect().catch(() => null)
      if (client !== null) return await client.end()
      await pause(25)
    }
    throw new Error(`PostgreSQL does not answer: ${this.#log}`)
  }

  async #connect(): Promise<pg.Client> {
    const { adminUrl } = addresses(this.#passwords, 'postgres', this.#port)
    const client = new pg.Client({ connectionString: adminUrl })
    client.on('error', () => undefined)
    await client.connect()
    return client
  }
}
