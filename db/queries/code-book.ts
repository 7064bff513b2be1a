import { createHash } from 'node:crypto'
import { sql } from 'kysely'
import type { CodeBook, CodeBookItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import { canonicalText } from '../chain'
import type { ShopTx } from '../client'
import type { KeptUnseparated } from '../tables/code-book'

/** A published version without its items. */
export type BookVersion = { version: number; hash: string; publishedAt: Instant }

/** An item of a version: its place in the order, and the SHA-256 of its canonical JSON. */
export type PlacedItem = { kind: CodeBookItem['kind']; itemId: string; place: number; hash: string }

/** Where a version comes from. `madeBy` null: the command line or the shipped book. */
export type BookOrigin = {
  basedOn: number | null
  madeBy: Id | null
  note: string | null
  unseparated: readonly KeptUnseparated[]
}

const SHIPPED: BookOrigin = { basedOn: null, madeBy: null, note: null, unseparated: [] }

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

/** Answers the newest version whose items have this hash; undefined when none ever had. */
export async function versionByHash(tx: ShopTx, hash: string): Promise<BookVersion | undefined> {
  return await tx
    .selectFrom('codeBookVersion')
    .select(['version', 'hash', 'publishedAt'])
    .where('shopId', '=', tx.shopId)
    .where('hash', '=', hash)
    .orderBy('version', 'desc')
    .limit(1)
    .executeTakeFirst()
}

/** Answers a whole version, or the newest one; undefined when there is none such. Items keep their order. */
export async function publishedBook(tx: ShopTx, version?: number): Promise<CodeBook | undefined> {
  const found =
    version === undefined ? await publishedVersion(tx) : (await versionsByNumber(tx, [version]))[0]
  if (!found) return undefined
  const { hash, publishedAt } = found
  const rows = await tx
    .selectFrom('codeBookItem as i')
    .innerJoin('codeBookContent as c', (join) =>
      join.onRef('c.shopId', '=', 'i.shopId').onRef('c.hash', '=', 'i.hash'),
    )
    .select('c.body')
    .where('i.shopId', '=', tx.shopId)
    .where('i.version', '=', found.version)
    .orderBy('i.place')
    .execute()
  return { version: found.version, hash, publishedAt, items: rows.map((row) => row.body) }
}

/** Answers the pairs of faults that a version leaves together with a reason (rule CB11). */
export async function unseparatedOf(tx: ShopTx, version: number): Promise<KeptUnseparated[]> {
  const row = await tx
    .selectFrom('codeBookVersion')
    .select('unseparated')
    .where('shopId', '=', tx.shopId)
    .where('version', '=', version)
    .executeTakeFirst()
  return row?.unseparated ?? []
}

/** Answers which items a version has, in its order; none when there is no such version. */
export async function itemsOfVersion(tx: ShopTx, version: number): Promise<PlacedItem[]> {
  return await tx
    .selectFrom('codeBookItem')
    .select(['kind', 'itemId', 'place', 'hash'])
    .where('shopId', '=', tx.shopId)
    .where('version', '=', version)
    .orderBy('place')
    .execute()
}

/** Answers what is stored under these hashes, by hash. */
export async function contentByHash(
  tx: ShopTx,
  hashes: readonly string[],
): Promise<Map<string, CodeBookItem>> {
  const { rows } = await sql<{ hash: string; body: CodeBookItem }>`
    select hash, body from code_book_content
    where shop_id = ${tx.shopId} and hash = any(${hashes}::text[])
  `.execute(tx)
  return new Map(rows.map(({ hash, body }) => [hash, body]))
}

/** Answers an item of a version (null: the newest), and that version's number; undefined when it is not in it. */
export async function bookItem(
  tx: ShopTx,
  { kind, id, version = null }: { kind: CodeBookItem['kind']; id: string; version?: number | null },
): Promise<{ version: number; item: CodeBookItem } | undefined> {
  const of = version ?? (await publishedVersion(tx))?.version
  if (of === undefined) return undefined
  const row = await tx
    .selectFrom('codeBookItem as i')
    .innerJoin('codeBookContent as c', (join) =>
      join.onRef('c.shopId', '=', 'i.shopId').onRef('c.hash', '=', 'i.hash'),
    )
    .select('c.body')
    .where('i.shopId', '=', tx.shopId)
    .where('i.version', '=', of)
    .where('i.kind', '=', kind)
    .where('i.itemId', '=', id)
    .executeTakeFirst()
  return row && { version: of, item: row.body }
}

/** Answers the version that a job and those merged into it hold: the newest an entry was written with; null: none. */
export async function versionOfJob(tx: ShopTx, jobId: Id): Promise<number | null> {
  const { rows } = await sql<{ version: number | null }>`
    select max(e.book_version) as version from log_entry e
      join job j on j.shop_id = e.shop_id and j.id = e.job_id
    where e.shop_id = ${tx.shopId} and (j.id = ${jobId} or j.merged_root = ${jobId})
  `.execute(tx)
  return rows[0]?.version ?? null
}

/** Answers the ids of checks and swaps that a published version marks safe for guides: a job may hold any of them. */
export async function guideSafeIds(tx: ShopTx): Promise<Set<string>> {
  const { rows } = await sql<{ itemId: string }>`
    select distinct i.item_id from code_book_item i
      join code_book_content c on c.shop_id = i.shop_id and c.hash = i.hash
    where i.shop_id = ${tx.shopId} and i.kind in ('check', 'swap') and c.body ->> 'guideSafe' = 'true'
  `.execute(tx)
  return new Set(rows.map((row) => row.itemId))
}

/**
 * Publishes a version in a few statements and answers it. Items are told apart by kind and id, and stored
 * once for each content. Take a change number (book, the version as id). A version that is there is an error
 * of the caller. Nothing is checked here: `publishDraft` is the gate.
 */
export async function publishBook(
  tx: ShopTx,
  {
    version,
    items,
    publishedAt,
    publishedBy,
    origin = SHIPPED,
  }: {
    version: number
    items: readonly CodeBookItem[]
    publishedAt: Instant
    publishedBy: Id | null
    origin?: BookOrigin
  },
): Promise<BookVersion> {
  const hash = bookHash(items)
  const { unseparated, ...of } = origin
  await tx
    .insertInto('codeBookVersion')
    .values({
      shopId: tx.shopId,
      version,
      hash,
      publishedAt,
      publishedBy,
      ...of,
      unseparated: JSON.stringify(unseparated),
    })
    .execute()
  const placed = await storeItems(tx, items)
  await sql`
    insert into code_book_item (shop_id, version, kind, item_id, place, hash)
    select ${tx.shopId}::uuid, ${version}::integer, p.kind, p."itemId", p.place, p.hash
    from jsonb_to_recordset(${JSON.stringify(placed)}::jsonb)
      as p (kind text, "itemId" text, place integer, hash text)
  `.execute(tx)
  return { version, hash, publishedAt }
}

/** Stores what is not stored yet of these items, and answers each with its place (from 1) and hash. */
export async function storeItems(
  tx: ShopTx,
  items: readonly CodeBookItem[],
): Promise<PlacedItem[]> {
  const hashed = items.map((item) => ({ hash: itemHash(item), item }))
  await sql`
    insert into code_book_content (shop_id, hash, kind, item_id, body)
    select ${tx.shopId}::uuid, h.hash, h.item ->> 'kind', h.item ->> 'id', h.item
    from jsonb_to_recordset(${JSON.stringify(hashed)}::jsonb) as h (hash text, item jsonb)
    on conflict (shop_id, hash) do nothing
  `.execute(tx)
  return hashed.map(({ hash, item: { kind, id } }, n) => ({ kind, itemId: id, place: n + 1, hash }))
}

/** Answers the SHA-256 of an item's canonical JSON (RFC 8785), lower-case hex. */
export const itemHash = (item: CodeBookItem): string => sha256(canonicalText(item))

/** Answers the SHA-256 of the items' canonical JSON, lower-case hex, as every copy of a version carries it. */
export const bookHash = (items: readonly CodeBookItem[]): string =>
  sha256(canonicalText([...items]))

const sha256 = (text: string): string => createHash('sha256').update(text, 'utf8').digest('hex')
