import { sql } from 'kysely'
import type { DeskJob } from '@/lib/model/desk'
import type { Id } from '@/lib/model/id'
import type { LogRow } from '@/lib/model/log-entry'
import { asShop, type ShopTx } from '../client'
import { lastChange } from './changes'
import { boardRows, toBoardJob, type Whose } from './desk-board'
import { listLog } from './log-entries'
import { listModels, machinesById } from './machines'
import { listPartRequests } from './part-requests'
import { listPeople } from './people'
import { photosByHash } from './photos'
import { getShop } from './shop'

/** One job with everything the shop holds of it; null when there is none, or not one of `whose`. */
export function readDeskJob(shopId: Id, jobId: Id, whose: Whose): Promise<DeskJob | null> {
  return asShop(shopId, async (tx) => {
    const seq = await lastChange(tx)
    const row = await boardRows(tx, whose).where('job.id', '=', jobId).executeTakeFirst()
    if (!row) return null
    const { job, machineWords } = toBoardJob(row)
    const [machine] = await machinesById(tx, [job.machineId])
    const [model] = machine?.modelId ? await listModels(tx, [machine.modelId]) : []
    const entries = await listLog(tx, jobId)
    return {
      seq,
      shop: await getShop(tx),
      job,
      machineWords,
      reachedAt: await reachedAt(tx, jobId),
      machine: machine ?? null,
      model: model ?? null,
      entries,
      photos: await photosByHash(tx, hashesOf(entries)),
      parts: await listPartRequests(tx, { jobId }),
      people: await listPeople(tx),
    }
  })
}

/** The photos the log names; the same picture may have come in under another job first. */
const hashesOf = (entries: readonly LogRow[]) =>
  entries.flatMap(({ body }) => (body.kind === 'photo' ? [body.photo.hash] : []))

/** When a phone that opened this job or wrote into it last reached us. */
async function reachedAt(tx: ShopTx, jobId: Id): Promise<string | null> {
  const row = await tx
    .selectFrom('device')
    .select(({ fn }) => fn.max('lastSeenAt').as('at'))
    .where('shopId', '=', tx.shopId)
    .where(
      sql<boolean>`(id in (select e.device_id from log_entry e
          where e.shop_id = device.shop_id and e.job_id = ${jobId})
        or id = (select j.opened_on from job j where j.shop_id = device.shop_id and j.id = ${jobId}))`,
    )
    .executeTakeFirst()
  return row?.at ?? null
}
