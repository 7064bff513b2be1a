import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop, withNoShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { deviceGaps, enrolDevice, findDevice, noteDevice, revokeDevice } from '@/db/queries/devices'
import { insertPeople, revokeMembership, setRoles } from '@/db/queries/people'
import {
  findSignIn,
  insertSession,
  liveSession,
  revokeSession,
  revokeSessionsOf,
} from '@/db/queries/sign-in'
import { saveOps } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { AT, makeShop, newId, type TestPerson, type TestShop } from '../support/shop-fixture'

const NOW = '2026-12-01T12:00:00.000Z'
const LATER = '2026-12-31T12:00:00.000Z'

let test: TestDatabase
let shop: TestShop
let other: TestShop
let person: TestPerson
beforeAll(async () => {
  test = await openTestDatabase()
  shop = await makeShop({ mechanic: ['mechanic'], guide: ['guide'] })
  other = await makeShop({ owner: ['owner'] })
  person = shop.people.mechanic!
})
afterAll(() => test.close())

const signIn = (email: string) => withNoShop((tx) => findSignIn(tx, email))
const sessionOf = (id: Id, now = NOW) => withNoShop((tx) => liveSession(tx, { id, now }))
async function openSession(by: TestPerson, expiresAt = LATER): Promise<Id> {
  const id = newId()
  await asShop(shop.id, (tx) =>
    insertSession(tx, { id, personId: by.id, createdAt: AT, expiresAt }),
  )
  return id
}

describe('[D4] before a shop is known', () => {
  it('[D4] an e-mail address finds its membership, whatever its case', async () => {
    expect(await signIn(person.email.toUpperCase())).toEqual([
      {
        shopId: shop.id,
        personId: person.id,
        name: person.name,
        roles: ['mechanic'],
        passwordHash: 'none',
      },
    ])
    expect(await signIn('nobody@test.invalid')).toEqual([])
    expect(await signIn('')).toEqual([])
    expect(await signIn('%')).toEqual([])
  })

  it('[D4] one address in two shops answers both', async () => {
    const twin = {
      ...person,
      id: newId(),
      phone: null,
      passwordHash: 'other',
      roles: ['owner' as const],
    }
    await asShop(other.id, async (tx) => {
      await insertPeople(tx, [twin])
      await takeChanges(tx, [{ entity: 'person', id: twin.id, jobId: null }])
    })
    const found = await signIn(person.email)
    expect(found.map((row) => row.shopId)).toEqual([shop.id, other.id].sort())
  })

  it('[D4] nothing but those two questions can be asked: every table stays empty', async () => {
    const rows = await withNoShop(async (tx) => [
      await tx.selectFrom('personContact').selectAll().execute(),
      await tx.selectFrom('credential').selectAll().execute(),
      await tx.selectFrom('session').selectAll().execute(),
    ])
    expect(rows).toEqual([[], [], []])
  })
})

describe('[D4] sessions', () => {
  it('[D4] answer the actor with the roles of today', async () => {
    const guide = shop.people.guide!
    const id = await openSession(guide)
    expect(await sessionOf(id)).toEqual({
      shopId: shop.id,
      personId: guide.id,
      name: guide.name,
      roles: ['guide'],
    })
    await asShop(shop.id, async (tx) => {
      await setRoles(tx, { personId: guide.id, roles: ['guide', 'parts'] })
      await takeChanges(tx, [{ entity: 'person', id: guide.id, jobId: null }])
    })
    expect((await sessionOf(id))?.roles).toEqual(['guide', 'parts'])
  })

  it('[D4] end when they are over, revoked, or unknown', async () => {
    const [short, revoked, all] = [
      await openSession(person, '2026-12-01T11:59:59.999Z'),
      await openSession(person),
      await openSession(person),
    ]
    expect(await sessionOf(short)).toBeUndefined()
    expect(await sessionOf(short, '2026-12-01T11:59:59.998Z')).toBeDefined()
    await asShop(shop.id, (tx) => revokeSession(tx, { id: revoked, now: NOW }))
    expect(await sessionOf(revoked)).toBeUndefined()
    expect(await sessionOf(all)).toBeDefined()
    await asShop(shop.id, (tx) => revokeSessionsOf(tx, { personId: person.id, now: NOW }))
    expect(await sessionOf(all)).toBeUndefined()
    expect(await sessionOf(newId())).toBeUndefined()
  })

  it('[D4] of another shop cannot be revoked from here', async () => {
    const id = await openSession(shop.people.guide!)
    await asShop(other.id, (tx) => revokeSession(tx, { id, now: NOW }))
    expect(await sessionOf(id)).toBeDefined()
  })

  it('[D4] end with the membership, and so does signing in', async () => {
    const world = await makeShop({ leaver: ['mechanic'] })
    const leaver = world.people.leaver!
    const id = newId()
    await asShop(world.id, (tx) =>
      insertSession(tx, { id, personId: leaver.id, createdAt: AT, expiresAt: LATER }),
    )
    expect(await sessionOf(id)).toBeDefined()
    await asShop(world.id, async (tx) => {
      await revokeMembership(tx, { personId: leaver.id, now: NOW })
      await takeChanges(tx, [{ entity: 'person', id: leaver.id, jobId: null }])
    })
    expect(await sessionOf(id)).toBeUndefined()
    expect(await signIn(leaver.email)).toEqual([])
  })
})

describe('[R22] devices', () => {
  it('[R22] are known in their own shop alone, revoked or not', async () => {
    const id = newId()
    const publicKey = { kty: 'EC', crv: 'P-256', x: 'AQ', y: 'Ag' } as const
    await asShop(shop.id, (tx) =>
      enrolDevice(tx, { id, personId: person.id, name: 'Phone', publicKey, enrolledAt: AT }),
    )
    expect(await asShop(other.id, (tx) => findDevice(tx, id))).toBeUndefined()
    await asShop(shop.id, (tx) => revokeDevice(tx, { id, by: shop.people.guide!.id, now: NOW }))
    const found = await asShop(shop.id, (tx) => findDevice(tx, id))
    expect(found).toMatchObject({ personId: person.id, publicKey, revokedAt: NOW, highestDseq: 0 })
  })

  it('[P22] keep the highest sequence number and the last clock offset known', async () => {
    const id = person.deviceId
    const note = (highestDseq: number | null, clockOffsetMs: number | null) =>
      asShop(shop.id, (tx) => noteDevice(tx, { id, at: NOW, highestDseq, clockOffsetMs }))
    await note(12, -3500)
    await note(7, null)
    await note(null, null)
    expect(await asShop(shop.id, (tx) => findDevice(tx, id))).toMatchObject({
      highestDseq: 12,
      clockOffsetMs: -3500,
      lastSeenAt: NOW,
    })
  })

  it('[P22] say which numbers never came', async () => {
    const guide = shop.people.guide!
    const sent = [2, 3, 3, 7, 8, 11]
    await asShop(shop.id, (tx) =>
      saveOps(
        tx,
        sent.map((dseq) => ({
          opId: newId(),
          deviceId: guide.deviceId,
          dseq,
          personId: guide.id,
          kind: 'log.add',
          entityId: null,
          jobId: null,
          raw: '{}',
          outcome: 'accepted',
          code: null,
          field: null,
          detail: null,
          blockedOn: null,
          loser: null,
          receivedAt: NOW,
          settledAt: NOW,
        })),
      ),
    )
    expect(await asShop(shop.id, (tx) => deviceGaps(tx, guide.deviceId))).toEqual([
      { first: 1, last: 1 },
      { first: 4, last: 6 },
      { first: 9, last: 10 },
    ])
  })
})
