// How the entry scripts end, on a copy of their own in a folder with nothing else of the project in it.
import { type ChildProcess, spawn, spawnSync } from 'node:child_process'
import {
  copyFileSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  rmSync,
  writeFileSync,
} from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'

let clone: string
const env: NodeJS.ProcessEnv = { ...process.env }
for (const name of ['PGPORT', 'DATABASE_URL', 'DATABASE_OWNER_URL']) delete env[name]

const db = (...args: string[]) =>
  spawnSync(process.execPath, [join(clone, 'scripts/db.mjs'), ...args], { encoding: 'utf8', env })
const isUp = () => db('status').status === 0

type Begun = { child: ChildProcess; said: () => string; ended: Promise<number | null> }
function begin(args: string[]): Begun {
  const child = spawn(process.execPath, args, { cwd: clone, env })
  let text = ''
  child.stdout.on('data', (piece) => {
    text += piece
  })
  child.stderr.on('data', (piece) => {
    text += piece
  })
  const ended = new Promise<number | null>((done) => child.once('exit', done))
  return { child, said: () => text, ended }
}

/** An entry script in small: the database, then a command that takes long, as a build does. */
const SCRIPT = `
import { ending } from './ending.mjs'
import { database, leaveDatabase, run, stopCall } from './setup.mjs'
const ends = ending({ onSignal: 7 })
await ends.around(async () => {
  ends.later(leaveDatabase)
  await database('farbench')
  ends.later(stopCall)
  await run(process.execPath, ['-e', process.argv[2]])
})
`
const LONG = "console.log('at work', process.pid); setInterval(() => {}, 1000)"
async function atWork(): Promise<Begun & { worker: number }> {
  const begun = begin(['scripts/long.mjs', LONG])
  await expect.poll(begun.said, { timeout: 60_000 }).toMatch(/at work \d+/)
  return { ...begun, worker: Number(/at work (\d+)/.exec(begun.said())?.[1]) }
}

beforeAll(() => {
  clone = mkdtempSync(join(tmpdir(), 'farbench ends '))
  mkdirSync(join(clone, 'scripts'))
  for (const file of readdirSync('scripts').filter((name) => name.endsWith('.mjs')))
    copyFileSync(resolve('scripts', file), join(clone, 'scripts', file))
  writeFileSync(join(clone, 'scripts/long.mjs'), SCRIPT)
})
afterAll(() => {
  db('stop')
  const dataDir = /data in (.*)/.exec(db('start').stdout)?.[1]
  db('stop')
  for (const path of [clone, dataDir, `${dataDir}.log`])
    if (path) rmSync(path, { recursive: true, force: true })
})

describe('[D11] a script that is told to stop leaves nothing running', () => {
  it.each(['SIGINT', 'SIGTERM'] as const)(
    '[D11] %s during a long step',
    async (signal) => {
      const { child, ended, worker } = await atWork()
      child.kill(signal)
      expect(await ended).toBe(7)
      expect(isUp()).toBe(false)
      expect(existsSync(`/proc/${worker}`)).toBe(false)
    },
    120_000,
  )

  it('[D11] a step that fails ends with 1 and stops the database', async () => {
    const { ended } = begin(['scripts/long.mjs', 'process.exit(3)'])
    expect(await ended).toBe(1)
    expect(isUp()).toBe(false)
  }, 120_000)

  it('[D11] after one that was killed, the next one stops what was left', async () => {
    const first = await atWork()
    first.child.kill('SIGKILL')
    await first.ended
    process.kill(first.worker)
    expect(isUp()).toBe(true)
    const second = await atWork()
    second.child.kill('SIGTERM')
    await second.ended
    expect(isUp()).toBe(false)
  }, 120_000)

  it('[D11] the first to leave does not stop it under the second', async () => {
    const [first, second] = [await atWork(), await atWork()]
    first.child.kill('SIGTERM')
    await first.ended
    expect(isUp()).toBe(true)
    second.child.kill('SIGTERM')
    await second.ended
    expect(isUp()).toBe(false)
  }, 120_000)

  it('[D11] a database started by hand stays', async () => {
    db('start')
    const { child, ended } = await atWork()
    child.kill('SIGTERM')
    await ended
    expect(isUp()).toBe(true)
    db('stop')
  }, 120_000)
})

describe('[D11] npm test always says the sum', () => {
  it('[D11] a set-up that fails counts as one failure', async () => {
    const { ended, said } = begin(['scripts/test.mjs', 'unit'])
    expect(await ended).toBe(1)
    expect(said().trim().split('\n').at(-1)).toBe('0 passed, 1 failed')
  }, 60_000)
})
