import type { Actor } from '@/lib/model/person'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { Core } from './core'
import {
  type DeviceDb,
  dropPerson,
  finishWipe,
  knownPersons,
  plannedWipes,
  planWipe,
  type WipeRecord,
} from './device-db'
import { countToLose, keep, readKeepsakes } from './keepsake'
import { findKey, type Indexed, PhoneDb, readMeta } from './phone-db'

/**
 * Emptying one person's store (Q4). First, in one transaction with the look that nothing would be lost, the
 * store is closed to every write; then the plan is put down beside it; then step after step, each of which
 * may be done again. A kill before the first leaves everything, one after it is gone on with at the next
 * start: never half.
 */
export type WipeTools = {
  device: DeviceDb
  ports: Pick<SyncPorts, 'keeper' | 'pages' | 'clock'>
  indexed: Indexed
  step: (name: string) => void
}

/**
 * Closes the store to writes and plans its emptying. `unsent`: how much unsent work may go, which is
 * nothing but on its person's word. False, and nothing done, when there is more or less than that.
 */
export async function beginWipe(
  tools: WipeTools,
  of: { core: Pick<Core, 'db'>; actor: Actor; why: WipeRecord['why']; unsent: number },
): Promise<boolean> {
  const { db } = of.core
  const { shopId, personId } = of.actor
  const device = await readMeta(db, 'device')
  tools.step('wipe:look')
  const closed = await db.transaction('rw', [db.outbox, db.photo, db.meta], async () => {
    if ((await countToLose(db)) !== of.unsent) return false
    const turn = ((await readMeta(db, 'turn')) ?? 0) + 1
    await db.meta.bulkPut([
      { name: 'turn', value: turn },
      { name: 'wiping', value: of.why },
    ])
    return true
  })
  if (!closed) return false
  tools.step('wipe:closed')
  await planWipe(tools.device, {
    shopId,
    personId,
    deviceId: device?.deviceId ?? null,
    why: of.why,
    unsent: of.unsent,
  })
  tools.step('wipe:planned')
  return true
}

/** True when this store is being emptied, or was: no window may write into it any more. */
export async function isWiped(db: PhoneDb): Promise<boolean> {
  return (await readMeta(db, 'wiping')) !== undefined || (await findKey(db, 'outbox')) === undefined
}

/** Goes on with every emptying that was begun; answers whether there was one. */
export async function resumeWipes(tools: WipeTools): Promise<boolean> {
  const planned = await plannedWipes(tools.device)
  for (const wipe of planned) await emptyStore(tools, wipe)
  return planned.length > 0
}

/**
 * The steps. Keys go first: what is sealed then opens for nobody, however the rest ends. The code book
 * goes with the last person, the app itself stays.
 */
async function emptyStore(tools: WipeTools, wipe: WipeRecord): Promise<void> {
  const { device, ports, indexed, step } = tools
  const db = new PhoneDb(wipe.shopId, wipe.personId, indexed)
  try {
    await db.key.clear()
    step('wipe:keys')
    const rest = db.tables.filter((table) => table.name !== 'key' && table.name !== 'meta')
    await db.transaction('rw', rest, () => Promise.all(rest.map((table) => table.clear())))
    step('wipe:tables')
    await db.meta.filter(({ name }) => name !== 'wiping').delete()
    step('wipe:meta')
  } finally {
    db.close()
  }
  await new PhoneDb(wipe.shopId, wipe.personId, indexed).delete({ disableAutoOpen: true })
  step('wipe:store')
  await ports.pages?.dropAll()
  step('wipe:pages')
  forget(tools, wipe)
  step('wipe:keepsake')
  await dropPerson(device, wipe)
  step('wipe:person')
  await dropBook(indexed, (await knownPersons(device)).length === 0 ? null : wipe)
  step('wipe:book')
  await finishWipe(device, wipe, ports.clock.now())
  step('wipe:done')
}

/** A store that was handed over is forgotten; of one its person deleted, the count stays to be told. */
function forget({ ports }: WipeTools, wipe: WipeRecord): void {
  const { keeper } = ports
  if (wipe.deviceId === null) return
  const held = readKeepsakes(keeper).find((one) => one.deviceId === wipe.deviceId)
  const stays = wipe.why === 'deleted' && held !== undefined
  keep(keeper, wipe.deviceId, stays ? { ...held, deleted: wipe.unsent } : null)
}

/** The code books go with the last person (null); with another one, what that person's jobs held them for. */
async function dropBook(indexed: Indexed, left: WipeRecord | null): Promise<void> {
  const { BookDb } = await import('./book-store')
  const books = new BookDb(indexed)
  try {
    if (left === null) await Promise.all(books.tables.map((table) => table.clear()))
    else await books.need.delete([left.shopId, left.personId])
  } finally {
    books.close()
  }
}
