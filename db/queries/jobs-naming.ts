import { sql } from 'kysely'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import type { ShopTx } from '../client'
import { jobsById } from './jobs'

/** No more jobs than these are looked into for one withdrawal, the newest first (a choice). */
const MOST_JOBS = 200

/**
 * Answers the jobs that a withdrawal may concern, the newest first: those whose log names the check or swap, open
 * or closed; of a fault or a whole version every open one, as any of them may suspect it, and closed ones that
 * were mended of the fault.
 */
export async function jobsNaming(
  tx: ShopTx,
  { what, itemId }: Pick<BookWithdrawal, 'what' | 'itemId'>,
): Promise<Job[]> {
  const ofAll = what === 'fault' || what === 'version'
  const { rows } = await sql<{ id: Id }>`
    select distinct j.id from job j
    where j.shop_id = ${tx.shopId} and j.merged_into is null
      and ((${ofAll} and j.state <> 'closed') or exists (
        select 1 from log_entry e join job g on g.shop_id = e.shop_id and g.id = e.job_id
        where e.shop_id = j.shop_id and (g.id = j.id or g.merged_root = j.id)
          and ${itemId}::text in (e.body ->> 'checkId', e.body ->> 'swapId', e.body ->> 'fault')))
    order by j.id desc limit ${MOST_JOBS}
  `.execute(tx)
  return await jobsById(
    tx,
    rows.map(({ id }) => id),
  )
}
