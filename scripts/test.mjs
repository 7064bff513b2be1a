// npm test: does its own set-up and runs every check and test; `npm test -- check|unit|e2e` runs one part,
// `npm test -- unit|e2e NAME..` the files of that part whose path holds a name.
// The last line is the sum over all runners: `N passed, N failed`.
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { ending } from './ending.mjs'
import {
  build,
  call,
  database,
  fillDatabase,
  installPackages,
  leaveDatabase,
  modules,
  root,
  say,
  settings,
  stopCall,
} from './setup.mjs'

const [only, ...names] = process.argv.slice(2)
const wants = (part) => only === undefined || only === part
const sum = { passed: 0, failed: 0 }
const results = join(root, '.data', 'results')
rmSync(results, { recursive: true, force: true })
mkdirSync(results, { recursive: true })

const ends = ending({
  onSignal: 1,
  last: (code) => {
    if (code !== 0 && sum.failed === 0) sum.failed = 1
    console.log(`${sum.passed} passed, ${sum.failed} failed`)
    return code || (sum.failed === 0 && sum.passed > 0 ? 0 : 1)
  },
})

/** Makes ready what tests need; one that fails counts as one failure, and its tests do not run. */
async function ready(name, prepare) {
  try {
    await prepare()
    return !ends.begun
  } catch (problem) {
    if (!ends.begun) {
      console.error(`${name}: ${problem.stack}`)
      sum.failed += 1
    }
    return false
  }
}

/** Runs one runner; a runner that dies without a result counts as one failure. */
async function runner(name, command, args, count, env = {}) {
  if (ends.begun) return
  say(name)
  let done = { status: null }
  let counted = { passed: 0, failed: 0 }
  try {
    done = await call(command, args, { env: { ...process.env, ...env } })
    if (ends.begun) return
    counted = count()
  } catch (problem) {
    console.error(`${name}: no result (${problem.message})`)
  }
  if (done.status !== 0 && counted.failed === 0) counted.failed = 1
  sum.passed += counted.passed
  sum.failed += counted.failed
  say(`${name}: ${counted.passed} passed, ${counted.failed} failed`)
}

/** Browser tests begin with the demo shops alone, whatever an earlier run left. */
async function dropDatabase(adminUrl, name) {
  const { default: pg } = await import('pg')
  const admin = new pg.Client(adminUrl)
  await admin.connect()
  await admin.query(`drop database if exists ${name} with (force)`)
  await admin.end()
}

const readJson = (file) => JSON.parse(readFileSync(join(results, file), 'utf8'))

async function checks() {
  await runner('check', process.execPath, ['scripts/check.mjs'], () => readJson('check.json'))
}

/** What browsers are tested in; the phone is killed in one in the unit part, too. */
const chromium = async () => {
  if (!existsSync('/usr/bin/chromium')) await installPackages('chromium')
}

async function units() {
  if (!(await ready('Chromium', chromium))) return
  const out = join(results, 'vitest.json')
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${out}`]
  const vitest = join('node_modules', '.bin', 'vitest')
  await runner('unit, standards, database, sync', vitest, ['run', ...names, ...reporters], () => {
    const { numPassedTests, numFailedTests, numFailedTestSuites } = readJson('vitest.json')
    const lost = numFailedTestSuites > 0 && numFailedTests === 0 ? 1 : 0
    return { passed: numPassedTests, failed: numFailedTests + lost }
  })
}

async function endToEnd(adminUrl) {
  const isReady = await ready('set-up of the browser tests', async () => {
    await chromium()
    await build()
    await dropDatabase(adminUrl, 'farbench_e2e')
    await database('farbench_e2e')
    await fillDatabase()
  })
  if (!isReady) return
  const count = () => {
    const { stats } = readJson('e2e.json')
    return { passed: stats.expected, failed: stats.unexpected + stats.flaky }
  }
  const playwright = join('node_modules', '.bin', 'playwright')
  await runner('end to end', playwright, ['test', ...names], count, { NODE_ENV: 'test' })
}

await ends.around(async () => {
  let adminUrl = ''
  const isReady = await ready('set-up', async () => {
    settings()
    ends.later(stopCall)
    await modules()
    ends.later(leaveDatabase)
    ;({ adminUrl } = await database('farbench_test'))
    ends.later(stopCall)
  })
  if (isReady && wants('check')) await checks()
  if (isReady && wants('unit')) await units()
  if (isReady && wants('e2e')) await endToEnd(adminUrl)
  await ends.end(0)
})
