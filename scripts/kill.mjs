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
const parts = only === undefined ? ['server', 'postgres', 'phone'] : [only]

const ends = ending({ onSignal: 1 })
await ends.around(async () => {
  settings()
  ends.later(stopCall)
  await modules()
  ends.later(leaveDatabase)
  await database('farbench_test')
  ends.later(stopCall)
  if (parts.includes('phone') && !existsSync('/usr/bin/chromium')) await installPackages('chromium')
  if (parts.includes('server')) await build()
  const tsx = join('node_modules', '.bin', 'tsx')
  let worst = 0
  // Each in a process of its own: the server's settings are read once per process, and each has its own file store.
  for (const part of parts) {
    if (ends.begun) return
    const { status } = await call(tsx, ['tests/kill/kill.ts', ...args, '--only', part])
    worst = Math.max(worst, status ?? 1)
  }
  await ends.end(worst)
})
