import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'

/** A version, or the draft (`version` null), with where it comes from. */
export type BookHead = {
  version: number | null
  hash: string
  at: Instant
  basedOn: number | null
  madeBy: Id | null
  publishedBy: Id | null
  note: string | null
}

/** Answers the draft, if there is one, and the newest `limit` versions, the newest first. */
export async function bookHeads(tx: ShopTx, limit: number): Promise<BookHead[]> {
  const drafts = await tx
    .selectFrom('codeBookDraft')
    .select(['hash', 'madeAt as at', 'basedOn', 'madeBy', 'note'])
    .where('shopId', '=', tx.shopId)
    .execute()
  const versions = await tx
    .selectFrom('codeBookVersion')
    .select(['version', 'hash', 'publishedAt as at', 'basedOn', 'madeBy', 'publishedBy', 'note'])
    .where('shopId', '=', tx.shopId)
    .orderBy('version', 'desc')
    .limit(limit)
    .execute()
  return [...drafts.map((draft) => ({ ...draft, version: null, publishedBy: null })), ...versions]
}

/** Answers where the figures of the contents with these hashes come from, the most often named first, at most 12. */
export async function sourcesOf(tx: ShopTx, hashes: readonly string[]): Promise<string[]> {
  const { rows } = await sql<{ source: string }>`
    select body ->> 'source' as source from code_book_content
    where shop_id = ${tx.shopId} and hash = any(${hashes}::text[])
    group by 1 order by count(*) desc, 1 limit 12
  `.execute(tx)
  return rows.map(({ source }) => source)
}
