import { sql } from 'kysely'
import type { BoardJob, DeskBoard } from '@/lib/model/desk'
import type { Id } from '@/lib/model/id'
import { machineWords } from '@/lib/model/machine'
import { asShop, type ShopTx } from '../client'
import { lastChange } from './changes'
import { alsoEnteredOf } from './field-history'
import { membersOf, toJob } from './jobs'
import { machineOfJob } from './machines'

/** Whose jobs: every job of the shop, or those a person opened or is assigned to. */
export type Whose = { kind: 'all' } | { kind: 'own'; personId: Id }

const DAY_MS = 24 * 3600 * 1000

/**
 * The board as of one change number: open jobs, and those closed within 24 hours before `now` (ms since
 * 1970). The order is the screen's business.
 */
export function readBoard(shopId: Id, whose: Whose, now: number): Promise<DeskBoard> {
  return asShop(shopId, async (tx) => {
    const seq = await lastChange(tx)
    const rows = await boardRows(tx, whose)
      .where((eb) =>
        eb.or([
          eb('job.state', '!=', 'closed'),
          eb('job.closedAt', '>', new Date(now - DAY_MS).toISOString()),
        ]),
      )
      .orderBy('job.openedAt')
      .orderBy('job.id')
      .execute()
    const jobs = rows.map(toBoardJob)
    return {
      seq,
      whose: whose.kind,
      open: jobs.filter(({ job }) => job.state !== 'closed'),
      closed: jobs.filter(({ job }) => job.state === 'closed').reverse(),
    }
  })
}

/** Jobs with what the shop has heard of them; the caller adds its own conditions. */
export function boardRows(tx: ShopTx, whose: Whose) {
  const query = tx
    .selectFrom('job')
    .innerJoin('machine', (join) =>
      join.onRef('machine.shopId', '=', 'job.shopId').on('machine.id', '=', machineOfJob()),
    )
    .leftJoin('machineModel', (join) =>
      join
        .onRef('machineModel.shopId', '=', 'machine.shopId')
        .onRef('machineModel.id', '=', 'machine.modelId'),
    )
    .selectAll('job')
    .select([
      'machine.unitNumber',
      'machine.makerTyped',
      'machine.modelTyped',
      'machineModel.maker',
      'machineModel.model',
      assigned().as('assigned'),
      entryCount().as('entries'),
      heardAt().as('heardAt'),
      photosMissing().as('photosMissing'),
      partsOpen().as('partsOpen'),
    ])
    .where('job.shopId', '=', tx.shopId)
    .select(() => [
      alsoEnteredOf(tx, sql.ref('job.id')).as('alsoEntered'),
      membersOf(tx).as('members'),
    ])
    .where('job.deletedAt', 'is', null)
    .where('job.mergedInto', 'is', null)
  if (whose.kind === 'all') return query
  const { personId } = whose
  return query.where((eb) =>
    eb.or([
      eb('job.openedBy', '=', personId),
      sql<boolean>`exists (select 1 from job m where m.shop_id = job.shop_id
        and m.merged_root = job.id and m.opened_by = ${personId})`,
      eb.exists(
        eb
          .selectFrom('jobAssignment')
          .select('personId')
          .whereRef('jobAssignment.shopId', '=', 'job.shopId')
          .whereRef('jobAssignment.jobId', '=', 'job.id')
          .where('personId', '=', personId),
      ),
    ]),
  )
}

/** The job and those merged into it: what hangs on any of them hangs on the one that goes on (R13). */
const OF_IT = sql<string[]>`(array[job.id] || array(select m.id from job m
    where m.shop_id = job.shop_id and m.merged_root = job.id))`

const assigned = () =>
  sql<string[]>`array(select a.person_id::text from job_assignment a
    where a.shop_id = job.shop_id and a.job_id = job.id order by a.assigned_at, a.person_id)`

const entryCount = () =>
  sql<number>`(select count(*)::int from log_entry e
    where e.shop_id = job.shop_id and e.job_id = any(${OF_IT}))`

/** When the last entry from the field came in; lines written at the desk (desk-closing.ts) are none. */
const heardAt = () =>
  sql<string | null>`(select max(e.received_at) from log_entry e
    where e.shop_id = job.shop_id and e.job_id = any(${OF_IT})
      and e.device_id <> e.author_id)`

/** Photos and voice notes that living or struck entries name and whose bytes have not come. */
const photosMissing = () =>
  sql<number>`(select count(distinct e.body -> e.kind ->> 'hash')::int from log_entry e
    where e.shop_id = job.shop_id and e.job_id = any(${OF_IT}) and e.kind in ('photo', 'voice')
      and not exists (select 1 from photo p
        where p.shop_id = e.shop_id and p.hash = e.body -> e.kind ->> 'hash'))`

const partsOpen = () =>
  sql<number>`(select count(*)::int from part_line l join part_request r
      on r.shop_id = l.shop_id and r.id = l.request_id
    where r.shop_id = job.shop_id and r.job_id = any(${OF_IT}) and r.deleted_at is null
      and l.state not in ('fitted', 'returned', 'credited', 'cancelled'))`

type BoardRow = Awaited<ReturnType<ReturnType<typeof boardRows>['execute']>>[number]

/** A row of boardRows in the words of the model. */
export function toBoardJob(row: BoardRow): BoardJob {
  return {
    job: toJob({ ...row, assignedTo: row.assigned }),
    machineWords: machineWords(row),
    closedAt: row.closedAt,
    entries: row.entries,
    heardAt: row.heardAt,
    photosMissing: row.photosMissing,
    partsOpen: row.partsOpen,
  }
}
