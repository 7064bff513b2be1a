// npm test: does its own set-up and runs every check and test; `npm test -- check|unit|e2e` runs one part.
// The last line is the sum over all runners: `N passed, N failed`.
import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import {
  build,
  database,
  fillDatabase,
  installPackages,
  modules,
  root,
  say,
  settings,
} from './setup.mjs'

const only = process.argv[2]
const wants = (part) => only === undefined || only === part
const sum = { passed: 0, failed: 0 }
const results = join(root, '.data', 'results')
rmSync(results, { recursive: true, force: true })
mkdirSync(results, { recursive: true })

settings()
modules()
const db = await database('farbench_test')

/** Runs one runner; a runner that dies without a result counts as one failure. */
function runner(name, command, args, count, env = {}) {
  say(name)
  const done = spawnSync(command, args, {
    stdio: 'inherit',
    cwd: root,
    env: { ...process.env, ...env },
  })
  let counted = { passed: 0, failed: 0 }
  try {
    counted = count(done)
  } catch (problem) {
    console.error(`${name}: no result (${problem.message})`)
  }
  if (done.status !== 0 && counted.failed === 0) counted.failed = 1
  sum.passed += counted.passed
  sum.failed += counted.failed
  say(`${name}: ${counted.passed} passed, ${counted.failed} failed`)
}

/** Browser tests begin with the demo shops alone, whatever an earlier run left. */
async function dropDatabase(name) {
  const { default: pg } = await import('pg')
  const admin = new pg.Client(db.adminUrl)
  await admin.connect()
  await admin.query(`drop database if exists ${name} with (force)`)
  await admin.end()
}

const readJson = (file) => JSON.parse(readFileSync(join(results, file), 'utf8'))

if (wants('check'))
  runner('check', process.execPath, ['scripts/check.mjs'], () => readJson('check.json'))

if (wants('unit'))
  runner(
    'unit, standards, database, sync',
    join('node_modules', '.bin', 'vitest'),
    [
      'run',
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${join(results, 'vitest.json')}`,
    ],
    () => {
      const report = readJson('vitest.json')
      return {
        passed: report.numPassedTests,
        failed:
          report.numFailedTests +
          (report.numFailedTestSuites > 0 && report.numFailedTests === 0 ? 1 : 0),
      }
    },
  )

if (wants('e2e')) {
  if (!existsSync('/usr/bin/chromium')) installPackages('chromium')
  build()
  await dropDatabase('farbench_e2e')
  await database('farbench_e2e')
  fillDatabase()
  runner(
    'end to end',
    join('node_modules', '.bin', 'playwright'),
    ['test'],
    () => {
      const { stats } = readJson('e2e.json')
      return { passed: stats.expected, failed: stats.unexpected + stats.flaky }
    },
    { NODE_ENV: 'test' },
  )
}

if (db.started) {
  const { stopDatabase } = await import('./db.mjs')
  await stopDatabase()
}
console.log(`${sum.passed} passed, ${sum.failed} failed`)
process.exit(sum.failed === 0 && sum.passed > 0 ? 0 : 1)
