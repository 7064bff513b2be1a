import { type Selectable, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { PartLine, PartLineState, PartRequest, PartRequestRow } from '@/lib/model/part-request'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { PartLineTable, PartRequestTable } from '../tables/job'
import { lineColumns } from './part-lines'

/** A request as it came in: who asked, and on which phone (null: at the desk). */
export type NewPartRequest = {
  request: PartRequest
  askedBy: Id
  askedOn: Id | null
  receivedAt: Instant
}

/** Stores requests with their lines, each line as asked. Take a change number (partRequest) for each. */
export async function insertPartRequests(
  tx: ShopTx,
  requests: readonly NewPartRequest[],
): Promise<void> {
  if (requests.length === 0) return
  const shopId = tx.shopId
  await tx
    .insertInto('partRequest')
    .values(
      requests.map(({ request: { lines: _, advice, ...columns }, ...rest }) => ({
        shopId,
        ...columns,
        ...rest,
        advice: advice === null ? null : JSON.stringify(advice),
      })),
    )
    .execute()
  await tx
    .insertInto('partLine')
    .values(
      requests.flatMap(({ request: { id, lines } }) =>
        lines.map((line, index) => lineColumns(shopId, { requestId: id, lineNo: index + 1, line })),
      ),
    )
    .execute()
}

/**
 * Answers requests with their lines, the oldest first: of one job and those merged into it, of these ids,
 * or all of the shop.
 */
export async function listPartRequests(
  tx: ShopTx,
  only: { jobId?: Id; ids?: readonly Id[] } = {},
): Promise<PartRequestRow[]> {
  if (only.ids?.length === 0) return []
  let query = tx
    .selectFrom('partRequest')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where('deletedAt', 'is', null)
    .orderBy('askedAt')
    .orderBy('id')
  const { jobId } = only
  if (jobId !== undefined) {
    query = query.where(
      sql<boolean>`job_id in (select g.id from job g where g.shop_id = part_request.shop_id
        and (g.id = ${jobId} or g.merged_root = ${jobId}))`,
    )
  }
  if (only.ids) query = query.where('id', 'in', only.ids)
  const requests = await query.execute()
  if (requests.length === 0) return []
  const lines = await tx
    .selectFrom('partLine')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where(
      'requestId',
      'in',
      requests.map((request) => request.id),
    )
    .orderBy('lineNo')
    .execute()
  const byRequest = new Map<Id, typeof lines>(requests.map((request) => [request.id, []]))
  for (const line of lines) byRequest.get(line.requestId)?.push(line)
  return requests.map((request) => toRow(request, byRequest.get(request.id) ?? []))
}

/** Answers a request; undefined when it is not this shop's. */
export async function findPartRequest(tx: ShopTx, id: Id): Promise<PartRequestRow | undefined> {
  return (await listPartRequests(tx, { ids: [id] }))[0]
}

/**
 * Moves a line on when it still stands at `from`; answers false when it does not. Take a change number
 * (partRequest) for its request.
 */
export async function movePartLine(
  tx: ShopTx,
  { lineId, from, to }: { lineId: Id; from: PartLineState; to: PartLineState },
): Promise<boolean> {
  const done = await tx
    .updateTable('partLine')
    .set({ state: to })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', lineId)
    .where('state', '=', from)
    .executeTakeFirst()
  return done.numUpdatedRows === 1n
}

/** Stores what the parts desk found out about a line. Take a change number (partRequest). */
export async function setPartLine(
  tx: ShopTx,
  {
    lineId,
    number,
    price,
  }: { lineId: Id; number: string | null; price: PartRequest['lines'][number]['price'] },
): Promise<void> {
  await tx
    .updateTable('partLine')
    .set({ number, priceMinor: price?.minor ?? null, priceCurrency: price?.currency ?? null })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', lineId)
    .execute()
}

const toRow = (
  row: Selectable<PartRequestTable>,
  lines: Selectable<PartLineTable>[],
): PartRequestRow => ({
  id: row.id,
  jobId: row.jobId,
  askedAt: row.askedAt,
  askedBy: row.askedBy,
  urgency: row.urgency,
  note: row.note,
  advice: row.advice,
  ...(row.revived ? { revived: true } : {}),
  lines: lines.map(toPartLine),
})

type StoredLine = Omit<
  PartLineTable,
  'shopId' | 'requestId' | 'lineNo' | 'state' | 'wanted' | 'countedOut'
> & {
  state: PartLineState
}

/** A stored line in the words of the model: price with its currency, or none. */
export function toPartLine(row: StoredLine): PartLine & { state: PartLineState } {
  const { priceMinor, priceCurrency } = row
  return {
    id: row.id,
    part: row.part,
    words: row.words,
    position: row.position,
    quantity: row.quantity,
    choice: row.choice,
    number: row.number,
    price:
      priceMinor === null || priceCurrency === null
        ? null
        : { minor: priceMinor, currency: priceCurrency },
    condemnedBy: row.condemnedBy,
    state: row.state,
  }
}
