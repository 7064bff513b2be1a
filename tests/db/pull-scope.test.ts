import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { pullPage } from '@/db/queries/change-log'
import { type Change, takeChanges } from '@/db/queries/changes'
import { assignJob, leaveField, setJobStand, unassignJob } from '@/db/queries/jobs'
import { saveBag, saveMeter } from '@/db/queries/machines'
import type { Id } from '@/lib/model/id'
import { seesJob } from '@/lib/shop/scope'
import { openTestDatabase, type TestDatabase } from '../support/database'
import {
  alter,
  close,
  entitiesOf,
  has,
  heldOf,
  makeFullJob,
  makeFullShop,
  pullAll,
  reopen,
} from '../support/pulling-phone'
import {
  AT,
  makeEntries,
  makeJob,
  makeShop,
  newId,
  STAND,
  type TestPerson,
  type TestShop,
} from '../support/shop-fixture'

const ROLES = ['mechanic', 'guide', 'dispatcher', 'parts', 'owner'] as const

let test: TestDatabase
beforeAll(async () => {
  test = await openTestDatabase()
})
afterAll(() => test.close())

describe('[P11] two shops by five roles', () => {
  let shops: TestShop[]
  beforeAll(async () => {
    shops = [await makeFullShop(), await makeFullShop()]
    for (const shop of shops) {
      await makeFullJob(shop, shop.people.mechanic!)
      await asShop(shop.id, async (tx) => {
        const meter = {
          id: newId(),
          name: 'M',
          functions: {},
          leadsOhm: { low: 0, high: 0 },
          perKelvin: 0,
          source: 'test',
        }
        const bags = ['mechanic', 'guide'].map((key) => ({
          id: newId(),
          personId: shop.people[key]!.id,
          parts: [],
          tools: ['lamp'],
          meterIds: [meter.id],
        }))
        await saveMeter(tx, meter)
        for (const bag of bags) await saveBag(tx, bag)
        await takeChanges(tx, [
          { entity: 'meterProfile', id: meter.id, jobId: null },
          ...bags.map(({ id }): Change => ({ entity: 'bag', id, jobId: null })),
        ])
      })
    }
  })

  const FIELD = [
    'bag',
    'job',
    'logEntry',
    'machine',
    'meterProfile',
    'partRequest',
    'person',
    'photo',
    'shop',
  ]
  const expected: Record<(typeof ROLES)[number], string[]> = {
    mechanic: FIELD,
    guide: FIELD,
    dispatcher: FIELD,
    owner: FIELD,
    parts: ['machine', 'partRequest', 'person', 'shop'],
  }

  it.each(ROLES)(
    '[P11] %s holds what the role holds, and no row of the other shop',
    async (role) => {
      for (const shop of shops) {
        const held = await pullAll(shop, { by: shop.people[role]! })
        expect(entitiesOf(held)).toEqual(expected[role])
        const bags = [...held.rows].filter(([key]) => key.startsWith('bag '))
        expect(bags.length).toBe(
          role === 'mechanic' || role === 'guide' ? 1 : role === 'parts' ? 0 : 2,
        )
        const own = await sql<{
          id: string
        }>`select entity || ' ' || entity_id as id from change_log
        where shop_id = ${shop.id}`.execute(test.admin)
        const ids = new Set(own.rows.map((row) => row.id))
        expect([...held.rows.keys()].filter((key) => !ids.has(key))).toEqual([])
        expect(JSON.stringify([...held.rows])).not.toContain(
          shops.find(({ id }) => id !== shop.id)!.id,
        )
      }
    },
  )

  it('[P11] a person of the other shop is told to sign in', async () => {
    const stranger = shops[1]!.people.owner!
    const page = await asShop(shops[0]!.id, (tx) =>
      pullPage(tx, { actor: { personId: stranger.id }, cursor: null, limit: 500 }),
    )
    expect(page).toEqual({ kind: 'signIn' })
  })

  it('[R22] names travel, phones and e-mail addresses do not', async () => {
    const shop = shops[0]!
    const { told } = await pullAll(shop, { by: shop.people.mechanic! })
    const text = JSON.stringify(told)
    expect(text).toContain('Test dispatcher')
    expect(text).not.toContain('@test.invalid')
    expect(text).not.toContain('000 0001')
  })

  it('[P11] a set of roles holds the union', async () => {
    const shop = await makeShop({ both: ['parts', 'guide'], mechanic: ['mechanic'] })
    const job = await makeFullJob(shop, shop.people.mechanic!)
    await close(shop, job.jobId)
    const held = await pullAll(shop, { by: shop.people.both! })
    expect(held.rows.size).toBe(1 + 2 + 1 + 1)
    expect(has(held, 'job', job.jobId)).toBe(false)
    expect(
      has(
        held,
        ...(job.rows.find(([entity]) => entity === 'partRequest') as ['partRequest', string]),
      ),
    ).toBe(true)
  })
})

describe('[P11] rows that leave the scope', () => {
  it('[P11] closing evicts the whole job from others, and its own people keep it', async () => {
    const shop = await makeFullShop()
    const { mechanic, second, dispatcher, parts } = shop.people as Record<string, TestPerson>
    const job = await makeFullJob(shop, mechanic!)
    const before = await pullAll(shop, { by: second! })
    expect(heldOf(before, job)).toBe(job.rows.length)
    const partsBefore = await pullAll(shop, { by: parts! })
    await close(shop, job.jobId)
    const after = await pullAll(shop, { by: second!, held: before })
    expect(heldOf(after, job)).toBe(0)
    expect(after.told.map((row) => [row.state, row.row])).toEqual(
      job.rows.map(() => ['evict', null]),
    )
    expect(heldOf(await pullAll(shop, { by: mechanic! }), job)).toBe(job.rows.length)
    expect(heldOf(await pullAll(shop, { by: dispatcher! }), job)).toBe(job.rows.length)
    expect(heldOf(await pullAll(shop, { by: parts!, held: partsBefore }), job)).toBe(1)
  })

  it('[P11] reopening brings the whole job back, old entries too', async () => {
    const shop = await makeFullShop()
    const { mechanic, second } = shop.people as Record<string, TestPerson>
    const job = await makeFullJob(shop, mechanic!)
    await close(shop, job.jobId)
    const without = await pullAll(shop, { by: second! })
    expect(heldOf(without, job)).toBe(0)
    await reopen(shop, job.jobId)
    const back = await pullAll(shop, { by: second!, held: without })
    expect(heldOf(back, job)).toBe(job.rows.length)
  })

  it("[P11] a job put into somebody's hands leaves the other phones, and comes with all of it", async () => {
    const shop = await makeFullShop()
    const { mechanic, second, guide } = shop.people as Record<string, TestPerson>
    const job = await makeFullJob(shop, mechanic!)
    const guides = await pullAll(shop, { by: guide! })
    await alter(shop, job.jobId, (tx) => assignJob(tx, { jobId: job.jobId, personId: second!.id }))
    const evicted = await pullAll(shop, { by: guide!, held: guides })
    expect(heldOf(evicted, job)).toBe(0)
    expect(heldOf(await pullAll(shop, { by: second! }), job)).toBe(job.rows.length)
    await close(shop, job.jobId)
    const own = await pullAll(shop, { by: second! })
    expect(heldOf(own, job)).toBe(job.rows.length)
    await alter(shop, job.jobId, (tx) =>
      unassignJob(tx, { jobId: job.jobId, personId: second!.id }),
    )
    expect(heldOf(await pullAll(shop, { by: second!, held: own }), job)).toBe(0)
  })

  it('[R22] a job closed more than 60 days ago leaves every phone and stays on the desk', async () => {
    const shop = await makeFullShop()
    const { mechanic, owner } = shop.people as Record<string, TestPerson>
    const [old, young] = [await makeFullJob(shop, mechanic!), await makeFullJob(shop, mechanic!)]
    await close(shop, old.jobId)
    await alter(shop, young.jobId, (tx) =>
      setJobStand(tx, {
        id: young.jobId,
        stand: { ...STAND, state: 'closed' },
        by: { deviceId: null, at: '2027-01-20T00:00:00.000Z' },
      }),
    )
    const held = await pullAll(shop, { by: mechanic! })
    const left = await asShop(shop.id, async (tx) => {
      const ids = await leaveField(tx, {
        closedBefore: '2027-01-01T00:00:00.000Z',
        now: '2027-03-02T00:00:00.000Z',
      })
      await takeChanges(
        tx,
        ids.map((id): Change => ({ entity: 'job', id, jobId: id, whole: true })),
      )
      return ids
    })
    expect(left).toEqual([old.jobId])
    const after = await pullAll(shop, { by: mechanic!, held })
    expect(heldOf(after, old)).toBe(0)
    expect(heldOf(after, young)).toBe(young.rows.length)
    expect(heldOf(await pullAll(shop, { by: owner! }), old)).toBe(old.rows.length)
  })

  it('[P11] a phone is told to drop what it made in a job that passed into other hands meanwhile', async () => {
    const shop = await makeFullShop()
    const { mechanic, second, owner } = shop.people as Record<string, TestPerson>
    const jobId = await makeJob(shop, owner!)
    await alter(shop, jobId, (tx) => assignJob(tx, { jobId, personId: second!.id }))
    const { cursor } = await pullAll(shop, { by: mechanic! })
    const [entryId] = await makeEntries(shop, { jobId, by: mechanic!, count: 1 })
    const told = async (deviceId?: Id) => {
      const asked = { actor: { personId: mechanic!.id }, cursor, limit: 500 }
      const page = await asShop(shop.id, (tx) =>
        pullPage(tx, deviceId === undefined ? asked : { ...asked, deviceId }),
      )
      return page.kind === 'page' ? page.rows.map(({ id, state }) => [id, state]) : page.kind
    }
    expect(await told(mechanic!.deviceId)).toEqual([[entryId, 'evict']])
    expect(await told(second!.deviceId)).toEqual([])
    expect(await told()).toEqual([])
  })

  it('[P11] tells nobody of rows that they could not hold', async () => {
    const shop = await makeFullShop()
    const { mechanic, second } = shop.people as Record<string, TestPerson>
    const job = await makeFullJob(shop, mechanic!)
    await close(shop, job.jobId)
    const { told } = await pullAll(shop, { by: second! })
    expect(told.filter((row) => row.jobId === job.jobId)).toEqual([])
  })

  it('[P11] says of a job what lib/shop/scope.ts says of its ops', async () => {
    const shop = await makeFullShop()
    const { mechanic, second, guide } = shop.people as Record<string, TestPerson>
    for (const opener of [mechanic!, second!]) {
      for (const assigned of [[], [mechanic!], [second!], [mechanic!, second!]]) {
        for (const state of ['open', 'closed'] as const) {
          const jobId = await makeJob(shop, opener)
          await alter(shop, jobId, async (tx) => {
            for (const { id } of assigned) await assignJob(tx, { jobId, personId: id })
            await setJobStand(tx, {
              id: jobId,
              stand: { ...STAND, state },
              by: { deviceId: null, at: AT },
            })
          })
          const hands = { state, openedBy: opener.id, assignedTo: assigned.map(({ id }) => id) }
          for (const by of [mechanic!, second!, guide!]) {
            const held = await pullAll(shop, { by })
            const words = `${state}, opened by ${opener.name}, ${assigned.length} hands, seen by ${by.name}`
            expect(has(held, 'job', jobId), words).toBe(
              seesJob({ personId: by.id, roles: by.roles }, hands),
            )
          }
        }
      }
    }
  })
})
