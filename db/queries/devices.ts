import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Role } from '@/lib/model/role'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { PublicJwk } from '../tables/person'

/** A phone as the server knows it. `revokedRoles`: what its person was when it was revoked. */
export type Device = {
  id: Id
  personId: Id
  name: string
  publicKey: PublicJwk
  highestDseq: number
  enrolledAt: Instant
  lastSeenAt: Instant | null
  clockOffsetMs: number | null
  revokedAt: Instant | null
  revokedRoles: Role[] | null
  /** Id of the store it told last (P22). */
  canary: Id | null
  /** Set while numbers of it are missing: when that was last told (P22). */
  gapsToldAt: Instant | null
  /** The phone that came after this one's store was emptied (P22). */
  replacedBy: Id | null
  /** When it was first told to empty itself (R22). */
  wipeToldAt: Instant | null
}

const COLUMNS = [
  'id',
  'personId',
  'name',
  'publicKey',
  'highestDseq',
  'enrolledAt',
  'lastSeenAt',
  'clockOffsetMs',
  'revokedAt',
  'revokedRoles',
  'canary',
  'gapsToldAt',
  'replacedBy',
  'wipeToldAt',
] as const

/** Stores a phone's public key under the id given; the same id twice is an error of the caller. */
export async function enrolDevice(
  tx: ShopTx,
  device: { id: Id; personId: Id; name: string; publicKey: PublicJwk; enrolledAt: Instant },
): Promise<void> {
  await tx
    .insertInto('device')
    .values({
      ...device,
      shopId: tx.shopId,
      publicKey: JSON.stringify(device.publicKey),
      lastSeenAt: device.enrolledAt,
    })
    .execute()
}

/** Answers the phone with this id in this shop, revoked or not; undefined when there is none. */
export async function findDevice(tx: ShopTx, id: Id): Promise<Device | undefined> {
  return await tx
    .selectFrom('device')
    .select(COLUMNS)
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .executeTakeFirst()
}

/** Answers the shop's phones, the last one seen first. */
export async function listDevices(tx: ShopTx): Promise<Device[]> {
  return await tx
    .selectFrom('device')
    .select(COLUMNS)
    .where('shopId', '=', tx.shopId)
    .orderBy('lastSeenAt', (order) => order.desc().nullsLast())
    .execute()
}

/** What a phone says that it still holds beyond what it has just sent. */
export type Held = { ops: number; photos: number; oldestAt: Instant | null }

/** What a phone tells of itself when it is heard; `held` and `canary` stay as they were when it told nothing. */
export type Contact = {
  at: Instant
  clockOffsetMs: number | null
  highestDseq: number | null
  held?: Held | null
  canary?: Id | null
  bookVersion?: number | null
}

/** Notes that the phone was here: its clock against ours, and how far its ops have come (P22). */
export async function noteDevice(tx: ShopTx, { id, ...seen }: Contact & { id: Id }): Promise<void> {
  await sql`select note_contact(${tx.shopId}, ${id}, ${JSON.stringify(seen)}::jsonb)`.execute(tx)
}

/** Takes a phone out for good: its pulls end, its pushes go to quarantine. False when it was out before. */
export async function revokeDevice(
  tx: ShopTx,
  { id, by, now, reason = null }: { id: Id; by: Id; now: Instant; reason?: string | null },
): Promise<boolean> {
  const { numUpdatedRows } = await tx
    .updateTable('device')
    .set({
      revokedAt: now,
      revokedBy: by,
      revokedReason: reason,
      revokedRoles: sql`(select m.roles from membership m
        where m.shop_id = device.shop_id and m.person_id = device.person_id)`,
    })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .where('revokedAt', 'is', null)
    .executeTakeFirst()
  return numUpdatedRows === 1n
}

/** Notes when the phone was first told to empty itself. */
export async function noteWipe(tx: ShopTx, { id, at }: { id: Id; at: Instant }): Promise<void> {
  await tx
    .updateTable('device')
    .set({ wipeToldAt: at })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .where('wipeToldAt', 'is', null)
    .execute()
}

/** Numbers of a phone that the shop holds, in its records or in quarantine. */
const sent = (tx: ShopTx, id: Id) => sql`
  select dseq from sync_op where shop_id = ${tx.shopId} and device_id = ${id} and dseq > 0
  union
  select dseq from quarantine_op where shop_id = ${tx.shopId} and device_id = ${id} and dseq > 0`

/** Answers the gaps in what the phone has sent, as first and last missing number (P22). */
export async function deviceGaps(tx: ShopTx, id: Id): Promise<{ first: number; last: number }[]> {
  const { rows } = await sql<{ first: number; last: number }>`
    select before + 1 as first, dseq - 1 as last
    from (
      select dseq, coalesce(lag(dseq) over (order by dseq), 0) as before
      from (${sent(tx, id)}) as sent
    ) as pairs
    where dseq > before + 1
    order by dseq
  `.execute(tx)
  return rows
}

/** Notes when gaps were last told to the phone; null: it has none any more. */
export async function noteGaps(
  tx: ShopTx,
  { id, toldAt }: { id: Id; toldAt: Instant | null },
): Promise<void> {
  await tx
    .updateTable('device')
    .set({ gapsToldAt: toldAt })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .execute()
}

/** Answers how many of the numbers 1 to `dseq` of a phone the shop never had (P22). */
export async function countMissing(
  tx: ShopTx,
  { id, dseq }: { id: Id; dseq: number },
): Promise<number> {
  const { rows } = await sql<{ n: number }>`
    select count(*)::int as n from (${sent(tx, id)}) as sent where dseq <= ${dseq}
  `.execute(tx)
  return Math.max(0, dseq - (rows[0]?.n ?? 0))
}

/** What went with a store that was emptied: by an accident, or by its person's own word. */
export type Replaced = {
  id: Id
  by: Id
  at: Instant
  lostOps: number
  /** The day of the last record, `YYYY-MM-DD`, as the phone remembered it. */
  lastOn: string | null
  deletedOps: number
}

/** Notes that a phone's store is gone and which phone came after it; a second word changes nothing. */
export async function replaceDevice(tx: ShopTx, of: Replaced): Promise<void> {
  await tx
    .updateTable('device')
    .set({
      replacedBy: of.by,
      replacedAt: of.at,
      lostOps: of.lostOps,
      lostLastOn: of.lastOn,
      deletedOps: of.deletedOps,
    })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', of.id)
    .where('replacedBy', 'is', null)
    .execute()
}

/** Answers what was lost with the stores that came before this phone's; null when nothing was. */
export async function lossBefore(
  tx: ShopTx,
  id: Id,
): Promise<{ ops: number; lastOn: string | null } | null> {
  const row = await tx
    .selectFrom('device')
    .select((eb) => [eb.fn.sum<string>('lostOps').as('ops'), eb.fn.max('lostLastOn').as('lastOn')])
    .where('shopId', '=', tx.shopId)
    .where('replacedBy', '=', id)
    .where('lostOps', '>', 0)
    .executeTakeFirst()
  const ops = Number(row?.ops ?? 0)
  return ops > 0 ? { ops, lastOn: row?.lastOn ?? null } : null
}
