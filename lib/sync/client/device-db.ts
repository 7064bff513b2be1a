import Dexie, { type Table } from 'dexie'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { Indexed } from './phone-db'

/** A person whose store this phone holds. The name stands open here: it is shown before anything is unlocked. */
export type KnownPerson = Actor & { key: string; seenAt: number }

/** `leaving`: the person whose session is still to be ended, because they signed out without signal. */
type CurrentRecord = { id: 'current'; key: string | null; leaving: Id | null }

/** Which persons use this phone, and who does now: what the app opens from without signal. */
export class DeviceDb extends Dexie {
  declare person: Table<KnownPerson, string>
  declare current: Table<CurrentRecord, 'current'>

  constructor(indexed: Indexed = {}) {
    super('farbench-device', {
      chromeTransactionDurability: 'strict',
      cache: 'disabled',
      ...indexed,
    })
    this.version(1).stores({ person: 'key', current: 'id' })
    this.on('versionchange', () => this.close({ disableAutoOpen: false }))
  }
}

const keyOf = (who: { shopId: Id; personId: Id }) => `${who.shopId}/${who.personId}`

/** The person at work on this phone, or null. */
export async function currentPerson(db: DeviceDb): Promise<Actor | null> {
  const key = (await db.current.toArray())[0]?.key
  const known = key ? await db.person.get(key) : undefined
  return known === undefined ? null : actorOf(known)
}

/** Every person whose store this phone holds. */
export async function knownPersons(db: DeviceDb): Promise<Actor[]> {
  return (await db.person.toArray()).map(actorOf)
}

/** Takes down who signed in and makes them the one at work. `now` in ms. */
export async function setCurrent(db: DeviceDb, actor: Actor, now: number): Promise<void> {
  const key = keyOf(actor)
  await db.transaction('rw', db.person, db.current, async () => {
    await db.person.put({ ...actor, key, seenAt: now })
    await db.current.put({ id: 'current', key, leaving: null })
  })
}

/** Nobody is at work; every store stays. `leaving` is who signed out without reaching the shop. */
export async function setNobody(db: DeviceDb, leaving: Id | null): Promise<void> {
  await db.current.put({ id: 'current', key: null, leaving })
}

/** No session is still to be ended: who signed out without signal has signed in again. */
export async function stayHere(db: DeviceDb): Promise<void> {
  await db.current.update('current', { leaving: null })
}

/** The person whose session is still to be ended. */
export async function leavingPerson(db: DeviceDb): Promise<Id | null> {
  return (await db.current.toArray())[0]?.leaving ?? null
}

const actorOf = (known: KnownPerson): Actor => ({
  shopId: known.shopId,
  personId: known.personId,
  roles: known.roles,
  name: known.name,
})
