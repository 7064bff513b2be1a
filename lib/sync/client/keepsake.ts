import * as z from 'zod/mini'
import type { Id } from '@/lib/model/id'
import type { Keeper } from '@/lib/ports/keeper'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { type Keepsake, keepsake, MOST_KEEPSAKES } from '@/lib/sync/protocol/device'
import { numbersIn } from './outbox'
import { type PhoneDb, readMeta } from './phone-db'

/**
 * What is remembered of each store outside of it (P22), so that a phone whose stores were cleared can say
 * at the next sign-in what went with them. It names a device and counts; nothing in it is about a person.
 */
const list = z.array(z.unknown())

/** Every keepsake there is, the furthest of each device, the newest last. */
export function readKeepsakes(keeper: Keeper | undefined): Keepsake[] {
  const found = new Map<Id, Keepsake>()
  for (const words of keeper?.read() ?? []) {
    for (const one of parsed(words)) {
      const held = found.get(one.deviceId)
      if (held === undefined || held.dseq < one.dseq) found.set(one.deviceId, one)
    }
  }
  return [...found.values()]
}

function parsed(words: string): Keepsake[] {
  try {
    const read = list.safeParse(JSON.parse(words))
    return (read.success ? read.data : []).flatMap((one) => {
      const known = keepsake.safeParse(one)
      return known.success ? [known.data] : []
    })
  } catch {
    return []
  }
}

/** Puts a device's keepsake in place of its last one; null: it is forgotten. */
export function keep(keeper: Keeper | undefined, deviceId: Id, next: Keepsake | null): void {
  if (keeper === undefined) return
  const others = readKeepsakes(keeper).filter((one) => one.deviceId !== deviceId)
  const all = next === null ? others : [...others, next]
  keeper.write(JSON.stringify(all.slice(-MOST_KEEPSAKES)))
}

/** How much of a store is unsent, as its person is told: records and files, also what is stuck. */
export async function countUnsent(db: PhoneDb): Promise<number> {
  const ops = await numbersIn(db, 'waiting', 'blocked', 'stuck')
  return ops.length + (await db.photo.where('state').anyOf('waiting', 'stuck').count())
}

/** A file whose bytes nobody has any more: the phone confirmed it was sent, the shop was restored since. */
const isGone = (photo: { state: string; reason: string | null }): boolean =>
  photo.state === 'stuck' && photo.reason === 'bytesGone'

/** The same as far as it would be lost with the store: of a file whose bytes are gone nothing is left to lose. */
export async function countToLose(db: PhoneDb): Promise<number> {
  const gone = await db.photo.where('state').equals('stuck').filter(isGone).count()
  return (await countUnsent(db)) - gone
}

/**
 * Takes down how far this store has come. `recordedMs`: something was recorded just now. A store without a
 * record is not remembered: nothing can be lost with it.
 */
export async function remember(
  db: PhoneDb,
  ports: Pick<SyncPorts, 'keeper' | 'zone'>,
  recordedMs: number | null,
): Promise<void> {
  const { keeper } = ports
  const device = await readMeta(db, 'device')
  const dseq = (await readMeta(db, 'stamp'))?.dseq ?? 0
  if (keeper === undefined || device === undefined || dseq === 0) return
  const { deviceId } = device
  const held = readKeepsakes(keeper).find((one) => one.deviceId === deviceId)
  const newest = recordedMs ?? (held ? null : await newestMs(db))
  const day = newest === null ? held?.day : dayOf(newest, ports.zone())
  if (day === undefined) return
  keep(keeper, deviceId, { deviceId, dseq, unsent: await countUnsent(db), day, deleted: null })
}

async function newestMs(db: PhoneDb): Promise<number | null> {
  return (await db.outbox.orderBy('dseq').last())?.since ?? null
}

/** The day in this zone, `YYYY-MM-DD`. */
export function dayOf(ms: number, zone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
  }).formatToParts(ms)
  const part = (type: string) => parts.find((one) => one.type === type)?.value ?? ''
  return `${part('year')}-${part('month')}-${part('day')}`
}
