import Dexie, { type Table } from 'dexie'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { Indexed } from './phone-db'

/** A person whose store this phone holds. The name stands open here: it is shown before anything is unlocked. */
export type KnownPerson = Actor & { key: string; seenAt: number }

/** `leaving`: the person whose session is still to be ended, because they signed out without signal. */
type CurrentRecord = { id: 'current'; key: string | null; leaving: Id | null }

/** A store that is being emptied: it was handed over, or its person deleted so much unsent work with it. */
export type WipeRecord = {
  shopId: Id
  personId: Id
  deviceId: Id | null
  why: 'handedOver' | 'deleted'
  unsent: number
}
/** A store was handed over and emptied at this time (ms): told to whoever opens the app next. */
type NoticeRecord = { id: 'emptied'; at: number }

/** Which persons use this phone, and who does now: what the app opens from without signal. */
export class DeviceDb extends Dexie {
  declare person: Table<KnownPerson, string>
  declare current: Table<CurrentRecord, 'current'>
  declare wipe: Table<WipeRecord & { key: string }, string>
  declare notice: Table<NoticeRecord, 'emptied'>

  constructor(indexed: Indexed = {}) {
    super('farbench-device', {
      chromeTransactionDurability: 'strict',
      cache: 'disabled',
      ...indexed,
    })
    this.version(1).stores({ person: 'key', current: 'id' })
    this.version(2).stores({ wipe: 'key', notice: 'id' })
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
  await db.transaction('rw', db.person, db.current, db.notice, async () => {
    await db.person.put({ ...actor, key, seenAt: now })
    await db.current.put({ id: 'current', key, leaving: null })
    await db.notice.clear()
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

/** Puts down that a store is to be emptied; nobody is at work in it any more. */
export async function planWipe(db: DeviceDb, wipe: WipeRecord): Promise<void> {
  const key = keyOf(wipe)
  await db.transaction('rw', db.wipe, db.current, async () => {
    await db.wipe.put({ ...wipe, key })
    const current = (await db.current.toArray())[0]
    if (current?.key === key) await db.current.put({ ...current, key: null })
  })
}

/** Stores whose emptying was begun. */
export const plannedWipes = (db: DeviceDb): Promise<WipeRecord[]> => db.wipe.toArray()

/** The phone no longer knows this person. */
export async function dropPerson(db: DeviceDb, who: WipeRecord): Promise<void> {
  await db.person.delete(keyOf(who))
}

/** The store is empty; that of a phone that was taken out is told to whoever opens the app next. */
export async function finishWipe(db: DeviceDb, wipe: WipeRecord, now: number): Promise<void> {
  await db.transaction('rw', db.wipe, db.notice, async () => {
    if (wipe.why === 'handedOver') await db.notice.put({ id: 'emptied', at: now })
    await db.wipe.delete(keyOf(wipe))
  })
}

/** True when a store on this phone was handed over and emptied, and nobody has signed in since. */
export const wasEmptied = async (db: DeviceDb): Promise<boolean> => (await db.notice.count()) > 0

const actorOf = (known: KnownPerson): Actor => ({
  shopId: known.shopId,
  personId: known.personId,
  roles: known.roles,
  name: known.name,
})
