// npm run kill -- [--rounds 50] [--only server|postgres|phone] [--seed 7]: kills server, database and phone in
// the middle of their work, again and again, and proves after each that nothing is lost or doubled.
import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { ending } from './ending.mjs'
import {
  build,
  call,
  database,
  installPackages,
  leaveDatabase,
  modules,
  settings,
  stopCall,
} from './setup.mjs'

const args = process.argv.slice(2)
const only = args.includes('--only') ? args[args.indexOf('--only') + 1] : undefined
const wants = (part) => only === undefined || only === part

const ends = ending({ onSignal: 1 })
await ends.around(async () => {
  settings()
  ends.later(stopCall)
  await modules()
  ends.later(leaveDatabase)
  await database('farbench_test')
  ends.later(stopCall)
  if (wants('phone') && !existsSync('/usr/bin/chromium')) await installPackages('chromium')
  if (wants('server')) await build()
  const tsx = join('node_modules', '.bin', 'tsx')
  const { status } = await call(tsx, ['tests/kill/kill.ts', ...args])
  await ends.end(status ?? 1)
})
