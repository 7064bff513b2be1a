// npm run bench:sync -- [--peers] [--quick] [--only B1,B4] [--keep]: measures the bars of sync on a database
// of its own and writes them to docs/performance.md. Builds what is not built; `--quick` runs tiny sizes and
// writes nothing; `--peers` installs the peers apart and runs them on the same work.
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { ending } from './ending.mjs'
import {
  build,
  call,
  database,
  installPackages,
  leaveDatabase,
  modules,
  root,
  run,
  say,
  settings,
  stopCall,
} from './setup.mjs'

const args = process.argv.slice(2)
const ends = ending({ onSignal: 1 })
await ends.around(async () => {
  settings()
  ends.later(stopCall)
  await modules()
  if (!existsSync('/usr/bin/chromium')) await installPackages('chromium')
  ends.later(leaveDatabase)
  await database('farbench_bench')
  ends.later(stopCall)
  await build()
  await buildFloor()
  if (args.includes('--peers')) await installPeers()
  const tsx = join('node_modules', '.bin', 'tsx')
  const { status } = await call(tsx, ['tests/bench/sync/bench.ts', ...args])
  await ends.end(status ?? 1)
})

function isNew(name, files) {
  const hash = createHash('sha256')
  for (const file of files) hash.update(file).update(readFileSync(file))
  const mark = join(root, '.data', 'marks', name)
  const key = hash.digest('hex')
  if (existsSync(mark) && readFileSync(mark, 'utf8') === key) return null
  return () => {
    mkdirSync(join(root, '.data', 'marks'), { recursive: true })
    writeFileSync(mark, key)
  }
}

/** The floor app, built again only when a file of it or a package differs. */
async function buildFloor() {
  const folder = join('tests', 'bench', 'floor')
  const names = readdirSync(folder, { recursive: true, encoding: 'utf8' }).sort()
  const own = names.filter((name) => !name.startsWith('.next') && /\.m?js$/.test(name))
  const setDone = isNew('floor', [...own.map((name) => join(folder, name)), 'package-lock.json'])
  if (setDone === null && existsSync(join(folder, '.next', 'BUILD_ID'))) return
  say('building the floor')
  await run(process.execPath, ['node_modules/next/dist/bin/next', 'build', folder], {
    env: { ...process.env, NODE_ENV: 'production' },
  })
  setDone?.()
}

async function installPeers() {
  const folder = join(root, 'tests', 'bench', 'peers')
  const setDone = isNew('peers', [join(folder, 'package-lock.json')])
  if (setDone === null && existsSync(join(folder, 'node_modules', 'rxdb'))) return
  say('npm ci (peers)')
  await run('npm', ['ci', '--no-audit', '--no-fund'], { cwd: folder })
  setDone?.()
}
