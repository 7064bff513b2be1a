// npm run dev: the database, the mail server and Next.js with reloading; no service worker.
import { join } from 'node:path'
import { database, fillDatabase, freePort, modules, root, service, settings } from './setup.mjs'

settings()
modules()
await database('farbench')
fillDatabase()
const mailPort = await freePort(Number(process.env.MAIL_PORT ?? 2525))
process.env.MAIL_PORT = String(mailPort)
process.env.MAIL_URL ??= `smtp://127.0.0.1:${mailPort}`
process.env.FILES_DIR ??= join(root, '.data', 'files')
const end = (code) => process.exit(code ?? 0)
const children = [
  service(process.execPath, ['scripts/fakes/mail.mjs'], end),
  service('node_modules/.bin/tsx', ['scripts/work.ts'], end),
  service(
    process.execPath,
    ['node_modules/next/dist/bin/next', 'dev', '-H', '127.0.0.1', '-p', process.env.PORT],
    end,
  ),
]
for (const signal of ['SIGINT', 'SIGTERM'])
  process.on(signal, () => {
    for (const child of children) child.kill(signal)
  })
