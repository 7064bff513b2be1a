import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { listAudit } from '@/db/queries/audit'
import { lastChange, takeChanges } from '@/db/queries/changes'
import { publishBook } from '@/db/queries/code-book'
import { readBoard } from '@/db/queries/desk-board'
import { moveJobAtDesk } from '@/db/queries/desk-closing'
import { findDevice } from '@/db/queries/devices'
import { findJob } from '@/db/queries/jobs'
import { listLog } from '@/db/queries/log-entries'
import { readPhones } from '@/db/queries/phones'
import type { Closing } from '@/lib/model/closing'
import type { JobState } from '@/lib/model/job'
import type { Actor } from '@/lib/model/person'
import { closingMove, reopeningMove } from '@/lib/shop/closing'
import { leavesFieldAt } from '@/lib/shop/scope'
import { revokePhone } from '@/lib/sync/server/revoke'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { AT, makeJob, makeShop, newId, type TestShop } from '../support/shop-fixture'
import { expectWholeShop } from '../support/whole-shop'

const CLOSED_AT = '2026-11-25T09:00:00.000Z'
const fault = BOOK_ITEMS.find((item) => item.kind === 'fault')!

let db: TestDatabase
let shop: TestShop
let other: TestShop
let actor: Actor
beforeAll(async () => {
  db = await openTestDatabase()
  shop = await makeShop({ mechanic: ['mechanic'], dispatcher: ['dispatcher'] })
  other = await makeShop({ mechanic: ['mechanic'] })
  const { id: personId, name, roles } = shop.people.dispatcher!
  actor = { shopId: shop.id, personId, name, roles }
  await asShop(shop.id, async (tx) => {
    await publishBook(tx, { version: 3, items: BOOK_ITEMS, publishedAt: AT, publishedBy: null })
    await takeChanges(tx, [{ entity: 'book', id: '3', jobId: null }])
  })
})
afterAll(() => db.close())

const stamped = () => ({
  stamp: { auditId: newId(), entryId: newId(), at: CLOSED_AT, engineVersion: '1' },
  leaveFieldAt: leavesFieldAt(CLOSED_AT),
})
const proved: Closing = {
  cause: { kind: 'fault', fault: fault.id },
  grade: 'proved',
  reason: 'New part fitted, two dry runs.',
}
const close = (jobId: string, closing = proved, from: JobState = 'open') =>
  moveJobAtDesk(
    actor,
    {
      jobId,
      fault: closing.cause?.kind === 'fault' ? closing.cause.fault : null,
      ...stamped(),
    },
    (job, faultName) => closingMove({ actor, job, from }, closing, faultName),
  )
const reopen = (jobId: string, reason: string) =>
  moveJobAtDesk(actor, { jobId, fault: null, ...stamped() }, (job) =>
    reopeningMove({ actor, job, from: 'closed' }, reason),
  )
const log = (jobId: string) => asShop(shop.id, (tx) => listLog(tx, jobId))
const jobNow = (jobId: string) => asShop(shop.id, (tx) => findJob(tx, jobId))
const tasks = async () => {
  const { rows } = await sql<{ key: string; runAt: Date | string }>`
    select key, run_at from graphile_worker.jobs`.execute(db.admin)
  return rows
}

describe('closing at the desk', () => {
  it('[R13] [R25] writes state, log line, trail and the day it leaves the phones, in one', async () => {
    const jobId = await makeJob(shop, shop.people.mechanic!)
    expect(await close(jobId)).toEqual({ ok: true, value: null })
    expect(await jobNow(jobId)).toMatchObject({ state: 'closed' })
    const [line] = await log(jobId)
    const name = fault.kind === 'fault' ? fault.name : ''
    expect(line).toMatchObject({
      authorId: actor.personId,
      bookVersion: 3,
      happenedAt: CLOSED_AT,
      body: {
        kind: 'note',
        words: `Job closed. Cause proved: ${name}. New part fitted, two dry runs.`,
      },
    })
    const trail = await asShop(shop.id, (tx) => listAudit(tx, jobId))
    expect(trail.map(({ action, detail }) => [action, detail])).toEqual([
      [
        'job.close',
        { from: 'open', to: 'closed', entryId: line?.id, fault: fault.id, grade: 'proved' },
      ],
    ])
    const queued = (await tasks()).filter(({ key }) => key === `${shop.id}:leaveField:${jobId}`)
    expect(queued.map(({ runAt }) => new Date(String(runAt)).toISOString())).toEqual([
      '2027-01-25T09:00:00.000Z',
    ])
    await expectWholeShop(shop.id)
  })

  it('[R13] reopens with the closing kept, and closes again by the same desk', async () => {
    const jobId = await makeJob(shop, shop.people.mechanic!)
    await close(jobId)
    expect(await reopen(jobId, 'Came back on Monday.')).toEqual({ ok: true, value: null })
    expect(await jobNow(jobId)).toMatchObject({ state: 'open' })
    expect(await close(jobId, { cause: null, grade: 'unknown', reason: 'Sold.' })).toMatchObject({
      ok: true,
    })
    expect((await log(jobId)).map(({ body }) => body.kind === 'note' && body.words)).toEqual([
      expect.stringContaining('Job closed. Cause proved'),
      'Job reopened. Came back on Monday.',
      'Job closed. Cause unknown. Sold.',
    ])
    const trail = await asShop(shop.id, (tx) => listAudit(tx, jobId))
    expect(trail.map(({ action }) => action)).toEqual(['job.close', 'job.reopen', 'job.close'])
    await expectWholeShop(shop.id)
  })

  it('[R19] a line written at the desk is no word from the field, and closing has its own time', async () => {
    const jobId = await makeJob(shop, shop.people.mechanic!)
    await close(jobId)
    const board = await readBoard(shop.id, { kind: 'all' }, Date.parse(CLOSED_AT) + 3_600_000)
    expect(board.closed.find(({ job }) => job.id === jobId)).toMatchObject({
      closedAt: CLOSED_AT,
      heardAt: null,
    })
    const desk = await asShop(shop.id, (tx) => findDevice(tx, actor.personId))
    expect(desk).toMatchObject({ name: 'Desk', lastSeenAt: null, personId: actor.personId })
  })

  it('[Q1] the desk that a line names is no phone: it is not listed, and nobody can take it out', async () => {
    const { personId } = actor
    await close(await makeJob(shop, shop.people.mechanic!))
    const { phones } = await readPhones(shop.id)
    expect(phones.map((phone) => phone.id)).not.toContain(personId)
    expect(phones.map((phone) => phone.person.id)).toContain(shop.people.mechanic!.id)
    const asked = { phoneId: personId, reason: 'lost' }
    const told = await revokePhone(actor, asked, { now: Date.parse(CLOSED_AT), newId })
    expect(told).toEqual({ ok: false, problem: { kind: 'notFound' } })
    const desk = await asShop(shop.id, (tx) => findDevice(tx, personId))
    expect(desk?.revokedAt).toBeNull()
  })

  it('[R13] of two desks that press in the same second exactly one closes it', async () => {
    const jobId = await makeJob(shop, shop.people.mechanic!)
    const answers = await Promise.all([close(jobId), close(jobId)])
    expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
    expect(answers.find(({ ok }) => !ok)).toMatchObject({
      problem: { kind: 'jobMovedMeanwhile', now: 'closed' },
    })
    expect(await log(jobId)).toHaveLength(1)
  })

  it('[R22] finds no job of another shop and no fault outside the book, and writes nothing', async () => {
    const foreign = await makeJob(other, other.people.mechanic!)
    const own = await makeJob(shop, shop.people.mechanic!)
    const before = await asShop(shop.id, lastChange)
    const nowhere = { ok: false, problem: { kind: 'notFound' } }
    expect(await close(foreign)).toEqual(nowhere)
    expect(await close(newId())).toEqual(nowhere)
    const unknown = { ...proved, cause: { kind: 'fault' as const, fault: 'noSuchFault' } }
    expect(await close(own, unknown)).toEqual(nowhere)
    expect(await close(own, { ...proved, cause: null })).toMatchObject({ ok: false })
    expect(await asShop(shop.id, lastChange)).toBe(before)
    expect(await jobNow(own)).toMatchObject({ state: 'open' })
  })
})
