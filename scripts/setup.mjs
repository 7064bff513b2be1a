// Brings a bare clone to a state that can run. Node built-ins only, as it runs before node_modules
// exists. Every step is skipped when it is already done.
import { spawn } from 'node:child_process'
import { createHash, randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:net'
import { dirname, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'

if (Number(process.versions.node.split('.')[0]) < 20) {
  console.error(`Farbench needs Node 20 or later; this is ${process.version}.`)
  process.exit(1)
}

export const root = resolve(dirname(fileURLToPath(import.meta.url)), '..')
process.chdir(root)
const began = Date.now()

/** Prints one line with the seconds since the start. */
export const say = (words) =>
  console.log(`[${((Date.now() - began) / 1000).toFixed(1).padStart(6)} s] ${words}`)

let current = null
let stopping = false

/**
 * Runs a command to its end and answers how it ended; Ctrl-C is heard meanwhile. It has a group of its
 * own, so that what it started itself can be ended with it.
 */
export async function call(command, args, options = {}) {
  if (stopping) throw new Error('told to stop')
  const child = spawn(command, args, { stdio: 'inherit', cwd: root, detached: true, ...options })
  current = child
  try {
    return await new Promise((done, lost) => {
      child.once('error', lost).once('exit', (status, signal) => done({ status, signal }))
    })
  } finally {
    current = null
  }
}

/** Runs a command to its end; throws when it fails. */
export async function run(command, args, options = {}) {
  const { status, signal } = await call(command, args, options)
  if (status !== 0) throw new Error(`${command} ${args.join(' ')} ended with ${status ?? signal}`)
}

/** Ends the command that runs now, waits for it, and lets no other begin. */
export async function stopCall() {
  stopping = true
  const child = current
  if (!child?.pid || child.exitCode !== null || child.signalCode !== null) return
  await new Promise((gone) => {
    const late = setTimeout(() => process.kill(-child.pid, 'SIGKILL'), 8000)
    child.once('exit', () => {
      clearTimeout(late)
      gone()
    })
    process.kill(-child.pid, 'SIGTERM')
  })
}

const markOf = (name) => join(root, '.data', 'marks', name)
const isDone = (name, key) => existsSync(markOf(name)) && readFileSync(markOf(name), 'utf8') === key
function setDone(name, key) {
  mkdirSync(dirname(markOf(name)), { recursive: true })
  writeFileSync(markOf(name), key)
}

/** Installs Debian packages; without root it says which are missing. */
export async function installPackages(...names) {
  if (process.getuid?.() !== 0) throw new Error(`Please install: ${names.join(' ')}`)
  say(`installing ${names.join(', ')}`)
  const options = {
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    stdio: ['ignore', 'ignore', 'inherit'],
  }
  await run('apt-get', ['update', '-qq'], options)
  await run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', ...names], options)
}

/** The npm packages of package-lock.json, build tools included. */
export async function modules() {
  const key = createHash('sha256').update(readFileSync('package-lock.json')).digest('hex')
  if (existsSync('node_modules/next/package.json') && isDone('modules', key)) return
  say('npm ci')
  await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
    env: { ...process.env, NODE_ENV: 'development' },
  })
  setDone('modules', key)
}

/** Random secrets and the port's address in .env.local; what is set in the environment wins. */
export function settings() {
  const text = existsSync('.env.local') ? readFileSync('.env.local', 'utf8') : ''
  const known = new Map(
    text.split('\n').flatMap((line) => {
      const match = /^([A-Z_]+)=(.*)$/.exec(line)
      return match ? [[match[1], match[2]]] : []
    }),
  )
  const wanted = {
    NEXTAUTH_SECRET: randomBytes(32).toString('base64url'),
    DEMO_PASSWORD: `trail-${randomBytes(5).toString('hex')}`,
    FILES_KEY: `demo-${randomBytes(6).toString('hex')}`,
    FILES_SECRET: randomBytes(24).toString('base64url'),
  }
  let added = ''
  for (const [name, value] of Object.entries(wanted)) {
    if (known.has(name)) continue
    known.set(name, value)
    added += `${name}=${value}\n`
  }
  if (added) {
    const gap = text && !text.endsWith('\n') ? '\n' : ''
    writeFileSync('.env.local', `${text}${gap}${added}`, { mode: 0o600 })
  }
  for (const [name, value] of known) process.env[name] ??= value
  process.env.PORT ??= '3111'
  process.env.NEXTAUTH_URL ??= `http://127.0.0.1:${process.env.PORT}`
  process.env.NEXT_TELEMETRY_DISABLED = '1'
}

/** Starts the project's own PostgreSQL and sets the addresses; answers them. */
export async function database(databaseName) {
  const { startDatabase } = await import('./db.mjs')
  const db = await startDatabase({ databaseName })
  process.env.DATABASE_URL = db.appUrl
  process.env.DATABASE_OWNER_URL = db.ownerUrl
  process.env.DATABASE_ADMIN_URL = db.adminUrl
  if (db.workUrl) process.env.DATABASE_WORK_URL = db.workUrl
  say(`PostgreSQL on ${new URL(db.appUrl).host}, database ${databaseName}`)
  return db
}

/** Tables to the newest migration and the demo shops, both idempotent. */
export async function fillDatabase() {
  await run('node_modules/.bin/tsx', ['scripts/migrate.ts'])
  await run('node_modules/.bin/tsx', ['scripts/seed.ts'])
}

const SOURCES = [
  'app',
  'components',
  'lib',
  'db',
  'public',
  'next.config.ts',
  'tailwind.config.ts',
  'postcss.config.mjs',
  'proxy.ts',
  'package-lock.json',
  'tsconfig.json',
  'scripts/build.mjs',
  'scripts/build-csp.mjs',
  'scripts/build-sw.mjs',
]

function* filesOf(path) {
  if (!existsSync(path)) return
  if (!statSync(path).isDirectory()) yield path
  else
    for (const name of readdirSync(path).sort())
      if (name !== 'sw.js') yield* filesOf(join(path, name))
}

function sourceKey() {
  const hash = createHash('sha256')
  for (const source of SOURCES)
    for (const file of filesOf(source)) hash.update(file).update('\0').update(readFileSync(file))
  return hash.digest('hex')
}

/** The production build, made again only when a source file differs. */
export async function build() {
  const key = sourceKey()
  if (existsSync('.next/BUILD_ID') && existsSync('public/sw.js') && isDone('build', key)) {
    say('build is current')
    return
  }
  say('building')
  await run(process.execPath, ['scripts/build.mjs'])
  setDone('build', key)
}

/** Answers whether nothing listens on the loopback port. */
export const isFree = (port) =>
  new Promise((answer) => {
    const probe = createServer()
    probe.once('error', () => answer(false))
    probe.listen(port, '127.0.0.1', () => probe.close(() => answer(true)))
  })

/** First free loopback port from `port` upward. */
export async function freePort(port) {
  for (let tried = port; tried < port + 100; tried++) if (await isFree(tried)) return tried
  throw new Error(`No free port between ${port} and ${port + 100}`)
}

/**
 * Where photos and voice notes are kept. With FILES_URL set that store is used, else the local one
 * (scripts/fakes/files.mjs) on a free port, which the caller starts: then the answer is true.
 */
export async function fileStore() {
  process.env.FILES_STAGE ??= join(root, '.data', 'stage')
  mkdirSync(process.env.FILES_STAGE, { recursive: true, mode: 0o700 })
  if (process.env.FILES_URL) return false
  const port = await freePort(Number(process.env.FILES_PORT ?? 9009))
  process.env.FILES_PORT = String(port)
  process.env.FILES_URL = `http://127.0.0.1:${port}`
  return true
}

/** What no service inherits (decision 010): ways in that row-level security does not bind. */
const KEPT_BACK = ['DATABASE_ADMIN_URL', 'DATABASE_OWNER_URL', 'DATABASE_WORK_URL']
/** Empty, not missing: next reads .env.local by itself, but sets nothing that is set. */
const BLANK = ['PG_ADMIN_PASSWORD', 'PG_OWNER_PASSWORD', 'PG_APP_PASSWORD', 'PG_WORK_PASSWORD']

/** This process's settings without what only the scripts need. */
function serviceEnv() {
  const kept = Object.entries(process.env).filter(([name]) => !KEPT_BACK.includes(name))
  return { ...Object.fromEntries(kept), ...Object.fromEntries(BLANK.map((name) => [name, ''])) }
}

/** Starts a long-running child; its exit is reported through `onExit`. `env`: what this one needs besides. */
export function service(command, args, onExit, env = {}) {
  const child = spawn(command, args, {
    cwd: root,
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...serviceEnv(), ...env },
  })
  child.on('exit', (code, signal) => onExit(code, signal))
  return child
}

/** Ends long-running children and waits for them; those that stay are killed after 8 seconds. */
export async function stopServices(children) {
  const gone = children.map(
    (child) =>
      new Promise((done) => {
        if (child.exitCode !== null || child.signalCode !== null) done()
        else child.once('exit', done).kill('SIGTERM')
      }),
  )
  const late = setTimeout(() => {
    for (const child of children) child.kill('SIGKILL')
  }, 8000)
  await Promise.all(gone)
  clearTimeout(late)
}

/** This process needs the database no more; the last one that does stops the server. */
export async function leaveDatabase() {
  const { leaveDatabase: leave } = await import('./db.mjs')
  await leave()
}
