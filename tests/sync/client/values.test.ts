// The phone's half of single values, part lines and merged jobs (M1 to M11), against the real shop.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Job } from '@/lib/model/job'
import type { MachineRow } from '@/lib/model/machine'
import type { PartRequestRow } from '@/lib/model/part-request'
import { readMeta } from '@/lib/sync/client/phone-db'
import type { OpInput } from '@/lib/sync/protocol/op'
import { jobOpen, machineAdd, partRequestAsk } from '../../support/field-ops'
import { lineOf, placeAt } from '../../support/field-sets'
import { openMergeDesk } from '../../support/merge-desk'
import { recordPastGate } from '../../support/past-gate'
import { createPhone, type TestPhone } from '../../support/phone'
import { atWork, note } from '../../support/phone-world'
import { RealShop } from '../../support/real-shop'
import { ShopDouble } from '../../support/shop-double'
import { openSyncWorld, type SyncWorld, signIn } from '../../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

async function phoneFor(who: string) {
  const { cookie } = await signIn(world.a, who)
  const person = world.a.people[who]
  if (!person) throw new Error(who)
  const shop = new RealShop(cookie)
  const actor = { shopId: world.a.id, personId: person.id, roles: person.roles, name: person.name }
  const clock = { aheadMs: 0, now: () => Date.now() + clock.aheadMs }
  const phone = await createPhone({ fetch: shop.fetch, ports: { actor, clock } })
  await phone.phone.enrol()
  return { phone, shop, clock }
}
const jobOn = async (of: TestPhone, id: string) =>
  ((await of.rows('job')) as Job[]).find((row) => row.id === id)
const requestOn = async (of: TestPhone, id: string) =>
  ((await of.rows('partRequest')) as PartRequestRow[]).find((row) => row.id === id)
const place = (jobId: string, latitude: number): OpInput => ({
  kind: 'job.set',
  jobId,
  fields: { field: 'place', value: placeAt(latitude) },
})
/** How many rows the next exchange moves. */
async function moved(of: TestPhone): Promise<number> {
  const seq = async () => (await readMeta(of.phone.core.db, 'cursor'))?.seq ?? 0
  const before = await seq()
  await of.sync()
  return (await seq()) - before
}

/** A job that two phones hold, both without a line. */
async function apart() {
  const one = await phoneFor('mechanic')
  const two = await phoneFor('second')
  const job = jobOpen(world.a.machineId, { place: placeAt(47) })
  const request = partRequestAsk(job.fields.id, { lines: [lineOf({ quantity: 2 })] })
  await one.phone.record([job, request])
  await one.phone.sync()
  await two.phone.sync()
  one.shop.fault = 'noLine'
  two.shop.fault = 'noLine'
  const lineId = request.fields.lines[0]?.id ?? ''
  return { one, two, jobId: job.fields.id, requestId: request.fields.id, lineId }
}

describe('single values on the phone', () => {
  it('[M1] [P9] shows its own value at once, does not flicker, and a second sync moves nothing', async () => {
    const { one, jobId } = await apart()
    await one.phone.record([place(jobId, 47.1)])
    expect((await jobOn(one.phone, jobId))?.place?.latitude).toBe(47.1)
    one.shop.fault = 'none'
    await one.phone.sync()
    expect((await jobOn(one.phone, jobId))?.place?.latitude).toBe(47.1)
    expect(await moved(one.phone)).toBe(0)
  })

  it('[M2] [M4] both phones end with the later place and show the other, until one is used', async () => {
    const { one, two, jobId } = await apart()
    await one.phone.record([place(jobId, 47.1)])
    // Later by more than two measured clocks can differ.
    two.clock.aheadMs = 2_000
    await two.phone.record([place(jobId, 47.2)])
    two.clock.aheadMs = 0
    // The later one arrives first.
    two.shop.fault = 'none'
    await two.phone.sync()
    one.shop.fault = 'none'
    await one.phone.sync()
    await two.phone.sync()
    for (const { phone } of [one, two]) {
      const job = await jobOn(phone, jobId)
      expect(job?.place?.latitude).toBe(47.2)
      expect(job?.alsoEntered).toMatchObject([{ field: 'place', value: { latitude: 47.1 } }])
    }
    const history = [(await jobOn(one.phone, jobId))?.alsoEntered?.[0]?.id ?? '']
    await one.phone.record([place(jobId, 47.1), { kind: 'job.settle', jobId, fields: { history } }])
    expect(await jobOn(one.phone, jobId)).not.toHaveProperty('alsoEntered')
    await one.phone.sync()
    expect((await one.phone.see(one.phone.phone.unsent)).items).toEqual([])
    await two.phone.sync()
    for (const { phone } of [one, two]) {
      const job = await jobOn(phone, jobId)
      expect(job?.place?.latitude).toBe(47.1)
      expect(job).not.toHaveProperty('alsoEntered')
    }
  })

  it('[P9] a value the shop refuses is kept as stuck and lies on the row no more', async () => {
    const { phone, shop } = await phoneFor('guide')
    await phone.sync()
    const machineId = world.a.machineId
    const year = async () =>
      ((await phone.rows('machine')) as MachineRow[]).find((row) => row.id === machineId)?.year
    shop.fault = 'noLine'
    const later: OpInput = {
      kind: 'machine.set',
      machineId,
      fields: { field: 'year', value: 2019 },
    }
    await recordPastGate(phone.phone, [later])
    expect(await year()).toBe(2019)
    shop.fault = 'none'
    await phone.sync()
    expect(await year()).toBeNull()
    const view = await phone.see(phone.phone.unsent)
    expect(view.items).toMatchObject([{ state: 'stuck', what: 'Year of the machine' }])
  })
})

describe('part lines on the phone', () => {
  it('[M6] [P9] counts once: what it added is not added again to the row that has it', async () => {
    const { one, two, jobId, requestId, lineId } = await apart()
    const count = (by: number): OpInput => ({
      kind: 'partLine.quantity',
      jobId,
      fields: { requestId, lineId, by },
    })
    const quantity = async (of: TestPhone) => (await requestOn(of, requestId))?.lines[0]?.quantity
    await one.phone.record([count(2)])
    await two.phone.record([count(1)])
    expect(await quantity(one.phone)).toBe(4)
    expect(await quantity(two.phone)).toBe(3)
    const shown: unknown[] = []
    one.shop.fault = 'none'
    await one.phone.sync()
    shown.push(await quantity(one.phone))
    two.shop.fault = 'none'
    await two.phone.sync()
    await one.phone.sync()
    shown.push(await quantity(one.phone), await quantity(two.phone))
    expect(shown).toEqual([4, 5, 5])
    expect(await moved(one.phone)).toBe(0)
  })

  it('[P9] nor in the middle of a pull that goes on: the row that came has it already', async () => {
    const shop = new ShopDouble()
    const { phone, machine, job, jobId } = await atWork(shop)
    const line = lineOf({ quantity: 2 })
    const request = partRequestAsk(jobId, { lines: [line] })
    const requestId = request.fields.id
    await phone.record([machine, job])
    await phone.sync()
    const rowWith = (quantity: number) => ({
      ...request.fields,
      askedBy: phone.phone.actor.personId,
      lines: [{ ...line, quantity, state: 'asked' }],
    })
    shop.put('partRequest', requestId, rowWith(2), jobId)
    await phone.sync()
    let exchanges = 0
    shop.fault = ({ path }) => {
      if (path !== '/api/sync') return null
      exchanges += 1
      // The shop took the op and counts it; the first page has the row, and the line breaks after it.
      if (exchanges === 1) {
        shop.put('partRequest', requestId, rowWith(5), jobId)
        shop.put('machine', machine.fields.id, machine.fields)
      }
      return exchanges > 1 ? { noLine: true } : null
    }
    shop.pageRows = 1
    await phone.record([
      { kind: 'partLine.quantity', jobId, fields: { requestId, lineId: line.id, by: 3 } },
    ])
    expect(exchanges).toBeGreaterThan(1)
    expect((await requestOn(phone, requestId))?.lines[0]?.quantity).toBe(5)
    shop.fault = () => null
    await phone.sync()
    expect((await requestOn(phone, requestId))?.lines[0]?.quantity).toBe(5)
  })

  it('[M7] [fault 16] a cancel that came too late is told with the present state; the line stands', async () => {
    const { one, jobId, requestId, lineId } = await apart()
    await one.phone.record([{ kind: 'partLine.cancel', jobId, fields: { requestId, lineId } }])
    expect((await requestOn(one.phone, requestId))?.lines[0]?.state).toBe('cancelled')
    const { sql } = await import('kysely')
    const { asShop } = await import('@/db/client')
    const { takeChanges } = await import('@/db/queries/changes')
    await asShop(world.a.id, async (tx) => {
      await sql`update part_line set state = 'ordered' where id = ${lineId}`.execute(tx)
      await takeChanges(tx, [{ entity: 'partRequest', id: requestId, jobId }])
    })
    one.shop.fault = 'none'
    await one.phone.sync()
    expect((await requestOn(one.phone, requestId))?.lines[0]?.state).toBe('ordered')
    const view = await one.phone.see(one.phone.phone.unsent)
    expect(view.items[0]).toMatchObject({ state: 'stuck' })
    expect(view.items[0]?.reason).toContain('ordered')
  })

  it('[M8] a request taken back is off the screen at once and gone once the shop says so', async () => {
    const { one, jobId, requestId } = await apart()
    await one.phone.record([{ kind: 'partRequest.drop', jobId, requestId, fields: {} }])
    expect((await requestOn(one.phone, requestId))?.takenBack).toBe(true)
    one.shop.fault = 'none'
    await one.phone.sync()
    expect(await requestOn(one.phone, requestId)).toBeUndefined()
    expect(await moved(one.phone)).toBe(0)
  })

  it('[M8] a stranger’s machine taken down by mistake goes likewise', async () => {
    const { phone, shop } = await phoneFor('mechanic')
    const machine = machineAdd()
    const machineId = machine.fields.id
    await phone.record([machine])
    await phone.sync()
    shop.fault = 'noLine'
    await phone.record([{ kind: 'machine.drop', machineId, fields: {} }])
    shop.fault = 'none'
    await phone.sync()
    const left = (await phone.rows('machine')) as MachineRow[]
    expect(left.map((row) => row.id)).not.toContain(machineId)
  })
})

describe('merged jobs on the phone', () => {
  it('[M9] [M10] shows the entries of both in the one that goes on, its own unsent ones too', async () => {
    const desk = await openMergeDesk(world)
    const { one, two, jobId } = await apart()
    const other = jobOpen(world.a.machineId)
    const intoId = other.fields.id
    two.shop.fault = 'none'
    one.shop.fault = 'none'
    await two.phone.record([other, note(two.phone, intoId, 'call taken')])
    await two.phone.sync()
    await one.phone.record([note(one.phone, jobId, 'bogged')])
    await one.phone.sync()
    one.shop.fault = 'noLine'
    await one.phone.record([note(one.phone, jobId, 'still unsent')])
    expect((await desk.merge(jobId, intoId)).status).toBe(200)
    await two.phone.sync()
    const words = async (of: TestPhone, id: string) =>
      (await of.see(of.phone.log(id))).map(({ entry }) =>
        entry.body.kind === 'note' ? entry.body.words : entry.body.kind,
      )
    expect((await words(two.phone, intoId)).sort()).toEqual(['bogged', 'call taken'])
    // The phone in the field hears of the merge while its own entry is refused a line: pull alone.
    one.shop.fault = 'none'
    await one.phone.sync()
    expect((await jobOn(one.phone, jobId))?.mergedInto).toBe(intoId)
    const both = await words(one.phone, intoId)
    expect(both).toHaveLength(3)
    expect(both.at(-1)).toBe('still unsent')
    await two.phone.sync()
    expect(await words(two.phone, intoId)).toHaveLength(3)
    one.shop.fault = 'noLine'
    await one.phone.record([note(one.phone, jobId, 'under the old id')])
    expect((await words(one.phone, intoId)).at(-1)).toBe('under the old id')
    one.shop.fault = 'none'
    await desk.unmerge(jobId)
    await one.phone.sync()
    expect(await words(one.phone, jobId)).toEqual(['bogged', 'still unsent', 'under the old id'])
    expect(await words(one.phone, intoId)).toEqual(['call taken'])
  })
})
