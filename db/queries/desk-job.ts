import { sql } from 'kysely'
import type { DeskJob } from '@/lib/model/desk'
import type { Id } from '@/lib/model/id'
import type { LogRow } from '@/lib/model/log-entry'
import { asShop, type ShopTx } from '../client'
import { lastChange } from './changes'
import { boardRows, toBoardJob, type Whose } from './desk-board'
import { listWholeLog } from './log-entries'
import { findMachine, listModels } from './machines'
import { leadOfJob, listMerged } from './merges'
import { listPartRequests } from './part-requests'
import { listPeople } from './people'
import { photosByHash } from './photos'
import { getShop } from './shop'

/**
 * One job with everything the shop holds of it and of those merged into it; null when there is none, or
 * not one of `whose`. The id of a merged job answers the one that goes on.
 */
export function readDeskJob(shopId: Id, named: Id, whose: Whose): Promise<DeskJob | null> {
  return asShop(shopId, async (tx) => {
    const seq = await lastChange(tx)
    const jobId = (await leadOfJob(tx, named)) ?? named
    const row = await boardRows(tx, whose).where('job.id', '=', jobId).executeTakeFirst()
    if (!row) return null
    const { job, machineWords } = toBoardJob(row)
    const machine = await findMachine(tx, job.machineId)
    const [model] = machine?.modelId ? await listModels(tx, [machine.modelId]) : []
    const entries = await listWholeLog(tx, jobId)
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
      phones: await phonesOf(tx, entries),
      parts: await listPartRequests(tx, { jobId }),
      merged: await listMerged(tx, jobId),
      people: await listPeople(tx),
    }
  })
}

/** The photos and voice notes the log names; the same one may have come in under another job first. */
const hashesOf = (entries: readonly LogRow[]) =>
  entries.flatMap(({ body }) => {
    if (body.kind === 'photo') return [body.photo.hash]
    return body.kind === 'voice' ? [body.voice.hash] : []
  })

/** The phones these entries were written on. */
async function phonesOf(tx: ShopTx, entries: readonly LogRow[]): Promise<DeskJob['phones']> {
  const ids = [...new Set(entries.map(({ deviceId }) => deviceId))]
  if (ids.length === 0) return []
  return await tx
    .selectFrom('device')
    .select(['id', 'name', 'lastSeenAt as reachedAt'])
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .orderBy('id')
    .execute()
}

/** When a phone that opened this job or wrote into it last reached us. */
async function reachedAt(tx: ShopTx, jobId: Id): Promise<string | null> {
  const row = await tx
    .selectFrom('device')
    .select(({ fn }) => fn.max('lastSeenAt').as('at'))
    .where('shopId', '=', tx.shopId)
    .where(
      sql<boolean>`(id in (select e.device_id from log_entry e
          join job g on g.shop_id = e.shop_id and g.id = e.job_id
          where e.shop_id = device.shop_id and (g.id = ${jobId} or g.merged_root = ${jobId}))
        or id in (select j.opened_on from job j where j.shop_id = device.shop_id
          and (j.id = ${jobId} or j.merged_root = ${jobId})))`,
    )
    .executeTakeFirst()
  return row?.at ?? null
}
