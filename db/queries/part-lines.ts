import { type Selectable, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { PartLine, PartLineState } from '@/lib/model/part-request'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { PartLineTable } from '../tables/job'

/** How far a line has come, and how many are wanted: `wanted` is the sum asked for, null for the quantity. */
export type LineStand = {
  state: PartLineState
  quantity: number
  wanted: number | null
  countedOut: boolean
}

/** A request as ops are judged by it; `isPurged`: taken back so long ago that its tombstone is gone. */
export type RequestStand = {
  id: Id
  jobId: Id
  isDropped: boolean
  isPurged: boolean
  lines: ReadonlyMap<Id, LineStand>
}

/** Answers how these requests stand, also those that were taken back, by id. */
export async function requestStands(
  tx: ShopTx,
  ids: readonly Id[],
): Promise<Map<Id, RequestStand>> {
  if (ids.length === 0) return new Map()
  const rows = await tx
    .selectFrom('partRequest as r')
    .select(['r.id', 'r.jobId', 'r.deletedAt'])
    .select((eb) => [
      sql<boolean>`r.deleted_at is not null and not exists (select 1 from change_log c
        where c.shop_id = r.shop_id and c.entity = 'partRequest' and c.entity_id = r.id::text)`.as(
        'isPurged',
      ),
      sql<StoredLine[] | null>`(${eb
        .selectFrom('partLine as l')
        .select(
          sql`jsonb_agg(jsonb_build_object('id', l.id, 'state', l.state, 'quantity', l.quantity,
            'wanted', l.wanted, 'countedOut', l.counted_out) order by l.line_no)`.as('lines'),
        )
        .whereRef('l.shopId', '=', 'r.shopId')
        .whereRef('l.requestId', '=', 'r.id')})`.as('lines'),
    ])
    .where('r.shopId', '=', tx.shopId)
    .where('r.id', 'in', ids)
    .execute()
  return new Map(
    rows.map(({ id, jobId, deletedAt, isPurged, lines }) => {
      const stands = (lines ?? []).map(({ id: lineId, ...stand }) => [lineId, stand] as const)
      return [id, { id, jobId, isDropped: deletedAt !== null, isPurged, lines: new Map(stands) }]
    }),
  )
}

type StoredLine = LineStand & { id: Id }

/** Answers which of these ids are lines of a request. */
export async function knownLines(tx: ShopTx, ids: readonly Id[]): Promise<Set<Id>> {
  if (ids.length === 0) return new Set()
  const rows = await tx
    .selectFrom('partLine')
    .select('id')
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .execute()
  return new Set(rows.map((row) => row.id))
}

/** A line in the columns of its table, at its place in the request. */
export const lineColumns = (
  shopId: Id,
  { requestId, lineNo, line }: { requestId: Id; lineNo: number; line: PartLine },
) => {
  const { price, ...columns } = line
  return {
    shopId,
    requestId,
    lineNo,
    ...columns,
    priceMinor: price?.minor ?? null,
    priceCurrency: price?.currency ?? null,
  }
}

/** Adds a line at the end of its request. Take a change number (partRequest). */
export async function addPartLine(
  tx: ShopTx,
  { requestId, line }: { requestId: Id; line: PartLine },
): Promise<void> {
  const last = await tx
    .selectFrom('partLine')
    .select(({ fn }) => fn.max('lineNo').as('no'))
    .where('shopId', '=', tx.shopId)
    .where('requestId', '=', requestId)
    .executeTakeFirst()
  const lineNo = (last?.no ?? 0) + 1
  await tx
    .insertInto('partLine')
    .values(lineColumns(tx.shopId, { requestId, lineNo, line }))
    .execute()
}

/** Stores how a line stands now. Take a change number (partRequest). */
export async function setLineStand(
  tx: ShopTx,
  { lineId, stand }: { lineId: Id; stand: LineStand },
): Promise<void> {
  const { state, quantity, wanted, countedOut } = stand
  await tx
    .updateTable('partLine')
    .set({ state, quantity, wanted, countedOut } satisfies Partial<Selectable<PartLineTable>>)
    .where('shopId', '=', tx.shopId)
    .where('id', '=', lineId)
    .execute()
}

/**
 * Takes a row back or lets it stand again; `revived`: it was written into meanwhile. Take a change number
 * of it, `deleted` for one taken back.
 */
export async function setDropped(
  tx: ShopTx,
  {
    entity,
    id,
    droppedAt,
    revived,
  }: { entity: 'partRequest' | 'machine'; id: Id; droppedAt: Instant | null; revived: boolean },
): Promise<void> {
  await tx
    .updateTable(entity)
    .set({ deletedAt: droppedAt, ...(revived ? { revived } : {}) })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .execute()
}
