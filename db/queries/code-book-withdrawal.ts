import { sql } from 'kysely'
import type { BookWithdrawal, Withdrawn } from '@/lib/model/book-withdrawal'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'

/** Answers withdrawals as phones and desk read them, all or those with these ids, the oldest first. */
export async function listWithdrawals(
  tx: ShopTx,
  ids: readonly Id[] | null = null,
): Promise<BookWithdrawal[]> {
  const { rows } = await sql<BookWithdrawal>`
    select w.id, w.what, w.item_id, w.name, w.reason, w.instead, w.withdrawn_at as at,
      w.withdrawn_by as by,
      case when w.what = 'version' then array[w.version] else coalesce((
        select array_agg(distinct i.version order by i.version) from code_book_item i
        where i.shop_id = w.shop_id and i.hash = any(w.hashes)), '{}') end as versions,
      coalesce((select max(v.version) from code_book_version v where v.shop_id = w.shop_id), 0) as up_to,
      coalesce((
        select json_agg(json_build_object('personId', h.person_id, 'at', to_char(
          h.heard_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')) order by h.heard_at)
        from code_book_heard h
        where h.shop_id = w.shop_id and h.withdrawal_id = w.id), '[]') as heard
    from code_book_withdrawal w
    where w.shop_id = ${tx.shopId} and (${ids === null} or w.id = any(${ids ?? []}::uuid[]))
    order by w.withdrawn_at, w.id
  `.execute(tx)
  return rows
}

/** Answers which of these withdrawals the shop has made. */
export async function knownWithdrawals(tx: ShopTx, ids: readonly Id[]): Promise<Set<Id>> {
  if (ids.length === 0) return new Set()
  const rows = await tx
    .selectFrom('codeBookWithdrawal')
    .select('id')
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .execute()
  return new Set(rows.map((row) => row.id))
}

/** Answers the contents that an item ever had in a published version, by hash. */
export async function contentsOf(
  tx: ShopTx,
  { kind, itemId }: { kind: string; itemId: string },
): Promise<string[]> {
  const { rows } = await sql<{ hash: string }>`
    select distinct hash from code_book_item
    where shop_id = ${tx.shopId} and kind = ${kind} and item_id = ${itemId}
  `.execute(tx)
  return rows.map((row) => row.hash)
}

/** Puts a withdrawal down. Take a change number (bookWithdrawal, its id). */
export async function insertWithdrawal(
  tx: ShopTx,
  of: {
    id: Id
    what: Withdrawn
    itemId: string | null
    version: number | null
    name: string
    hashes: readonly string[]
    reason: string
    instead: string | null
    withdrawnAt: Instant
    withdrawnBy: Id | null
  },
): Promise<void> {
  const { hashes, ...rest } = of
  await tx
    .insertInto('codeBookWithdrawal')
    .values({ ...rest, shopId: tx.shopId, hashes: [...hashes] })
    .execute()
}

/** Takes down who acknowledged what; the first time counts. Take a change number for each withdrawal. */
export async function insertHeard(
  tx: ShopTx,
  heard: readonly {
    withdrawalId: Id
    personId: Id
    deviceId: Id
    heardAt: Instant
    receivedAt: Instant
  }[],
): Promise<void> {
  if (heard.length === 0) return
  await tx
    .insertInto('codeBookHeard')
    .values(heard.map((one) => ({ ...one, shopId: tx.shopId })))
    .onConflict((conflict) => conflict.doNothing())
    .execute()
}
