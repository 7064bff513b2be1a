import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { PublicJwk } from '../tables/person'

/** A phone as the server knows it. */
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

/** Notes that the phone was here: its clock against ours, and how far its ops have come (P22). */
export async function noteDevice(
  tx: ShopTx,
  seen: { id: Id; at: Instant; clockOffsetMs: number | null; highestDseq: number | null },
): Promise<void> {
  await tx
    .updateTable('device')
    .set({
      lastSeenAt: seen.at,
      clockOffsetMs: sql`coalesce(${seen.clockOffsetMs}::bigint, clock_offset_ms)`,
      highestDseq: sql`greatest(highest_dseq, ${seen.highestDseq ?? 0}::bigint)`,
    })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', seen.id)
    .execute()
}

/** Takes a phone out: its pulls end, its pushes go to quarantine. */
export async function revokeDevice(
  tx: ShopTx,
  { id, by, now }: { id: Id; by: Id; now: Instant },
): Promise<void> {
  await tx
    .updateTable('device')
    .set({ revokedAt: now, revokedBy: by })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .where('revokedAt', 'is', null)
    .execute()
}

/** Answers the gaps in what the phone has sent, as first and last missing number (P22). */
export async function deviceGaps(tx: ShopTx, id: Id): Promise<{ first: number; last: number }[]> {
  const { rows } = await sql<{ first: number; last: number }>`
    select before + 1 as first, dseq - 1 as last
    from (
      select dseq, coalesce(lag(dseq) over (order by dseq), 0) as before
      from (select distinct dseq from sync_op
        where shop_id = ${tx.shopId} and device_id = ${id} and dseq > 0) as sent
    ) as pairs
    where dseq > before + 1
    order by dseq
  `.execute(tx)
  return rows
}
