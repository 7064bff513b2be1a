import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { findJob } from '@/db/queries/jobs'
import { smtpMail } from '@/lib/ports/mail'
import { leaveField } from '@/lib/work/leave-field'
import { workOnce } from '@/lib/work/run'
import { startMail } from '../../scripts/fakes/mail.mjs'
import { jobOpen, partRequestAsk } from '../support/field-ops'
import type { RawDevice } from '../support/raw-device'
import { openSyncWorld, phoneOf, pullAll, type SyncWorld, sync } from '../support/sync-world'

let world: SyncWorld
let device: RawDevice
let cookie: string
let folder: string
let server: Awaited<ReturnType<typeof startMail>>
beforeAll(async () => {
  world = await openSyncWorld()
  const phone = await phoneOf(world.a, 'mechanic')
  device = phone.device
  cookie = phone.cookie
  folder = mkdtempSync(join(tmpdir(), 'farbench-mail-'))
  server = await startMail({ port: 0, folder })
})
afterAll(async () => {
  await server.stop()
  await world.close()
  rmSync(folder, { recursive: true, force: true })
})

const letters = () =>
  readdirSync(folder)
    .sort()
    .map((name) => readFileSync(join(folder, name), 'utf8'))
const work = (port = server.port) =>
  workOnce({
    queueUrl: world.db.workUrl,
    mail: smtpMail(`smtp://127.0.0.1:${port}`, 'Farbench <farbench@demo.invalid>'),
    address: 'http://127.0.0.1:3111',
  })
const waiting = async () => {
  const { rows } = await sql<{ key: string; attempts: number }>`
    select key, attempts from graphile_worker.jobs order by key`.execute(world.db.admin)
  return rows
}

async function askForParts() {
  const opening = jobOpen(world.a.machineId)
  const ask = partRequestAsk(opening.fields.id, { note: 'Lamp off before eight' })
  const ops = [device.op(opening), device.op(ask)]
  await sync(device, ops)
  return { ops, request: ask.fields, job: opening.fields.id }
}

describe('work after a commit', () => {
  it('[AC1] tells the parts people of a request by one letter, however often it is sent', async () => {
    const { ops, request, job } = await askForParts()
    await sync(device, ops)
    await work()
    await work()
    const [letter, ...more] = letters()
    expect(more).toEqual([])
    const row = await asShop(world.a.id, (tx) => findJob(tx, job))
    for (const words of [
      row?.number,
      world.a.people.parts?.email,
      world.a.people.both?.email,
      '1 x Ignition coil',
      'Lamp off before eight',
      '/desk/parts',
      'Test mechanic',
      `<${request.id}@demo.invalid>`,
    ]) {
      expect(letter).toContain(words)
    }
    expect(letter).toMatch(/^Subject: .*needed today/m)
    expect(letter).not.toContain(world.a.people.owner?.email)
    expect(await waiting()).toEqual([])
  })

  it('[AC1] tries again when the mail server is away, and loses nothing', async () => {
    const before = letters().length
    const { request } = await askForParts()
    await work(1)
    expect(letters()).toHaveLength(before)
    expect(await waiting()).toEqual([
      { key: `${world.a.id}:partRequestMail:${request.id}`, attempts: 1 },
    ])
    await sql`update graphile_worker._private_jobs set run_at = now()`.execute(world.db.admin)
    await work()
    expect(letters()).toHaveLength(before + 1)
    // The queue strikes the task off after the mail server's answer, on a connection of its own.
    await expect.poll(waiting).toEqual([])
  })

  it('[AC1] sends nothing for a push that was refused', async () => {
    const before = letters().length
    const guide = (await phoneOf(world.a, 'guide')).device
    const opening = jobOpen(world.a.machineId)
    const answer = await sync(guide, [
      guide.op(opening),
      guide.op(partRequestAsk(opening.fields.id)),
    ])
    expect(answer.results).toMatchObject([{ result: 'rejected', code: 'forbidden' }])
    await work()
    expect(letters()).toHaveLength(before)
  })

  it('[R22] takes a job off the phones 60 days after closing, and not before', async () => {
    const { job } = await askForParts()
    await work()
    await pullAll(device, cookie)
    await sync(device, [
      device.op({
        kind: 'job.move',
        entityId: job,
        jobId: job,
        fields: { from: 'open', to: 'closed', reason: null },
      }),
    ])
    await pullAll(device, cookie)
    expect(await waiting()).toMatchObject([{ key: `${world.a.id}:leaveField:${job}` }])
    const days = (count: number) => Date.now() + count * 24 * 3_600_000
    await leaveField({ shopId: world.a.id }, { now: days(59) })
    expect(await pullAll(device, cookie)).toEqual([])
    await leaveField({ shopId: world.a.id }, { now: days(61) })
    const gone = await pullAll(device, cookie)
    expect(gone).toContainEqual(
      expect.objectContaining({ entity: 'job', id: job, state: 'evict', row: null }),
    )
    expect(await asShop(world.a.id, (tx) => findJob(tx, job))).toMatchObject({ state: 'closed' })
  })
})
