import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { assignJob, findJob } from '@/db/queries/jobs'
import { saveBag, saveMeter } from '@/db/queries/machines'
import { setRoles } from '@/db/queries/people'
import type { PullRow } from '@/lib/sync/protocol/message'
import { jobOpen, logAdd, note, partRequestAsk } from '../support/field-ops'
import type { TestShop } from '../support/shop-fixture'
import {
  openSyncWorld,
  phoneOf,
  pullAll,
  ROLE_PEOPLE,
  type SyncWorld,
  sync,
} from '../support/sync-world'

/** What each role's phone may hold (product.md, "People and roles"; sync.md P11), written out by hand. */
const MAY_HOLD: Record<string, string[]> = {
  mechanic: [
    'shop',
    'person',
    'machineModel',
    'machine',
    'book',
    'meterProfile',
    'bag',
    'job',
    'logEntry',
    'partRequest',
    'photo',
  ],
  guide: [
    'shop',
    'person',
    'machineModel',
    'machine',
    'book',
    'meterProfile',
    'bag',
    'job',
    'logEntry',
    'partRequest',
    'photo',
  ],
  dispatcher: [
    'shop',
    'person',
    'machineModel',
    'machine',
    'book',
    'meterProfile',
    'bag',
    'job',
    'logEntry',
    'partRequest',
    'photo',
  ],
  owner: [
    'shop',
    'person',
    'machineModel',
    'machine',
    'book',
    'meterProfile',
    'bag',
    'job',
    'logEntry',
    'partRequest',
    'photo',
  ],
}

let world: SyncWorld
/** Every id that each shop's rows carry, and which jobs are in whose hands. */
type Content = { ids: Set<string>; theirs: string; open: string; bagOfSecond: string }
const content = new Map<string, Content>()

/** A job in the second mechanic's hands, an open one, with entries, a request, a meter and two bags. */
async function fill(shop: TestShop): Promise<Content> {
  const { device } = await phoneOf(shop, 'second')
  const theirs = jobOpen(shop.machineId)
  const open = jobOpen(shop.machineId)
  const entries = [theirs, open].map((job) =>
    logAdd(device, job.fields.id, note('private to the shop')),
  )
  const request = partRequestAsk(theirs.fields.id)
  await sync(device, [
    device.op(theirs),
    device.op(open),
    ...entries.map((entry) => device.op(entry)),
    device.op(request),
  ])
  const secondId = shop.people.second?.id ?? ''
  const meter = {
    id: v7(),
    name: 'Pocket meter',
    functions: {},
    leadsOhm: { low: 0.3, high: 0.6 },
    perKelvin: 0.1,
    source: 'test',
  }
  const bags = ['second', 'mechanic'].map((who) => ({
    id: v7(),
    personId: shop.people[who]?.id ?? '',
    parts: [],
    tools: [],
    meterIds: [meter.id],
  }))
  await asShop(shop.id, async (tx) => {
    await saveMeter(tx, meter)
    for (const bag of bags) await saveBag(tx, bag)
    await assignJob(tx, { jobId: theirs.fields.id, personId: secondId })
    await takeChanges(tx, [
      { entity: 'meterProfile', id: meter.id, jobId: null },
      ...bags.map((bag) => ({ entity: 'bag' as const, id: bag.id, jobId: null })),
      { entity: 'job', id: theirs.fields.id, jobId: theirs.fields.id, whole: true },
    ])
  })
  // The open job is nobody's: opened by somebody who is neither of the readers below.
  const all = [
    theirs.fields.id,
    open.fields.id,
    ...entries.map((entry) => entry.fields.id),
    request.fields.id,
    meter.id,
  ]
  const people = Object.values(shop.people).map((person) => person.id)
  const ids = new Set([...all, ...bags.map((bag) => bag.id), shop.id, shop.machineId, ...people])
  return { ids, theirs: theirs.fields.id, open: open.fields.id, bagOfSecond: bags[0]?.id ?? '' }
}

beforeAll(async () => {
  world = await openSyncWorld()
  for (const shop of [world.a, world.b]) content.set(shop.id, await fill(shop))
})
afterAll(() => world.close())

describe('what a person’s phone gets', () => {
  for (const [key, who] of [
    ['a', 'mechanic'],
    ['a', 'guide'],
    ['a', 'dispatcher'],
    ['a', 'owner'],
    ['a', 'second'],
    ['a', 'both'],
    ['b', 'mechanic'],
    ['b', 'guide'],
    ['b', 'dispatcher'],
    ['b', 'owner'],
    ['b', 'second'],
  ] as const) {
    it(`[P11] shop ${key}, ${who}: own shop’s rows alone, and only what the role may hold`, async () => {
      const shop = world[key]
      const own = content.get(shop.id)
      const { device, cookie } = await phoneOf(shop, who)
      const rows = await pullAll(device, cookie)
      expect(rows.length).toBeGreaterThan(5)
      expect(rows.filter((row) => !own?.ids.has(row.id))).toEqual([])
      const role = ROLE_PEOPLE[who]?.[0] ?? ''
      expect(rows.filter((row) => !MAY_HOLD[role]?.includes(row.entity))).toEqual([])
      // The parts role holds every request, and nothing else of the job.
      const kept = rows.filter((row) => who !== 'both' || row.entity !== 'partRequest')
      const jobs = new Set(kept.flatMap((row) => row.jobId ?? []))
      const seesAll = who === 'owner' || who === 'dispatcher'
      expect(jobs.has(own?.theirs ?? '')).toBe(seesAll || who === 'second')
      const bags = rows.filter((row) => row.entity === 'bag').map((row) => row.id)
      expect(bags.includes(own?.bagOfSecond ?? '')).toBe(seesAll || who === 'second')
      // What is not theirs is not even told to be gone.
      expect(rows.filter((row) => row.state !== 'present')).toEqual([])
    })
  }

  it('[P11] never tells a name, phone or e-mail beyond the name', async () => {
    const { device, cookie } = await phoneOf(world.a, 'mechanic')
    const text = JSON.stringify(await pullAll(device, cookie))
    for (const person of Object.values(world.a.people)) expect(text).not.toContain(person.email)
    expect(text).not.toContain('000 0001')
    expect(text).not.toContain('password')
  })
})

describe('guessed ids', () => {
  it('[P11] answers another shop’s job, entry and request like ids that were never made', async () => {
    const { device } = await phoneOf(world.a, 'owner')
    const foreign = content.get(world.b.id)?.theirs ?? ''
    for (const job of [foreign, v7()]) {
      const ops = [
        device.op(logAdd(device, job, note('guess'))),
        device.op(partRequestAsk(job)),
        device.op({
          kind: 'job.move',
          entityId: job,
          jobId: job,
          fields: { from: 'open', to: 'closed', reason: null },
        }),
      ]
      const { results, taken } = await sync(device, ops)
      expect(results).toEqual(ops.map((op) => ({ opId: op.id, result: 'blocked', on: job })))
      expect(taken).toEqual([])
    }
    expect(await asShop(world.b.id, (tx) => findJob(tx, foreign))).toMatchObject({ state: 'open' })
  })

  it('[P11] lets one shop use an id that another shop uses, without either noticing', async () => {
    const { device, cookie } = await phoneOf(world.a, 'owner')
    const foreign = content.get(world.b.id)?.theirs ?? ''
    const opening = jobOpen(world.a.machineId, { id: foreign })
    const { results } = await sync(device, [device.op(opening)])
    expect(results).toEqual([])
    const inB = await asShop(world.b.id, (tx) => findJob(tx, foreign))
    const rows = await pullAll(device, cookie)
    expect(inB?.machineId).toBe(world.b.machineId)
    expect(rows.find((row) => row.id === foreign)?.row).toMatchObject({
      machineId: world.a.machineId,
    })
  })
})

describe('scope that changes', () => {
  const told = (rows: PullRow[], job: string) =>
    rows.filter((row) => row.jobId === job).map((row) => [row.entity, row.state])

  it('[P11] takes a job off the phone when it passes into other hands, and brings it with all its rows', async () => {
    const first = await phoneOf(world.a, 'mechanic')
    const second = await phoneOf(world.a, 'second')
    const owner = (await phoneOf(world.a, 'owner')).device
    const opening = jobOpen(world.a.machineId)
    const job = opening.fields.id
    await sync(owner, [owner.op(opening), owner.op(logAdd(owner, job, note('one')))])
    for (const { device, cookie } of [first, second]) {
      expect(told(await pullAll(device, cookie), job)).toEqual([
        ['job', 'present'],
        ['logEntry', 'present'],
      ])
    }
    await asShop(world.a.id, async (tx) => {
      await assignJob(tx, { jobId: job, personId: world.a.people.second?.id ?? '' })
      await takeChanges(tx, [{ entity: 'job', id: job, jobId: job, whole: true }])
    })
    expect(told(await pullAll(first.device, first.cookie), job)).toEqual([
      ['job', 'evict'],
      ['logEntry', 'evict'],
    ])
    expect(told(await pullAll(second.device, second.cookie), job)).toEqual([
      ['job', 'present'],
      ['logEntry', 'present'],
    ])
    const late = first.device.op(logAdd(first.device, job, note('written before I knew')))
    expect((await sync(first.device, [late])).taken).toEqual([late.id])
  })

  it('[fault 13] [P11] starts a phone over when the roles change, and refuses by the new ones at once', async () => {
    const { device, cookie } = await phoneOf(world.a, 'dispatcher')
    await pullAll(device, cookie)
    const before = device.cursor
    const personId = world.a.people.dispatcher?.id ?? ''
    await asShop(world.a.id, async (tx) => {
      await setRoles(tx, { personId, roles: ['guide'] })
      await takeChanges(tx, [{ entity: 'person', id: personId, jobId: null }])
    })
    const job = content.get(world.a.id)?.theirs ?? ''
    const close = device.op({
      kind: 'job.move',
      entityId: job,
      jobId: job,
      fields: { from: 'open', to: 'closed', reason: null },
    })
    const answer = await sync(device, [close], { cookie })
    expect(answer.results).toMatchObject([{ result: 'rejected', code: 'forbidden' }])
    expect(answer.pull).toMatchObject({
      kind: 'reset',
      cursor: { scopeVersion: (before?.scopeVersion ?? 0) + 1, seq: 0 },
    })
    const jobs = new Set((await pullAll(device, cookie)).flatMap((row) => row.jobId ?? []))
    expect(jobs.has(job)).toBe(false)
  })
})
