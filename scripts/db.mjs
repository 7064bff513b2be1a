// start | stop | status | reset [database]: a PostgreSQL of this checkout's own, on loopback only.
// Node built-ins only, as it runs before node_modules exists. Data lies in .data/pg, or below
// /var/lib/farbench when this is root and the postgres user cannot reach the checkout; passwords lie
// in .env.local.
// Roles: farbench_admin (superuser, made by initdb), farbench_owner (owns the database, migrates),
// farbench_app (bound by row-level security), farbench_work (owns the task queue's schema and
// nothing else), farbench_lookup (no login; owns the few functions that look across shops).
import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import {
  chmodSync,
  chownSync,
  existsSync,
  lstatSync,
  mkdirSync,
  readFileSync,
  readlinkSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs'
import { createServer } from 'node:net'
import { dirname, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { holdLock } from './db-lock.mjs'
import { addresses, readPasswords, rolesScript } from './db-roles.mjs'
import { serverFolder } from './db-server.mjs'
import { enter, keep, leave } from './db-users.mjs'

const root = resolve(dirname(fileURLToPath(import.meta.url)), '..')
const envFile = join(root, '.env.local')
const lockFile = join(root, '.data', 'pg.lock')
const users = join(root, '.data', 'pg-users')
const FIRST_PORT = 54329
/** Where the data of a checkout lies that the postgres user cannot reach. */
const OUTSIDE = '/var/lib/farbench'
const isRoot = process.getuid?.() === 0

/**
 * Starts the server when it is down, brings roles and passwords in line and makes the database when
 * it is missing. Answers the addresses, and in `started` whether this call started the server. This
 * process counts as a user of it until `leaveDatabase` or its end.
 */
export async function startDatabase({ databaseName = 'farbench' } = {}) {
  if (!/^[a-z][a-z0-9_]{0,62}$/.test(databaseName)) throw new Error(`Bad name: ${databaseName}`)
  const release = await holdLock(lockFile)
  try {
    const passwords = readPasswords(envFile)
    const bin = findServer()
    const started = !isRunning()
    if (started) await startServer(bin, passwords)
    enter(users, { fresh: started })
    await ensureAdmin(bin, passwords)
    must(psql(passwords, 'postgres', rolesScript(passwords, databaseName)), 'roles')
    return { started, ...addresses(passwords, databaseName, portOf()) }
  } finally {
    release()
  }
}

/** Stops the server of this checkout; does nothing when it is down. */
export const stopDatabase = () => stopWhen(() => true)

/** This process needs the server no more: the last user stops it, whoever started it. */
export const leaveDatabase = () => stopWhen(() => leave(users))

async function stopWhen(isWanted) {
  const release = await holdLock(lockFile)
  try {
    if (!isWanted()) return
    if (isRunning()) control(findServer(), ['-m', 'fast', '-w', '-t', '30', 'stop'])
    rmSync(users, { recursive: true, force: true })
  } finally {
    release()
  }
}

/** Answers `{ running, port, dataDir }`; the port is null while the server is down. */
export function databaseStatus() {
  const running = isRunning()
  return { running, port: running ? portOf() : null, dataDir: dataDir() }
}

/** Stops the server and deletes all its data. */
export async function resetDatabase() {
  await stopDatabase()
  rmSync(dataDir(), { recursive: true, force: true })
  rmSync(`${dataDir()}.log`, { force: true })
}

// --- where things are -----------------------------------------------------------------------

let dataDirFound = null
function dataDir() {
  dataDirFound ??= chooseDataDir()
  return dataDirFound
}

/** The postgres user must be able to walk to the data; a checkout below /root hides it. */
function chooseDataDir() {
  const inside = join(root, '.data', 'pg')
  if (!isRoot) return inside
  mkdirSync(dirname(inside), { recursive: true })
  const reach = spawnSync('runuser', ['-u', 'postgres', '--', 'test', '-x', dirname(inside)])
  // 0: reachable. Another status without a postgres user: the package is not installed yet.
  if (reach.status === 0) return inside
  if (spawnSync('id', ['-u', 'postgres']).status !== 0) {
    findServer()
    return chooseDataDir()
  }
  const name = createHash('sha256').update(root).digest('hex').slice(0, 12)
  return join(OUTSIDE, name, 'pg')
}

/** Root's folder, which others may only walk through: nobody else can put anything in the way there. */
function makeOutside(folder) {
  for (const path of [OUTSIDE, folder]) {
    mkdirSync(path, { recursive: true })
    const about = lstatSync(path)
    if (!about.isDirectory() || about.uid !== 0) throw new Error(`${path} is not root's own folder`)
    chmodSync(path, 0o711)
  }
}

/** Folder of the server programs; data made by one major version is only read by the same one. */
export function findServer() {
  const version = dataDirFound ? readOr(join(dataDirFound, 'PG_VERSION')).trim() : ''
  return serverFolder(version, { mayInstall: isRoot })
}

// --- the process ----------------------------------------------------------------------------

const wait = (ms) => new Promise((done) => setTimeout(done, ms))
const readOr = (path) => {
  try {
    return readFileSync(path, 'utf8')
  } catch {
    return ''
  }
}
const pidFile = () => join(dataDir(), 'postmaster.pid')
const portOf = () => Number(readOr(pidFile()).split('\n')[3])

/**
 * pg_ctl takes a killed postmaster that nobody reaped for a running one, so the process table is
 * asked: a live process named postgres whose folder is this data directory.
 */
function isRunning() {
  const pid = readOr(pidFile()).split('\n')[0]?.trim()
  if (!pid) return false
  if (!/\(postgres\) [^ZX]/.test(readOr(`/proc/${pid}/stat`))) return false
  try {
    return readlinkSync(`/proc/${pid}/cwd`) === dataDir()
  } catch {
    return true
  }
}

/** Runs a server tool as a user that PostgreSQL accepts (it refuses root). */
function asPostgres(command, args, options = {}) {
  const [file, list] = isRoot
    ? ['runuser', ['-u', 'postgres', '--', command, ...args]]
    : [command, args]
  return spawnSync(file, list, { cwd: '/', encoding: 'utf8', ...options })
}

function control(bin, args) {
  const stdio = ['ignore', 'ignore', 'pipe']
  const done = asPostgres(join(bin, 'pg_ctl'), ['-D', dataDir(), ...args], { stdio })
  if (done.status !== 0) throw new Error(`pg_ctl ${args.at(-1)}: ${done.stderr}`)
}

function initialise(bin, passwords) {
  const dir = dataDir()
  if (dir.startsWith(`${OUTSIDE}/`)) makeOutside(dirname(dir))
  rmSync(dir, { recursive: true, force: true })
  mkdirSync(dir, { recursive: true, mode: 0o700 })
  const passwordFile = `${dir}.password`
  rmSync(passwordFile, { force: true })
  writeFileSync(passwordFile, `${passwords.PG_ADMIN_PASSWORD}\n`, { mode: 0o600, flag: 'wx' })
  if (isRoot) {
    const owner = Number(spawnSync('id', ['-u', 'postgres'], { encoding: 'utf8' }).stdout)
    chownSync(dir, owner, -1)
    chownSync(passwordFile, owner, -1)
  }
  const args = ['-D', dir, '-U', 'farbench_admin', '--encoding=UTF8', '--locale=C.UTF-8']
  args.push('--auth=scram-sha-256', `--pwfile=${passwordFile}`)
  const done = asPostgres(join(bin, 'initdb'), args)
  rmSync(passwordFile, { force: true })
  if (done.status !== 0) {
    rmSync(dir, { recursive: true, force: true })
    throw new Error(`initdb: ${done.stderr}`)
  }
}

const isFree = (port) =>
  new Promise((answer) => {
    const probe = createServer()
    probe.once('error', () => answer(false))
    probe.listen(port, '127.0.0.1', () => probe.close(() => answer(true)))
  })

async function startServer(bin, passwords) {
  if (!existsSync(join(dataDir(), 'PG_VERSION'))) initialise(bin, passwords)
  const log = `${dataDir()}.log`
  if (!existsSync(log)) writeFileSync(log, '', { mode: 0o600 })
  if (isRoot) chownSync(log, statSync(dataDir()).uid, -1)
  let port = Number(process.env.PGPORT ?? FIRST_PORT)
  let trouble = ''
  for (let tries = 0; tries < 20; tries++) {
    rmSync(pidFile(), { force: true })
    while (!process.env.PGPORT && !(await isFree(port))) port++
    // No Unix socket: its path may be at most 107 bytes, which a deep checkout exceeds.
    const settings = [
      'listen_addresses=127.0.0.1',
      "unix_socket_directories=''",
      'shared_buffers=64MB',
      'max_connections=120',
      'timezone=UTC',
    ].map((setting) => `-c ${setting}`)
    const args = ['-w', '-t', '60', '-l', log, '-o', `${settings.join(' ')} -p ${port}`, 'start']
    try {
      control(bin, args)
      return
    } catch (error) {
      // Another clone took the port in between, or children of a killed postmaster still end.
      trouble = `${error.message}\n${readOr(log).split('\n').slice(-12).join('\n')}`
      await wait(500)
    }
  }
  throw new Error(trouble)
}

// --- roles and databases --------------------------------------------------------------------

function psql(passwords, databaseName, text) {
  const args = ['-qAtX', '-v', 'ON_ERROR_STOP=1', '-h', '127.0.0.1', '-p', String(portOf())]
  args.push('-U', 'farbench_admin', '-d', databaseName, '-f', '-')
  const env = { PATH: process.env.PATH, PGPASSWORD: passwords.PG_ADMIN_PASSWORD }
  const bundled = join(findServer(), 'psql')
  const command = existsSync(bundled) ? bundled : 'psql'
  return spawnSync(command, args, { env, input: text, encoding: 'utf8' })
}

function must(done, what) {
  if (done.status !== 0) throw new Error(`${what}: ${done.stderr ?? done.error}`)
  return done.stdout.trim()
}

/** Data outlives a lost .env.local: the admin's password is set anew in single-user mode. */
async function ensureAdmin(bin, passwords) {
  const first = psql(passwords, 'postgres', 'select 1')
  if (first.status === 0) return
  if (!/password authentication failed/.test(first.stderr ?? '')) must(first, 'psql')
  control(bin, ['-m', 'fast', '-w', 'stop'])
  const input = `alter role farbench_admin password '${passwords.PG_ADMIN_PASSWORD}'\n`
  const single = ['--single', '-D', dataDir(), 'postgres']
  must(asPostgres(join(bin, 'postgres'), single, { input }), 'postgres --single')
  await startServer(bin, passwords)
  must(psql(passwords, 'postgres', 'select 1'), 'psql')
}

// --- command line ---------------------------------------------------------------------------

const commands = {
  start: async (databaseName) => {
    const { port, started } = await startDatabase({ databaseName })
    keep(users)
    console.log(`${started ? 'started' : 'running'} on 127.0.0.1:${port}, data in ${dataDir()}`)
  },
  stop: async () => {
    await stopDatabase()
    console.log('stopped')
  },
  status: () => {
    const { running, port } = databaseStatus()
    console.log(running ? `running on 127.0.0.1:${port}` : 'stopped')
    if (!running) process.exitCode = 3
  },
  reset: async (databaseName) => {
    await resetDatabase()
    await commands.start(databaseName)
  },
}

if (process.argv[1] && resolve(process.argv[1]) === fileURLToPath(import.meta.url)) {
  const [name = 'start', databaseName = 'farbench'] = process.argv.slice(2)
  const command = commands[name]
  if (!command) {
    console.error('usage: node scripts/db.mjs start|stop|status|reset [database]')
    process.exit(2)
  }
  await command(databaseName)
}
