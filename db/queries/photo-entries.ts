import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { ShopTx } from '../client'

/** What a log entry says of a photo: the job it is of, and size and kind when the entry says them. */
export type PhotoNaming = { jobId: Id; bytes: number | null; mime: string | null }

/**
 * Answers the first entry by this author that names the photo: a photo entry, or a code with the picture
 * of the dash. Undefined when none has arrived.
 */
export async function findPhotoNaming(
  tx: ShopTx,
  { hash, authorId }: { hash: string; authorId: Id },
): Promise<PhotoNaming | undefined> {
  const { rows } = await sql<PhotoNaming>`
    select job_id, (body -> 'photo' ->> 'bytes')::integer as bytes, body -> 'photo' ->> 'mime' as mime
    from log_entry
    where shop_id = ${tx.shopId} and author_id = ${authorId} and kind in ('photo', 'code')
      and coalesce(body -> 'photo' ->> 'hash', body -> 'context' ->> 'photo') = ${hash}
    order by received_at, order_no limit 1
  `.execute(tx)
  return rows[0]
}
