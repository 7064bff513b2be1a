// Two starts of the product at once migrate one after the other.
import { randomBytes } from 'node:crypto'
import pg from 'pg'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { startDatabase } from '../../scripts/db.mjs'
import { migrateDatabase } from '../../scripts/migrate'

const name = `farbench_test_${process.pid}_${randomBytes(4).toString('hex')}`
let admin: pg.Client
let at: { ownerUrl: string; workUrl: string }

beforeAll(async () => {
  const server = await startDatabase({ databaseName: 'farbench_test' })
  admin = new pg.Client({ connectionString: server.adminUrl })
  await admin.connect()
  await admin.query(`create database ${name} owner farbench_owner`)
  await admin.query(`revoke all on database ${name} from public`)
  await admin.query(`grant connect on database ${name} to farbench_app, farbench_work`)
  const of = (url: string) => Object.assign(new URL(url), { pathname: `/${name}` }).href
  at = { ownerUrl: of(server.ownerUrl), workUrl: of(server.workUrl) }
}, 60_000)
afterAll(async () => {
  await admin.query(`drop database if exists ${name} with (force)`)
  await admin.end()
})

it('[D11] three at once run each migration once and leave the queue’s role no right to create', async () => {
  const ran = await Promise.all([migrateDatabase(at), migrateDatabase(at), migrateDatabase(at)])
  const names = ran.flat()
  expect(names.length).toBeGreaterThan(0)
  expect(new Set(names).size).toBe(names.length)
  expect(ran.filter((one) => one.length > 0)).toHaveLength(1)
  const { rows } = await admin.query(
    `select has_database_privilege('farbench_work', '${name}', 'create') as may`,
  )
  expect(rows).toEqual([{ may: false }])
}, 120_000)
