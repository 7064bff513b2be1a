import { sql } from 'kysely'
import type { CodeBookItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { KeptUnseparated } from '../tables/code-book'
import { bookHash, type PlacedItem, storeItems } from './code-book'

/** The draft of a shop's code book: what is published next. A shop has one or none. */
export type BookDraft = {
  hash: string
  basedOn: number | null
  madeAt: Instant
  madeBy: Id | null
  note: string | null
  unseparated: KeptUnseparated[]
}

/** Answers the draft without its items; undefined when there is none. */
export async function findDraft(tx: ShopTx): Promise<BookDraft | undefined> {
  return await tx
    .selectFrom('codeBookDraft')
    .select(['hash', 'basedOn', 'madeAt', 'madeBy', 'note', 'unseparated'])
    .where('shopId', '=', tx.shopId)
    .executeTakeFirst()
}

/** Answers the draft's items in their order; none without a draft. */
export async function draftItems(tx: ShopTx): Promise<CodeBookItem[]> {
  const rows = await tx
    .selectFrom('codeBookDraftItem as d')
    .innerJoin('codeBookContent as c', (join) =>
      join.onRef('c.shopId', '=', 'd.shopId').onRef('c.hash', '=', 'd.hash'),
    )
    .select('c.body')
    .where('d.shopId', '=', tx.shopId)
    .orderBy('d.place')
    .execute()
  return rows.map((row) => row.body)
}

/** Answers which items the draft has, in its order; none without a draft. */
export async function placedOfDraft(tx: ShopTx): Promise<PlacedItem[]> {
  return await tx
    .selectFrom('codeBookDraftItem')
    .select(['kind', 'itemId', 'place', 'hash'])
    .where('shopId', '=', tx.shopId)
    .orderBy('place')
    .execute()
}

/** Puts a draft down. One that is there is an error of the caller (23505): drop it first. */
export async function saveDraft(
  tx: ShopTx,
  draft: Omit<BookDraft, 'hash'> & { items: readonly CodeBookItem[] },
): Promise<{ hash: string }> {
  const { items, unseparated, ...of } = draft
  const hash = bookHash(items)
  await tx
    .insertInto('codeBookDraft')
    .values({ shopId: tx.shopId, hash, ...of, unseparated: JSON.stringify(unseparated) })
    .execute()
  const placed = await storeItems(tx, items)
  await sql`
    insert into code_book_draft_item (shop_id, kind, item_id, place, hash)
    select ${tx.shopId}::uuid, p.kind, p."itemId", p.place, p.hash
    from jsonb_to_recordset(${JSON.stringify(placed)}::jsonb)
      as p (kind text, "itemId" text, place integer, hash text)
  `.execute(tx)
  return { hash }
}

/** Drops the draft with its list of items; false when there is none. Contents stay stored. */
export async function dropDraft(tx: ShopTx): Promise<boolean> {
  const gone = await tx
    .deleteFrom('codeBookDraft')
    .where('shopId', '=', tx.shopId)
    .returning('hash')
    .execute()
  return gone.length > 0
}
