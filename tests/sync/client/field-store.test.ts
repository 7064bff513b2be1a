import { v7 } from 'uuid'
import { describe, expect, test } from 'vitest'
import { arrive } from '@/components/sign-in/arrive'
import type { Actor } from '@/lib/model/person'
import { fail, ok } from '@/lib/model/result'
import { inProcessLock } from '@/lib/ports/lock'
import { networkOf } from '@/lib/ports/network'
import { browserShopLine, type ShopLine } from '@/lib/ports/shop-line'
import { FieldStore } from '@/lib/sync/client/field-store'
import type { Indexed } from '@/lib/sync/client/phone-db'
import type { Session } from '@/lib/sync/client/views'
import { MECHANIC, newIndexed, noTimer, testClock } from '../../support/phone'
import { ShopDouble } from '../../support/shop-double'

const SECOND: Actor = {
  ...MECHANIC,
  personId: '01980000-0000-7000-8000-000000000106',
  name: 'Jory Fenn',
}

/** One start of the app on a phone whose store is `indexed`. */
function start(shop: ShopDouble, indexed: Indexed) {
  const store = new FieldStore(
    {
      clock: testClock(),
      timer: noTimer,
      ids: { next: () => v7(), share: () => 0.5 },
      lock: inProcessLock(),
      network: networkOf({
        fetch: (input, init) => shop.fetch(String(input), init ?? {}),
        online: () => true,
        timer: noTimer,
      }),
      zone: () => 'Etc/GMT+6',
    },
    indexed,
  )
  const stop = store.start()
  return {
    store,
    async opened(): Promise<Session> {
      await store.opened()
      return store.session.get()
    },
    async end() {
      await store.phone.get()?.sender.idle()
      stop()
      store.phone.get()?.close()
    },
  }
}

const personOf = (session: Session) => (session.kind === 'ready' ? session.actor.personId : null)

describe('who is at work on the phone', () => {
  test('[P18] the first start with a session enrols, fetches everything and is ready', async () => {
    const shop = new ShopDouble()
    shop.put('person', MECHANIC.personId, { id: MECHANIC.personId, name: 'Tove Marl', roles: [] })
    const app = start(shop, newIndexed())
    const session = await app.opened()
    expect(session).toMatchObject({ kind: 'ready', actor: MECHANIC })
    const phone = app.store.phone.get()
    expect(await phone?.isEnrolled()).toBe(true)
    await phone?.sender.idle()
    expect(await phone?.core.db.row.count()).toBe(1)
    await app.end()
  })

  test('without a session and without a store nobody is at work', async () => {
    const shop = new ShopDouble()
    shop.session = false
    const app = start(shop, newIndexed())
    expect(await app.opened()).toEqual({ kind: 'signedOut' })
    await app.end()
  })

  test.each([
    ['without a line', (shop: ShopDouble) => (shop.fault = () => ({ noLine: true }))],
    ['with the session gone', (shop: ShopDouble) => (shop.session = false)],
    [
      'behind a portal',
      (shop: ShopDouble) => (shop.fault = () => ({ instead: new Response('<html/>') })),
    ],
  ])('[R22] opens from what the phone holds %s', async (_words, bend) => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const first = start(shop, indexed)
    const before = await first.opened()
    await first.end()
    bend(shop)
    const app = start(shop, indexed)
    expect(await app.opened()).toEqual(before)
    await app.end()
  })

  test('[fault 12] [P18] another person signs in: the first one’s store stays, closed and unsent', async () => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const first = start(shop, indexed)
    await first.opened()
    const held = first.store.phone.get()?.core.db.name
    await first.end()
    shop.actor = SECOND
    const app = start(shop, indexed)
    expect(personOf(await app.opened())).toBe(SECOND.personId)
    expect(app.store.phone.get()?.core.db.name).not.toBe(held)
    await app.end()
    shop.actor = MECHANIC
    const back = start(shop, indexed)
    await back.opened()
    expect(back.store.phone.get()?.core.db.name).toBe(held)
    await back.end()
  })

  test('signing out without a line stays signed out, and ends the session when there is one', async () => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const first = start(shop, indexed)
    await first.opened()
    shop.fault = () => ({ noLine: true })
    await first.store.signOut()
    expect(first.store.session.get()).toEqual({ kind: 'signedOut' })
    await first.end()
    shop.fault = () => null
    const app = start(shop, indexed)
    expect(await app.opened()).toEqual({ kind: 'signedOut' })
    expect(shop.session).toBe(false)
    await app.end()
    shop.session = true
    const again = start(shop, indexed)
    expect(personOf(await again.opened())).toBe(MECHANIC.personId)
    await again.end()
  })

  test('signing out without a line and in again with one keeps the new session', async () => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const first = start(shop, indexed)
    await first.opened()
    shop.fault = () => ({ noLine: true })
    await first.store.signOut()
    await first.end()
    shop.fault = () => null
    const line: ShopLine = {
      ...browserShopLine,
      getJson: async (path) => ok(await (await shop.fetch(path, {})).json()),
    }
    expect((await arrive(line, indexed))?.personId).toBe(MECHANIC.personId)
    const app = start(shop, indexed)
    expect(personOf(await app.opened())).toBe(MECHANIC.personId)
    expect(shop.session).toBe(true)
    await app.end()
  })

  test('a sign-in that finds nobody leaves the sign-out to be told to the shop', async () => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const first = start(shop, indexed)
    await first.opened()
    shop.fault = () => ({ noLine: true })
    await first.store.signOut()
    await first.end()
    const line: ShopLine = {
      ...browserShopLine,
      getJson: () => Promise.resolve(fail({ kind: 'signedOut' })),
    }
    expect(await arrive(line, indexed)).toBeNull()
    shop.fault = () => null
    const app = start(shop, indexed)
    expect(await app.opened()).toEqual({ kind: 'signedOut' })
    expect(shop.session).toBe(false)
    await app.end()
  })

  test('a change of roles at the shop reaches the screens', async () => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const first = start(shop, indexed)
    await first.opened()
    await first.end()
    shop.actor = { ...MECHANIC, roles: ['mechanic', 'parts'] }
    const app = start(shop, indexed)
    expect(await app.opened()).toMatchObject({ actor: { roles: ['mechanic', 'parts'] } })
    await app.end()
  })
})
