// npm start: installs what is missing, starts PostgreSQL and the local mail server on loopback,
// migrates, seeds the demo shops, builds and serves. Ctrl-C stops all it started; data stays.
import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import {
  build,
  database,
  fillDatabase,
  freePort,
  isFree,
  modules,
  root,
  say,
  service,
  settings,
} from './setup.mjs'

settings()
const port = Number(process.env.PORT)
if (!(await isFree(port))) {
  console.error(
    `Port ${port} on 127.0.0.1 is taken. Stop what uses it or set another: PORT=3112 npm start`,
  )
  process.exit(1)
}
modules()
const db = await database('farbench')
fillDatabase()
build()

const mailPort = await freePort(Number(process.env.MAIL_PORT ?? 2525))
process.env.MAIL_PORT = String(mailPort)
process.env.MAIL_URL ??= `smtp://127.0.0.1:${mailPort}`
process.env.FILES_DIR ??= join(root, '.data', 'files')
mkdirSync(process.env.FILES_DIR, { recursive: true })

const children = []
let stopping = false
async function stop(code) {
  if (stopping) return
  stopping = true
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
  if (db.started) {
    const { stopDatabase } = await import('./db.mjs')
    await stopDatabase()
  }
  process.exit(code)
}
const ended = (name) => (code) => {
  if (stopping) return
  console.error(`${name} ended with ${code}; stopping the rest`)
  void stop(1)
}
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => void stop(0))

children.push(service(process.execPath, ['scripts/fakes/mail.mjs'], ended('mail')))
children.push(service('node_modules/.bin/tsx', ['scripts/work.ts'], ended('work')))
children.push(
  service(
    process.execPath,
    ['node_modules/next/dist/bin/next', 'start', '-H', '127.0.0.1', '-p', String(port)],
    ended('server'),
    { NODE_ENV: 'production' },
  ),
)

const address = `http://127.0.0.1:${port}`
for (let tries = 0; !stopping; tries++) {
  const up = await fetch(`${address}/api/health`).then(
    (answer) => answer.ok,
    () => false,
  )
  if (up) break
  if (tries > 300) await stop(1)
  await new Promise((wait) => setTimeout(wait, 100))
}
if (!stopping) {
  say('ready')
  console.log(`
  Farbench is at ${address}

  field (phone)   ${address}/field       mechanic@demo.invalid, guide@demo.invalid
  desk            ${address}/desk        dispatcher@demo.invalid, owner@demo.invalid
  parts desk      ${address}/desk/parts  parts@demo.invalid
  another shop    ${address}/desk        stranger@demo.invalid

  Password of every demo person: ${process.env.DEMO_PASSWORD}
  Mail sent by the demo shop is kept in .data/mail. Everything in the demo is invented.
  Ctrl-C stops all of it; the data stays.
`)
}
