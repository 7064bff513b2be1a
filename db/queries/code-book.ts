import { createHash } from 'node:crypto'
import { sql } from 'kysely'
import type { CodeBook, CodeBookItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import { canonicalText } from '../chain'
import type { ShopTx } from '../client'

/** A published version without its items. */
export type BookVersion = { version: number; hash: string; publishedAt: Instant }

/** Answers the newest published version and who published it (null: it was shipped); undefined before the first. */
export async function publishedVersion(
  tx: ShopTx,
): Promise<(BookVersion & { publishedBy: Id | null }) | undefined> {
  return await tx
    .selectFrom('codeBookVersion')
    .select(['version', 'hash', 'publishedAt', 'publishedBy'])
    .where('shopId', '=', tx.shopId)
    .orderBy('version', 'desc')
    .limit(1)
    .executeTakeFirst()
}

/** Answers the published versions with these numbers, in no order. */
export async function versionsByNumber(
  tx: ShopTx,
  versions: readonly number[],
): Promise<BookVersion[]> {
  if (versions.length === 0) return []
  return await tx
    .selectFrom('codeBookVersion')
    .select(['version', 'hash', 'publishedAt'])
    .where('shopId', '=', tx.shopId)
    .where('version', 'in', versions)
    .execute()
}

/** Answers a whole version, or the newest one; undefined when there is none such. Items keep their order. */
export async function publishedBook(tx: ShopTx, version?: number): Promise<CodeBook | undefined> {
  const found =
    version === undefined ? await publishedVersion(tx) : (await versionsByNumber(tx, [version]))[0]
  if (!found) return undefined
  const { hash, publishedAt } = found
  const rows = await tx
    .selectFrom('codeBookItem')
    .select('body')
    .where('shopId', '=', tx.shopId)
    .where('version', '=', found.version)
    .orderBy('place')
    .execute()
  return { version: found.version, hash, publishedAt, items: rows.map((row) => row.body) }
}

/** Answers an item of the newest version, and that version's number; undefined when it is not in it. */
export async function bookItem(
  tx: ShopTx,
  { kind, id }: { kind: CodeBookItem['kind']; id: string },
): Promise<{ version: number; item: CodeBookItem } | undefined> {
  const newest = await publishedVersion(tx)
  if (!newest) return undefined
  const row = await tx
    .selectFrom('codeBookItem')
    .select('body')
    .where('shopId', '=', tx.shopId)
    .where('version', '=', newest.version)
    .where('kind', '=', kind)
    .where('itemId', '=', id)
    .executeTakeFirst()
  return row && { version: newest.version, item: row.body }
}

/** Answers the ids of checks and swaps that the newest version marks safe for guides. */
export async function guideSafeIds(tx: ShopTx): Promise<Set<string>> {
  const { rows } = await sql<{ itemId: string }>`
    select item_id from code_book_item
    where shop_id = ${tx.shopId} and kind in ('check', 'swap') and body ->> 'guideSafe' = 'true'
      and version = (select max(version) from code_book_version where shop_id = ${tx.shopId})
  `.execute(tx)
  return new Set(rows.map((row) => row.itemId))
}

/**
 * Publishes a version in one statement per table and answers it. Items are told apart by kind and id.
 * Take a change number (book, the version as id). A version that is there is an error of the caller.
 */
export async function publishBook(
  tx: ShopTx,
  {
    version,
    items,
    publishedAt,
    publishedBy,
  }: {
    version: number
    items: readonly CodeBookItem[]
    publishedAt: Instant
    publishedBy: Id | null
  },
): Promise<BookVersion> {
  const hash = bookHash(items)
  await tx
    .insertInto('codeBookVersion')
    .values({ shopId: tx.shopId, version, hash, publishedAt, publishedBy })
    .execute()
  await sql`
    insert into code_book_item (shop_id, version, kind, item_id, place, body)
    select ${tx.shopId}::uuid, ${version}::integer, i.value ->> 'kind', i.value ->> 'id', i.n, i.value
    from jsonb_array_elements(${JSON.stringify(items)}::jsonb) with ordinality as i (value, n)
  `.execute(tx)
  return { version, hash, publishedAt }
}

/** Answers the SHA-256 of the items' canonical JSON, lower-case hex, as every copy of a version carries it. */
export function bookHash(items: readonly CodeBookItem[]): string {
  return createHash('sha256')
    .update(canonicalText([...items]), 'utf8')
    .digest('hex')
}
