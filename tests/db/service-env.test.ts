// What `npm start` hands to the processes it starts (docs/decisions/010-database-roles.md).
import { execFileSync } from 'node:child_process'
import { resolve } from 'node:path'
import { expect, it } from 'vitest'

const CODE = `
const { service } = await import(${JSON.stringify(resolve('scripts/setup.mjs'))})
service(process.execPath, ['-e', 'console.log(JSON.stringify(process.env))'], () => {}, { DATABASE_WORK_URL: process.env.WORK })
`

function environmentOf(work: string | undefined): Record<string, string> {
  const env: NodeJS.ProcessEnv = {
    ...process.env,
    DATABASE_URL: 'postgres://app',
    DATABASE_OWNER_URL: 'postgres://owner',
    DATABASE_ADMIN_URL: 'postgres://admin',
    DATABASE_WORK_URL: 'postgres://work',
    PG_ADMIN_PASSWORD: 'secret',
  }
  if (work !== undefined) env.WORK = work
  const printed = execFileSync(process.execPath, ['--input-type=module', '-e', CODE], {
    encoding: 'utf8',
    env,
  })
  return JSON.parse(printed) as Record<string, string>
}

it('[D4] a service gets no way in that row-level security does not bind', () => {
  const env = environmentOf(undefined)
  expect(env.DATABASE_URL).toBe('postgres://app')
  for (const name of ['DATABASE_OWNER_URL', 'DATABASE_ADMIN_URL', 'DATABASE_WORK_URL'])
    expect(env).not.toHaveProperty(name)
  // Set, so that next takes none from .env.local.
  for (const name of ['ADMIN', 'OWNER', 'APP', 'WORK']) expect(env[`PG_${name}_PASSWORD`]).toBe('')
})

it('[D4] the task runner alone gets its own address besides', () => {
  expect(environmentOf('postgres://work')).toMatchObject({ DATABASE_WORK_URL: 'postgres://work' })
})
