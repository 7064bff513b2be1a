import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { lastChange, takeChanges } from '@/db/queries/changes'
import { changeAssignment, changePartLine } from '@/db/queries/desk-writes'
import { findJob } from '@/db/queries/jobs'
import { findPartRequest, insertPartRequests } from '@/db/queries/part-requests'
import type { Actor } from '@/lib/model/person'
import { fail } from '@/lib/model/result'
import { type LineMove, moveLine, stateAfterAssigning } from '@/lib/shop/desk-moves'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { AT, makeJob, makeShop, newId, requestOf, type TestShop } from '../support/shop-fixture'
import { expectWholeShop } from '../support/whole-shop'

let db: TestDatabase
let shop: TestShop
let other: TestShop
let actor: Actor
beforeAll(async () => {
  db = await openTestDatabase()
  shop = await makeShop({ mechanic: ['mechanic'], owner: ['owner'] })
  other = await makeShop({ mechanic: ['mechanic'] })
  const { id: personId, name, roles } = shop.people.owner!
  actor = { shopId: shop.id, personId, name, roles }
})
afterAll(() => db.close())

const stamp = () => ({ auditId: newId(), at: AT })
const assign = (jobId: string, personId: string, assigned: boolean) =>
  changeAssignment(actor, { jobId, personId, assigned, stamp: stamp() }, (job, person) =>
    stateAfterAssigning(job, person, assigned),
  )
const seq = () => asShop(shop.id, lastChange)
const jobNow = (id: string) => asShop(shop.id, (tx) => findJob(tx, id))
const audit = (jobId: string) => asShop(shop.id, (tx) => listAudit(tx, jobId))

async function askedPart() {
  const by = shop.people.mechanic!
  const jobId = await makeJob(shop, by)
  const request = requestOf(jobId)
  await asShop(shop.id, async (tx) => {
    await insertPartRequests(tx, [
      { request, askedBy: by.id, askedOn: by.deviceId, receivedAt: AT },
    ])
    await takeChanges(tx, [{ entity: 'partRequest', id: request.id, jobId }])
  })
  return { jobId, requestId: request.id, lineId: request.lines[0]!.id }
}
const move = (requestId: string, lineId: string, wanted: LineMove) =>
  changePartLine(actor, { requestId, lineId, stamp: stamp() }, (line) => moveLine(line, wanted))
const lineNow = async (requestId: string, lineId: string) => {
  const request = await asShop(shop.id, (tx) => findPartRequest(tx, requestId))
  return request?.lines.find(({ id }) => id === lineId)
}

describe('assigning at the desk', () => {
  it('[R13] writes hands, state, change number and audit entry together; twice is once', async () => {
    const jobId = await makeJob(shop, shop.people.mechanic!)
    const personId = shop.people.mechanic!.id
    const before = await seq()
    expect(await assign(jobId, personId, true)).toEqual({ ok: true, value: null })
    expect(await jobNow(jobId)).toMatchObject({ state: 'assigned', assignedTo: [personId] })
    expect(await seq()).toBeGreaterThan(before)
    const told = await seq()
    expect(await assign(jobId, personId, true)).toEqual({ ok: true, value: null })
    expect(await seq()).toBe(told)
    expect(await assign(jobId, personId, false)).toEqual({ ok: true, value: null })
    expect(await jobNow(jobId)).toMatchObject({ state: 'open', assignedTo: [] })
    expect((await audit(jobId)).map(({ action, detail }) => [action, detail.to])).toEqual([
      ['job.assign', 'assigned'],
      ['job.unassign', 'open'],
    ])
    await expectWholeShop(shop.id)
  })

  it('[R22] finds no job and no person of another shop', async () => {
    const foreignJob = await makeJob(other, other.people.mechanic!)
    const own = await makeJob(shop, shop.people.mechanic!)
    const nowhere = { ok: false, problem: { kind: 'notFound' } }
    expect(await assign(foreignJob, shop.people.mechanic!.id, true)).toEqual(nowhere)
    expect(await assign(own, other.people.mechanic!.id, true)).toEqual(nowhere)
    expect(await assign(newId(), shop.people.mechanic!.id, true)).toEqual(nowhere)
  })

  it('[R13] writes nothing at all when it is refused', async () => {
    const jobId = await makeJob(shop, shop.people.mechanic!)
    const before = await seq()
    expect(await assign(jobId, shop.people.owner!.id, true)).toEqual({
      ok: false,
      problem: { kind: 'cannotTakeJobs' },
    })
    expect(await seq()).toBe(before)
    expect(await audit(jobId)).toEqual([])
  })
})

describe('moving a part line at the desk', () => {
  it('[R14] identified, quoted, cancelled: each with its number, price, change and audit entry', async () => {
    const { jobId, requestId, lineId } = await askedPart()
    const price = { minor: 2_500, currency: 'USD' }
    expect(
      (await move(requestId, lineId, { from: 'asked', to: 'identified', number: 'K-4410' })).ok,
    ).toBe(true)
    expect(
      (await move(requestId, lineId, { from: 'identified', to: 'quoted', number: null, price })).ok,
    ).toBe(true)
    expect(await lineNow(requestId, lineId)).toMatchObject({
      state: 'quoted',
      number: 'K-4410',
      price,
    })
    expect((await move(requestId, lineId, { from: 'quoted', to: 'cancelled' })).ok).toBe(true)
    expect((await audit(jobId)).map(({ action, actorId }) => [action, actorId])).toEqual([
      ['partLine.identified', actor.personId],
      ['partLine.quoted', actor.personId],
      ['partLine.cancelled', actor.personId],
    ])
    await expectWholeShop(shop.id)
  })

  it('[R14] of two desks that press in the same second exactly one succeeds, the other is told', async () => {
    const { requestId, lineId } = await askedPart()
    const answers = await Promise.all([
      move(requestId, lineId, { from: 'asked', to: 'identified', number: 'K-1' }),
      move(requestId, lineId, { from: 'asked', to: 'cancelled' }),
    ])
    const lost = answers.filter((answer) => !answer.ok)
    expect(lost).toHaveLength(1)
    expect(lost[0]).toMatchObject({ problem: { kind: 'movedMeanwhile' } })
  })

  it('[R14] a refusal leaves line, log and trail as they were; a line of another request is not found', async () => {
    const one = await askedPart()
    const two = await askedPart()
    const before = await seq()
    const nowhere = { ok: false, problem: { kind: 'notFound' } }
    expect(await move(one.requestId, two.lineId, { from: 'asked', to: 'cancelled' })).toEqual(
      nowhere,
    )
    expect(await move(newId(), one.lineId, { from: 'asked', to: 'cancelled' })).toEqual(nowhere)
    const refused = await changePartLine(
      actor,
      { requestId: one.requestId, lineId: one.lineId, stamp: stamp() },
      () => fail({ kind: 'illegalMove' as const }),
    )
    expect(refused.ok).toBe(false)
    expect(await seq()).toBe(before)
    expect(await lineNow(one.requestId, one.lineId)).toMatchObject({ state: 'asked' })
  })
})
