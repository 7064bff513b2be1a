import { sql } from 'kysely'
import type { MachineModel } from '@/lib/model/code-book'
import type { DeskJob } from '@/lib/model/desk'
import type { Id } from '@/lib/model/id'
import type { LogRow } from '@/lib/model/log-entry'
import type { Machine } from '@/lib/model/machine'
import type { PartRequestRow } from '@/lib/model/part-request'
import type { PhotoRow } from '@/lib/model/photo'
import { asShop, type ShopTx } from '../client'
import { lastChange } from './changes'
import { boardRows, toBoardJob, type Whose } from './desk-board'
import { toPartLine } from './desk-parts'
import { listPeople } from './people'
import { getShop } from './shop'

/** One job with everything the shop holds of it; null when there is none, or not one of `whose`. */
export function readDeskJob(shopId: Id, jobId: Id, whose: Whose): Promise<DeskJob | null> {
  return asShop(shopId, async (tx) => {
    const seq = await lastChange(tx)
    const row = await boardRows(tx, whose).where('job.id', '=', jobId).executeTakeFirst()
    if (!row) return null
    const { job, machineWords } = toBoardJob(row)
    const { machine, model } = await machineOf(tx, job.machineId)
    return {
      seq,
      shop: await getShop(tx),
      job,
      machineWords,
      reachedAt: await reachedAt(tx, jobId),
      machine,
      model,
      entries: await entriesOf(tx, jobId),
      photos: await photosOf(tx, jobId),
      parts: await partsOf(tx, jobId),
      people: await listPeople(tx),
    }
  })
}

async function machineOf(
  tx: ShopTx,
  machineId: Id,
): Promise<{ machine: Machine | null; model: MachineModel | null }> {
  const row = await tx
    .selectFrom('machine')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where('id', '=', machineId)
    .executeTakeFirst()
  if (!row) return { machine: null, model: null }
  const { shopId: _shop, updatedAt: _changed, deletedAt: _gone, ...machine } = row
  const model = row.modelId
    ? await tx
        .selectFrom('machineModel')
        .select(['id', 'maker', 'model', 'features', 'specSheet', 'source'])
        .where('shopId', '=', tx.shopId)
        .where('id', '=', row.modelId)
        .executeTakeFirst()
    : undefined
  return { machine, model: model ?? null }
}

/** When a phone that opened this job or wrote into it last reached us. */
async function reachedAt(tx: ShopTx, jobId: Id): Promise<string | null> {
  const row = await tx
    .selectFrom('device')
    .select(sql<string | null>`max(last_seen_at)`.as('at'))
    .where('shopId', '=', tx.shopId)
    .where((eb) =>
      eb.or([
        eb(
          'id',
          'in',
          eb
            .selectFrom('logEntry')
            .select('deviceId')
            .where('shopId', '=', tx.shopId)
            .where('jobId', '=', jobId),
        ),
        eb(
          'id',
          'in',
          eb
            .selectFrom('job')
            .select('openedOn')
            .where('shopId', '=', tx.shopId)
            .where('id', '=', jobId)
            .$narrowType<{ openedOn: string }>(),
        ),
      ]),
    )
    .executeTakeFirst()
  return row?.at ?? null
}

function entriesOf(tx: ShopTx, jobId: Id): Promise<LogRow[]> {
  return tx
    .selectFrom('logEntry')
    .select([
      'id',
      'jobId',
      'supersedes',
      'happenedAt',
      'writtenAt',
      'zone',
      'authorId',
      'deviceId',
      'engineVersion',
      'bookVersion',
      'body',
      'receivedAt',
      'orderNo as order',
      'hash',
    ])
    .where('shopId', '=', tx.shopId)
    .where('jobId', '=', jobId)
    .orderBy('orderNo')
    .execute()
}

function photosOf(tx: ShopTx, jobId: Id): Promise<PhotoRow[]> {
  return tx
    .selectFrom('photo')
    .select(['hash', 'jobId', 'bytes', 'mime', 'receivedAt'])
    .where('shopId', '=', tx.shopId)
    .where((eb) =>
      eb.or([
        eb('jobId', '=', jobId),
        // The same picture may have come in under another job first.
        sql<boolean>`hash in (select e.body -> 'photo' ->> 'hash' from log_entry e
          where e.shop_id = photo.shop_id and e.job_id = ${jobId} and e.kind = 'photo')`,
      ]),
    )
    .orderBy('receivedAt')
    .execute()
}

async function partsOf(tx: ShopTx, jobId: Id): Promise<PartRequestRow[]> {
  const requests = await tx
    .selectFrom('partRequest')
    .select(['id', 'jobId', 'askedAt', 'askedBy', 'urgency', 'note', 'advice'])
    .where('shopId', '=', tx.shopId)
    .where('jobId', '=', jobId)
    .where('deletedAt', 'is', null)
    .orderBy('askedAt')
    .execute()
  if (requests.length === 0) return []
  const lines = await tx
    .selectFrom('partLine')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where(
      'requestId',
      'in',
      requests.map(({ id }) => id),
    )
    .orderBy('lineNo')
    .execute()
  return requests.map((request) => ({
    ...request,
    lines: lines.filter(({ requestId }) => requestId === request.id).map(toPartLine),
  }))
}
