// scripts/db.mjs on a copy of its own in a folder that the postgres user cannot reach, next to the
// server that the other tests use.
import { execFileSync, spawnSync } from 'node:child_process'
import {
  copyFileSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  statSync,
} from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join, resolve } from 'node:path'
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'

let clone: string
let dataDir: string

const call = (...args: string[]) => {
  const env: NodeJS.ProcessEnv = { ...process.env }
  delete env.PGPORT
  return spawnSync(process.execPath, [join(clone, 'scripts/db.mjs'), ...args], {
    encoding: 'utf8',
    env,
  })
}
/** Addresses as the entry scripts get them: by calling startDatabase in a process of its own. */
const start = (databaseName = 'farbench') => {
  const module = join(clone, 'scripts/db.mjs')
  const code = `const m = await import(${JSON.stringify(module)}); console.log(JSON.stringify(await m.startDatabase({ databaseName: ${JSON.stringify(databaseName)} })))`
  return JSON.parse(
    execFileSync(process.execPath, ['--input-type=module', '-e', code], { encoding: 'utf8' }),
  ) as Record<'adminUrl' | 'ownerUrl' | 'appUrl' | 'workUrl', string> & {
    started: boolean
    port: number
  }
}
const ask = async (url: string, text: string): Promise<Record<string, unknown>[]> => {
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  try {
    return (await client.query(text)).rows
  } finally {
    await client.end()
  }
}
const postmaster = () =>
  Number(readFileSync(join(dataDir, 'postmaster.pid'), 'utf8').split('\n')[0])

beforeAll(async () => {
  clone = mkdtempSync(join(tmpdir(), 'farbench clone '))
  mkdirSync(join(clone, 'scripts'))
  for (const file of ['db.mjs', 'db-lock.mjs', 'db-roles.mjs', 'db-server.mjs', 'db-users.mjs']) {
    copyFileSync(resolve('scripts', file), join(clone, 'scripts', file))
  }
  const { adminUrl } = start()
  const [row] = await ask(adminUrl, `select current_setting('data_directory') as dir`)
  dataDir = String(row?.dir)
}, 120_000)
afterAll(() => {
  call('stop')
  const own = dataDir.startsWith('/var/lib/farbench/') ? [dirname(dataDir)] : []
  for (const path of [clone, dataDir, `${dataDir}.log`, ...own])
    rmSync(path, { recursive: true, force: true })
})

describe("[D11] the project's own PostgreSQL", () => {
  it('[D11] listens on loopback alone and has no Unix socket', async () => {
    const { adminUrl, port } = start()
    const [row] = await ask(
      adminUrl,
      `select current_setting('listen_addresses') as at, current_setting('unix_socket_directories') as socket`,
    )
    expect(row).toEqual({ at: '127.0.0.1', socket: '' })
    expect(port).toBeGreaterThanOrEqual(54329)
    expect(call('status').stdout).toContain(`running on 127.0.0.1:${port}`)
  })

  it("[D11] asks every role for its password, by scram, and keeps them from others' eyes", async () => {
    const { adminUrl, ownerUrl, appUrl, workUrl } = start()
    const rules = await ask(adminUrl, 'select distinct auth_method from pg_hba_file_rules')
    expect(rules).toEqual([{ auth_method: 'scram-sha-256' }])
    expect(statSync(join(clone, '.env.local')).mode & 0o777).toBe(0o600)
    const secrets = new Set<string>()
    for (const url of [adminUrl, ownerUrl, appUrl, workUrl]) {
      const wrong = new URL(url)
      secrets.add(wrong.password)
      wrong.password = 'guess'
      await expect(ask(wrong.href, 'select 1')).rejects.toMatchObject({ code: '28P01' })
    }
    expect(secrets.size).toBe(4)
    expect(Math.min(...[...secrets].map((secret) => secret.length))).toBeGreaterThanOrEqual(32)
    expect(call('start').stdout).not.toContain([...secrets][0])
  })

  it('[D11] for root its data lies out of reach where no other user can put anything in the way', () => {
    start()
    if (process.getuid?.() !== 0) return expect(dataDir.startsWith(clone)).toBe(true)
    expect(dataDir).toMatch(/^\/var\/lib\/farbench\/[0-9a-f]{12}\/pg$/)
    for (const path of ['/var/lib/farbench', dirname(dataDir)]) {
      const { uid, mode } = statSync(path)
      expect([uid, mode & 0o777]).toEqual([0, 0o711])
    }
    expect(statSync(dataDir).mode & 0o777).toBe(0o700)
    expect(existsSync(`${dataDir}.password`)).toBe(false)
  })

  it('[D11] a second database is apart from the first', async () => {
    const [first, second] = [start(), start('farbench_other')]
    expect(second.started).toBe(false)
    await ask(first.ownerUrl, 'create table only_here (x int)')
    await expect(ask(second.ownerUrl, 'select * from only_here')).rejects.toMatchObject({
      code: '42P01',
    })
    await ask(first.ownerUrl, 'drop table only_here')
  })

  it('[D11] starts again with its data after the server was killed', async () => {
    const { ownerUrl } = start()
    await ask(ownerUrl, 'create table kept as select 42 as answer')
    process.kill(postmaster(), 'SIGKILL')
    const again = start()
    expect(again.started).toBe(true)
    expect(await ask(again.ownerUrl, 'select answer from kept')).toEqual([{ answer: 42 }])
  }, 60_000)

  it('[D11] is not misled by the process id of something else', () => {
    call('stop')
    const { port } = start()
    expect(port).toBeGreaterThan(0)
    const text = readFileSync(join(dataDir, 'postmaster.pid'), 'utf8')
    const other = text.replace(/^\d+/, String(process.pid))
    expect(other).not.toBe(text)
    process.kill(postmaster(), 'SIGKILL')
    execFileSync('sh', ['-c', 'cat > "$0"', join(dataDir, 'postmaster.pid')], { input: other })
    expect(call('status').stdout).toContain('stopped')
    expect(start().started).toBe(true)
  }, 60_000)

  it('[D11] outlives a lost .env.local: new passwords, old data', async () => {
    const before = start()
    rmSync(join(clone, '.env.local'))
    const after = start()
    expect(after.ownerUrl).not.toBe(before.ownerUrl)
    expect(await ask(after.ownerUrl, 'select answer from kept')).toEqual([{ answer: 42 }])
    await expect(ask(before.adminUrl, 'select 1')).rejects.toThrow()
  }, 60_000)

  it('[D11] two starts at once agree', async () => {
    call('stop')
    const code = `const m = await import(${JSON.stringify(join(clone, 'scripts/db.mjs'))}); console.log(JSON.stringify(await m.startDatabase()))`
    const { execFile } = await import('node:child_process')
    const one = () =>
      new Promise<{ started: boolean; appUrl: string }>((done, lost) =>
        execFile(process.execPath, ['--input-type=module', '-e', code], (error, out) =>
          error ? lost(error) : done(JSON.parse(out)),
        ),
      )
    const [left, right] = await Promise.all([one(), one()])
    expect(left.appUrl).toBe(right.appUrl)
    expect([left.started, right.started].sort()).toEqual([false, true])
    expect(existsSync(join(clone, '.data/pg.lock'))).toBe(false)
  }, 60_000)

  it('[D11] stops, says so, and stops twice', () => {
    start()
    expect(call('stop').stdout).toBe('stopped\n')
    expect(call('stop').status).toBe(0)
    expect(call('status').status).toBe(3)
  })
})
