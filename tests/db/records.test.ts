import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { insertAdvice, knownAdvice, listAdvice } from '@/db/queries/advice'
import { takeChanges } from '@/db/queries/changes'
import { findJob, jobsClosedOn, listJobs, setJobStand } from '@/db/queries/jobs'
import { appendLogEntries } from '@/db/queries/log-entries'
import {
  findPartRequest,
  insertPartRequests,
  listPartRequests,
  movePartLine,
  setPartLine,
} from '@/db/queries/part-requests'
import { eraseParty, insertParty } from '@/db/queries/parties'
import { findPhoto, insertPhoto } from '@/db/queries/photos'
import { findOps, knownOps, type StoredOp, saveOps } from '@/db/queries/sync-ops'
import { advice as adviceShape } from '@/lib/model/advice'
import { job as jobShape } from '@/lib/model/job'
import { partRequestRow } from '@/lib/model/part-request'
import { openTestDatabase, type TestDatabase } from '../support/database'
import {
  AT,
  entryOf,
  makeJob,
  makeShop,
  newId,
  requestOf,
  STAND,
  type TestPerson,
  type TestShop,
} from '../support/shop-fixture'

let test: TestDatabase
let shop: TestShop
let by: TestPerson
beforeAll(async () => {
  test = await openTestDatabase()
  shop = await makeShop({ mechanic: ['mechanic'] })
  by = shop.people.mechanic!
})
afterAll(() => test.close())

const opOf = (more: Partial<StoredOp> = {}): StoredOp => ({
  opId: newId(),
  deviceId: by.deviceId,
  dseq: 1,
  personId: by.id,
  kind: 'log.add',
  entityId: null,
  jobId: null,
  raw: '{"b":1,"a":"\\u0000 \\"x\\""}',
  outcome: 'accepted',
  code: null,
  field: null,
  detail: null,
  blockedOn: null,
  loser: null,
  receivedAt: AT,
  settledAt: AT,
  ...more,
})

describe('[P6] ops', () => {
  it('[P2] keep their text as it was sent, to the byte', async () => {
    const op = opOf({ raw: ' {"z":1.0,"a":"\\u00e9\\ud83d\\udd27é🔧\\n","a":2}' })
    await asShop(shop.id, (tx) => saveOps(tx, [op]))
    expect((await asShop(shop.id, (tx) => findOps(tx, [op.opId, newId()]))).get(op.opId)).toEqual(
      op,
    )
    expect([...(await asShop(shop.id, (tx) => knownOps(tx, [op.opId, newId()])))]).toEqual([
      op.opId,
    ])
  })

  it('[P6] a final outcome never changes, a blocked op is settled once', async () => {
    const done = opOf({ outcome: 'rejected', code: 'forbidden', field: 'kind' })
    const waits = opOf({ outcome: 'blocked', blockedOn: newId(), settledAt: null })
    const merged = opOf({ outcome: 'merged', loser: { volts: 12.4 } })
    await asShop(shop.id, (tx) => saveOps(tx, [done, waits, merged]))
    await asShop(shop.id, (tx) =>
      saveOps(tx, [
        { ...done, outcome: 'accepted', code: null },
        { ...waits, outcome: 'accepted', blockedOn: null, settledAt: AT },
        { ...merged, loser: null },
      ]),
    )
    const found = await asShop(shop.id, (tx) => findOps(tx, [done.opId, waits.opId, merged.opId]))
    expect(found.get(done.opId)).toEqual(done)
    expect(found.get(waits.opId)).toEqual({
      ...waits,
      outcome: 'accepted',
      blockedOn: null,
      settledAt: AT,
    })
    expect(found.get(merged.opId)).toEqual(merged)
  })
})

describe('[R2] jobs', () => {
  it('[R2] come back in the shape of the model, to the last field', async () => {
    const jobId = await makeJob(shop, by)
    const found = await asShop(shop.id, (tx) => findJob(tx, jobId))
    expect(jobShape.parse(found)).toEqual(found)
    expect(found).toMatchObject({
      id: jobId,
      state: 'open',
      peopleState: 'withMachine',
      machineState: 'stranded',
      wayOut: null,
      openedBy: by.id,
      assignedTo: [],
      before: ['water', 'recentWork'],
      airTempC: -4.5,
      openedAt: AT,
    })
  })

  it('[R13] remember who closed them, until they are open again', async () => {
    const jobId = await makeJob(shop, by)
    const set = (state: 'open' | 'closed', deviceId: string | null) =>
      asShop(shop.id, async (tx) => {
        await setJobStand(tx, {
          id: jobId,
          stand: { ...STAND, state, wayOut: 'repairHere' },
          by: { deviceId, at: AT },
        })
        await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole: true }])
      })
    const closedHere = () =>
      asShop(shop.id, (tx) => jobsClosedOn(tx, { deviceId: by.deviceId, ids: [jobId] }))
    await set('closed', by.deviceId)
    expect([...(await closedHere())]).toEqual([jobId])
    await set('closed', null)
    expect([...(await closedHere())]).toEqual([jobId])
    expect(
      (await asShop(shop.id, (tx) => listJobs(tx, { closed: true }))).map(({ id }) => id),
    ).toEqual([jobId])
    await set('open', by.deviceId)
    expect([...(await closedHere())]).toEqual([])
    await set('closed', null)
    expect([...(await closedHere())]).toEqual([])
  })

  it('[R2] refuse a state that the model does not know', async () => {
    const jobId = await makeJob(shop, by)
    for (const column of ['state', 'people_state', 'machine_state', 'way_out']) {
      const change = asShop(shop.id, (tx) =>
        sql`update job set ${sql.ref(column)} = 'lost' where id = ${jobId}`.execute(tx),
      )
      await expect(change, column).rejects.toMatchObject({ code: '23514' })
    }
  })
})

describe('[R14] part requests', () => {
  it('[R14] keep their lines in order with price and reason, and move by what they stand at', async () => {
    const jobId = await makeJob(shop, by)
    const entry = entryOf(jobId, by)
    const request = {
      ...requestOf(jobId),
      advice: {
        genuineMinor: 13_500,
        aftermarketMinor: 2500,
        recoveryMinor: 30_000,
        genuineFails: 0.02,
        aftermarketFails: 0.12,
        breakEven: 0.3866666666666667,
        advised: 'aftermarket' as const,
      },
    }
    const [line] = request.lines
    request.lines = [
      { ...line!, condemnedBy: entry.id },
      { ...line!, id: newId(), price: null, quantity: 3 },
    ]
    await asShop(shop.id, async (tx) => {
      // The request before its reason: the batch is judged as one.
      await insertPartRequests(tx, [
        { request, askedBy: by.id, askedOn: by.deviceId, receivedAt: AT },
      ])
      await appendLogEntries(tx, { entries: [entry], receivedAt: AT })
      await takeChanges(tx, [
        { entity: 'logEntry', id: entry.id, jobId },
        { entity: 'partRequest', id: request.id, jobId },
      ])
    })
    const found = await asShop(shop.id, (tx) => findPartRequest(tx, request.id))
    expect(partRequestRow.parse(found)).toEqual(found)
    expect(found).toEqual({
      ...request,
      askedBy: by.id,
      lines: request.lines.map((asked) => ({ ...asked, state: 'asked' })),
    })
    const move = (from: 'asked' | 'ordered', to: 'quoted' | 'promised') =>
      asShop(shop.id, async (tx) => {
        const moved = await movePartLine(tx, { lineId: line!.id, from, to })
        await setPartLine(tx, {
          lineId: line!.id,
          number: 'TC-1',
          price: { minor: 14_000, currency: 'USD' },
        })
        await takeChanges(tx, [{ entity: 'partRequest', id: request.id, jobId }])
        return moved
      })
    expect(await move('asked', 'quoted')).toBe(true)
    expect(await move('ordered', 'promised')).toBe(false)
    const [after] = await asShop(shop.id, (tx) => listPartRequests(tx, { jobId }))
    expect(after?.lines[0]).toMatchObject({
      state: 'quoted',
      number: 'TC-1',
      price: { minor: 14_000, currency: 'USD' },
    })
  })

  it('[R14] refuse a reason that never came', async () => {
    const jobId = await makeJob(shop, by)
    const request = requestOf(jobId)
    request.lines[0]!.condemnedBy = newId()
    const asked = asShop(shop.id, async (tx) => {
      await insertPartRequests(tx, [{ request, askedBy: by.id, askedOn: null, receivedAt: AT }])
      await takeChanges(tx, [{ entity: 'partRequest', id: request.id, jobId }])
    })
    await expect(asked).rejects.toMatchObject({ code: '23503' })
  })
})

it('[PH2] a photo is stored once', async () => {
  const jobId = await makeJob(shop, by)
  const photo = {
    hash: 'c'.repeat(64),
    jobId,
    bytes: 12,
    mime: 'image/jpeg' as const,
    receivedAt: AT,
    receivedFrom: by.deviceId,
  }
  const store = () =>
    asShop(shop.id, async (tx) => {
      const isNew = await insertPhoto(tx, photo)
      if (isNew) await takeChanges(tx, [{ entity: 'photo', id: photo.hash, jobId }])
      return isNew
    })
  expect([await store(), await store()]).toEqual([true, false])
  const row = { hash: photo.hash, jobId, bytes: 12, mime: 'image/jpeg', receivedAt: AT }
  expect(await asShop(shop.id, (tx) => findPhoto(tx, photo.hash))).toEqual(row)
})

it('[R23] advice comes back as the engine gave it, order of keys and last digits included', async () => {
  const jobId = await makeJob(shop, by)
  const inputs = { z: [0.1 + 0.2, 1e-7, -0.5], a: { shares: { b: 1 / 3, a: 2 / 3 } } }
  const kept = {
    id: newId(),
    jobId,
    at: AT,
    engineVersion: '1',
    bookVersion: 1,
    inputs,
    shown: { next: 'coilSwap', minor: 1234 },
    acted: 'overridden' as const,
    chose: 'coilPrimaryResistance',
    reason: 'Spare is at hand',
  }
  await asShop(shop.id, (tx) =>
    insertAdvice(tx, [{ advice: kept, personId: by.id, deviceId: by.deviceId, receivedAt: AT }]),
  )
  const [found] = await asShop(shop.id, (tx) => listAdvice(tx, jobId))
  expect(adviceShape.parse(found)).toEqual(kept)
  expect(JSON.stringify(found?.inputs)).toBe(JSON.stringify(inputs))
  expect([...(await asShop(shop.id, (tx) => knownAdvice(tx, [kept.id, newId()])))]).toEqual([
    kept.id,
  ])
})

it('[R23] erasing a party takes name, phone and e-mail and leaves its id', async () => {
  const id = newId()
  await asShop(shop.id, (tx) =>
    insertParty(tx, { id, kind: 'rider', name: 'N', phone: '1', email: 'n@test.invalid' }),
  )
  await asShop(shop.id, (tx) => eraseParty(tx, { id, now: AT }))
  const left = (table: 'party' | 'partyContact', column: 'id' | 'partyId') =>
    test.admin
      .selectFrom(table)
      .selectAll()
      .where(column as never, '=', id as never)
      .execute()
  expect(await left('party', 'id')).toMatchObject([{ id, kind: 'rider', erasedAt: AT }])
  expect(await left('partyContact', 'partyId')).toEqual([])
})
