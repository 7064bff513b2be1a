import { sql } from 'kysely'
import type { DeskParts } from '@/lib/model/desk'
import type { Id } from '@/lib/model/id'
import { machineWords } from '@/lib/model/machine'
import type { PartLineState } from '@/lib/model/part-request'
import { asShop, type ShopTx } from '../client'
import { lastChange } from './changes'
import { machineOfJob } from './machines'
import { toPartLine } from './part-requests'
import { getShop } from './shop'

/** How long a line that needs nothing more stays in the table, in ms: 14 days (choice). */
const DONE_KEPT_MS = 14 * 24 * 3600 * 1000
const DONE: PartLineState[] = ['fitted', 'returned', 'credited', 'cancelled']

/**
 * The parts desk's table as of one change number: every open line, and done ones asked for within the
 * 14 days before `now` (ms since 1970); newest request first.
 */
export function readParts(shopId: Id, now: number): Promise<DeskParts> {
  return asShop(shopId, async (tx) => {
    const seq = await lastChange(tx)
    const shop = await getShop(tx)
    const rows = await lineRows(tx)
      .where((eb) =>
        eb.or([
          eb('partLine.state', 'not in', DONE),
          eb('partRequest.askedAt', '>', new Date(now - DONE_KEPT_MS).toISOString()),
        ]),
      )
      .execute()
    return { seq, currency: shop.currency, lines: rows.map(toDeskLine) }
  })
}

function lineRows(tx: ShopTx) {
  return tx
    .selectFrom('partLine')
    .innerJoin('partRequest', (join) =>
      join
        .onRef('partRequest.shopId', '=', 'partLine.shopId')
        .onRef('partRequest.id', '=', 'partLine.requestId'),
    )
    .innerJoin('job', (join) =>
      join.onRef('job.shopId', '=', 'partRequest.shopId').on('job.id', '=', leadOfRequest()),
    )
    .innerJoin('machine', (join) =>
      join.onRef('machine.shopId', '=', 'job.shopId').on('machine.id', '=', machineOfJob()),
    )
    .leftJoin('machineModel', (join) =>
      join
        .onRef('machineModel.shopId', '=', 'machine.shopId')
        .onRef('machineModel.id', '=', 'machine.modelId'),
    )
    .leftJoin('personContact', (join) =>
      join
        .onRef('personContact.shopId', '=', 'partRequest.shopId')
        .onRef('personContact.personId', '=', 'partRequest.askedBy'),
    )
    .selectAll('partLine')
    .select([
      'partRequest.jobId',
      'partRequest.askedAt',
      'partRequest.urgency',
      'partRequest.note',
      'partRequest.advice',
      'personContact.name as askedBy',
      'job.number as jobNumber',
      'job.complaint',
      'machine.unitNumber',
      'machine.makerTyped',
      'machine.modelTyped',
      'machineModel.maker',
      'machineModel.model',
    ])
    .where('partLine.shopId', '=', tx.shopId)
    .where('partRequest.deletedAt', 'is', null)
    .orderBy('partRequest.askedAt', 'desc')
    .orderBy('partRequest.id')
    .orderBy('partLine.lineNo')
}

/** The job of a request, or the one that goes on for it (R13). */
const leadOfRequest = () =>
  sql<Id>`(select coalesce(o.merged_root, o.id) from job o
    where o.shop_id = part_request.shop_id and o.id = part_request.job_id)`

type LineRow = Awaited<ReturnType<ReturnType<typeof lineRows>['execute']>>[number]

function toDeskLine(row: LineRow): DeskParts['lines'][number] {
  return {
    line: toPartLine(row),
    request: {
      id: row.requestId,
      jobId: row.jobId,
      askedAt: row.askedAt,
      urgency: row.urgency,
      note: row.note,
      advice: row.advice,
    },
    askedBy: row.askedBy,
    jobNumber: row.jobNumber,
    complaint: row.complaint.words,
    machineWords: machineWords(row),
  }
}
