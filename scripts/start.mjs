// npm start: installs what is missing, starts PostgreSQL, the local mail server and the
// local file store on loopback, migrates, seeds the demo shops, builds and serves. Ctrl-C stops all it started; data stays.
import { ending } from './ending.mjs'
import {
  build,
  database,
  fileStore,
  fillDatabase,
  freePort,
  isFree,
  leaveDatabase,
  modules,
  say,
  service,
  settings,
  stopCall,
  stopServices,
} from './setup.mjs'

settings()
const port = Number(process.env.PORT)
if (!(await isFree(port))) {
  console.error(
    `Port ${port} on 127.0.0.1 is taken. Stop what uses it or set another: PORT=3112 npm start`,
  )
  process.exit(1)
}

const ends = ending({ onSignal: 0 })
const children = []
const ended = (name) => (code) => {
  if (ends.begun) return
  console.error(`${name} ended with ${code}; stopping the rest`)
  void ends.end(1)
}

async function prepare() {
  ends.later(stopCall)
  await modules()
  ends.later(leaveDatabase)
  await database('farbench')
  ends.later(stopCall)
  await fillDatabase()
  await build()
  const mailPort = await freePort(Number(process.env.MAIL_PORT ?? 2525))
  process.env.MAIL_PORT = String(mailPort)
  process.env.MAIL_URL ??= `smtp://127.0.0.1:${mailPort}`
  return await fileStore()
}

/** `ownFiles`: the file store is ours to start. */
function serve(ownFiles) {
  if (ends.begun) return
  ends.later(() => stopServices(children))
  children.push(service(process.execPath, ['scripts/fakes/mail.mjs'], ended('mail')))
  if (ownFiles)
    children.push(service(process.execPath, ['scripts/fakes/files.mjs'], ended('files')))
  const { DATABASE_WORK_URL } = process.env
  children.push(
    service('node_modules/.bin/tsx', ['scripts/work.ts'], ended('work'), { DATABASE_WORK_URL }),
  )
  children.push(
    service(
      process.execPath,
      ['node_modules/next/dist/bin/next', 'start', '-H', '127.0.0.1', '-p', String(port)],
      ended('server'),
      { NODE_ENV: 'production' },
    ),
  )
}

async function waitUntilUp(address) {
  for (let tries = 0; !ends.begun; tries++) {
    const up = await fetch(`${address}/api/health`).then(
      (answer) => answer.ok,
      () => false,
    )
    if (up) return
    if (tries > 300) throw new Error(`No answer from ${address}/api/health`)
    await new Promise((wait) => setTimeout(wait, 100))
  }
}

await ends.around(async () => {
  serve(await prepare())
  const address = `http://127.0.0.1:${port}`
  await waitUntilUp(address)
  if (ends.begun) return
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
})
