import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { ShopTx } from '../client'

/**
 * What a log entry says of a photo or a voice note: the job it is of, which of the two it is, and size,
 * kind and length when the entry says them.
 */
export type PhotoNaming = {
  jobId: Id
  is: 'photo' | 'voice'
  bytes: number | null
  mime: string | null
  seconds: number | null
}

/**
 * Answers the first entry by this author that names the file: a photo entry, a voice note, or a code
 * with the picture of the dash. Undefined when none has arrived.
 */
export async function findPhotoNaming(
  tx: ShopTx,
  { hash, authorId }: { hash: string; authorId: Id },
): Promise<PhotoNaming | undefined> {
  const { rows } = await sql<PhotoNaming>`
    select job_id, case when kind = 'voice' then 'voice' else 'photo' end as is,
      (coalesce(body -> 'photo', body -> 'voice') ->> 'bytes')::integer as bytes,
      coalesce(body -> 'photo', body -> 'voice') ->> 'mime' as mime,
      (body -> 'voice' ->> 'seconds')::double precision as seconds
    from log_entry
    where shop_id = ${tx.shopId} and author_id = ${authorId} and kind in ('photo', 'voice', 'code')
      and coalesce(body -> 'photo' ->> 'hash', body -> 'voice' ->> 'hash',
        body -> 'context' ->> 'photo') = ${hash}
    order by received_at, order_no limit 1
  `.execute(tx)
  return rows[0]
}
