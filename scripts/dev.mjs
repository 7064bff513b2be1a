// npm run dev: the database, the mail server, the file store and Next.js with reloading; no service worker.
import { ending } from './ending.mjs'
import {
  database,
  fileStore,
  fillDatabase,
  freePort,
  leaveDatabase,
  modules,
  service,
  settings,
  stopCall,
  stopServices,
} from './setup.mjs'

settings()
const ends = ending({ onSignal: 0 })
await ends.around(async () => {
  ends.later(stopCall)
  await modules()
  ends.later(leaveDatabase)
  await database('farbench')
  ends.later(stopCall)
  await fillDatabase()
  const mailPort = await freePort(Number(process.env.MAIL_PORT ?? 2525))
  process.env.MAIL_PORT = String(mailPort)
  process.env.MAIL_URL ??= `smtp://127.0.0.1:${mailPort}`
  const ownFiles = await fileStore()
  if (ends.begun) return
  const end = (code) => void ends.end(code ?? 0)
  const children = [
    service(process.execPath, ['scripts/fakes/mail.mjs'], end),
    ...(ownFiles ? [service(process.execPath, ['scripts/fakes/files.mjs'], end)] : []),
    service('node_modules/.bin/tsx', ['scripts/work.ts'], end, {
      DATABASE_WORK_URL: process.env.DATABASE_WORK_URL,
    }),
    service(
      process.execPath,
      ['node_modules/next/dist/bin/next', 'dev', '-H', '127.0.0.1', '-p', process.env.PORT],
      end,
    ),
  ]
  ends.later(() => stopServices(children))
})
