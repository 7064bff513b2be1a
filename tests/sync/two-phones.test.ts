import { createHash } from 'node:crypto'
import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listLog } from '@/db/queries/log-entries'
import type { LogRow } from '@/lib/model/log-entry'
import { jobOpen, machineAdd, partRequestAsk } from '../support/field-ops'
import { createPhone, type TestPhone } from '../support/phone'
import { note } from '../support/phone-world'
import { jpegOf } from '../support/pictures'
import { RealShop } from '../support/real-shop'
import { openSyncWorld, type SyncWorld, signIn } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

/** The real phone of that person against the real shop, enrolled. */
async function phoneFor(who: string) {
  const { cookie } = await signIn(world.a, who)
  const person = world.a.people[who]
  if (!person) throw new Error(who)
  const shop = new RealShop(cookie)
  const actor = { shopId: world.a.id, personId: person.id, roles: person.roles, name: person.name }
  const phone = await createPhone({ fetch: shop.fetch, ports: { actor } })
  expect(await phone.phone.enrol()).toMatchObject({ ok: true })
  return { phone, shop, person }
}
const unsent = async (of: TestPhone) => (await of.see(of.phone.unsent)).count
const inJob = async (of: TestPhone, jobId: string) => {
  const rows = (await of.rows('logEntry')) as LogRow[]
  return rows.filter((row) => row.jobId === jobId).sort((a, b) => a.order - b.order)
}

describe('the phone’s own program against the shop’s', () => {
  it('[P1] [P3] [P9] hands over a job made without a line, photo last, and finds it whole', async () => {
    const { phone, shop } = await phoneFor('mechanic')
    await phone.sync()
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    const jobId = job.fields.id
    const bytes = new Uint8Array(jpegOf())
    const hash = createHash('sha256').update(bytes).digest('hex')
    const photo = { hash, bytes: bytes.length, mime: 'image/jpeg', width: 1, height: 1 } as const
    const entry = phone.phone.entry(
      jobId,
      { kind: 'photo', photo, caption: null },
      { bookVersion: 1 },
    )
    shop.fault = 'noLine'
    await phone.record([machine, job])
    await phone.record([note(phone, jobId, 'Plug was wet')])
    await phone.record([entry], {
      photos: [{ hash, jobId, bytes: bytes.buffer, mime: 'image/jpeg' }],
    })
    await phone.record([partRequestAsk(jobId)])
    expect(await unsent(phone)).toBe(6)
    shop.fault = 'none'
    shop.asked.length = 0
    await phone.sync()
    expect(await unsent(phone)).toBe(0)
    // One exchange for the records, then the picture; an exchange may follow to fetch its row.
    expect(shop.asked.slice(0, 3)).toEqual([
      'POST /api/sync',
      'POST /api/photos',
      'PATCH /api/photos',
    ])
    expect(existsSync(join(world.filesDir, world.a.id, hash))).toBe(true)
    expect((await inJob(phone, jobId)).map((row) => [row.order, row.body.kind])).toEqual([
      [1, 'note'],
      [2, 'photo'],
    ])
    expect(await phone.rows('job')).toContainEqual(
      expect.objectContaining({ id: jobId, number: expect.stringMatching(/^J-/), state: 'open' }),
    )
    shop.asked.length = 0
    await phone.sync()
    expect(shop.asked).toEqual(['POST /api/sync'])
  })

  it('[P4] [P6] stores everything once when three answers in a row are lost', async () => {
    const { phone, shop } = await phoneFor('mechanic')
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    shop.fault = 'loseReply'
    await phone.record([
      machine,
      job,
      note(phone, job.fields.id, 'One'),
      note(phone, job.fields.id, 'Two'),
    ])
    for (let i = 0; i < 3; i++) await phone.sync()
    expect(await unsent(phone)).toBe(4)
    shop.fault = 'none'
    await phone.sync()
    expect(await unsent(phone)).toBe(0)
    const log = await asShop(world.a.id, (tx) => listLog(tx, job.fields.id))
    expect(log.map((row) => row.body)).toEqual([
      { kind: 'note', words: 'One' },
      { kind: 'note', words: 'Two' },
    ])
  })

  it('[P9] two phones that wrote offline into one job converge to the same log', async () => {
    const left = await phoneFor('mechanic')
    const right = await phoneFor('second')
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    const jobId = job.fields.id
    await left.phone.record([machine, job])
    await left.phone.sync()
    await right.phone.sync()
    expect(await right.phone.rows('job')).toContainEqual(expect.objectContaining({ id: jobId }))
    for (const { phone, shop } of [left, right]) {
      shop.fault = 'noLine'
      for (let i = 0; i < 4; i++)
        await phone.record([note(phone, jobId, `${phone.phone.actor.name} ${i}`)])
      shop.fault = 'none'
    }
    await Promise.all([left.phone.sync(), right.phone.sync()])
    await Promise.all([left.phone.sync(), right.phone.sync()])
    const [one, two] = [await inJob(left.phone, jobId), await inJob(right.phone, jobId)]
    expect(one).toHaveLength(8)
    expect(one).toEqual(two)
    expect(one.map((row) => row.order)).toEqual([1, 2, 3, 4, 5, 6, 7, 8])
  })

  it('[fault 16] [R13] the second of two that move a job on sees where it stands, and its entries stay', async () => {
    const left = await phoneFor('mechanic')
    const right = await phoneFor('second')
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    const jobId = job.fields.id
    await left.phone.record([machine, job])
    await left.phone.sync()
    await right.phone.sync()
    const move = {
      kind: 'job.move',
      jobId,
      fields: { from: 'open', to: 'underWay', reason: null },
    } as const
    for (const { phone, shop } of [left, right]) {
      shop.fault = 'noLine'
      await phone.record([move, note(phone, jobId, `mine ${phone.phone.actor.name}`)])
      shop.fault = 'none'
    }
    await left.phone.sync()
    await right.phone.sync()
    const view = await right.phone.see(right.phone.phone.unsent)
    expect(view).toMatchObject({
      count: 1,
      stuckCount: 1,
      items: [{ kind: 'job.move', state: 'stuck' }],
    })
    expect(await right.phone.rows('job')).toContainEqual(
      expect.objectContaining({ id: jobId, state: 'underWay' }),
    )
    expect(await asShop(world.a.id, (tx) => listLog(tx, jobId))).toHaveLength(2)
  })

  it('[P18] sends on without a session, and fetches again after signing in', async () => {
    const { phone, shop, person } = await phoneFor('mechanic')
    await phone.sync()
    const machine = machineAdd()
    shop.cookie = null
    await phone.record([machine])
    await phone.sync()
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, needs: 'signIn' })
    shop.cookie = (await signIn(world.a, 'mechanic')).cookie
    await phone.sync()
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ needs: null })
    expect(await phone.rows('machine')).toContainEqual(
      expect.objectContaining({ id: machine.fields.id }),
    )
    expect(person.roles).toEqual(['mechanic'])
  })

  it('[R23] leaves the shop’s chains whole', async () => {
    expect(await expectWholeShop(world.a.id)).toBeGreaterThan(3)
  })
})
