import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { OutboxRecord } from '@/lib/sync/client/phone-db'
import { createPhone, newIndexed, type TestFetch, type TestPhone } from './phone'
import { RealShop } from './real-shop'
import type { TestShop } from './shop-fixture'
import { signIn } from './sync-world'

export type RealPhone = Awaited<ReturnType<typeof realPhone>>

/**
 * The phone's own program of that person against the shop's real routes, enrolled. `through` stands between
 * the two; `again` starts it anew out of the same store, as after a kill.
 */
export async function realPhone(
  shop: TestShop,
  who: string,
  {
    ports = {},
    through = (fetch) => fetch,
  }: { ports?: Partial<SyncPorts>; through?: (fetch: TestFetch) => TestFetch } = {},
) {
  const { cookie, sessionId } = await signIn(shop, who)
  const person = shop.people[who]
  if (!person) throw new Error(who)
  const line = new RealShop(cookie)
  const indexed = newIndexed()
  const actor = { shopId: shop.id, personId: person.id, roles: person.roles, name: person.name }
  const start = (fetch: TestFetch = line.fetch) =>
    createPhone({ fetch: through(fetch), ports: { ...ports, actor, indexed } })
  const phone = await start()
  const enrolled = await phone.phone.enrol()
  if (!enrolled.ok) throw new Error(enrolled.problem.kind)
  return { phone, line, person, sessionId, again: start }
}

export const outboxOf = (of: TestPhone): Promise<OutboxRecord[]> =>
  of.phone.core.db.outbox.orderBy('dseq').toArray()
export const statesOf = async (of: TestPhone) => (await outboxOf(of)).map((record) => record.state)
