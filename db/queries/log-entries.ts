import { type Selectable, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { LogEntry, LogRow } from '@/lib/model/log-entry'
import type { Result } from '@/lib/model/result'
import type { Instant } from '@/lib/model/time'
import { type ChainProblem, canonicalText, linkHash, verifyChain } from '../chain'
import type { ShopTx } from '../client'
import type { LogEntryTable } from '../tables/log-entry'
import { lockShop } from './changes'

/**
 * Appends entries to their jobs' chains in the order given and answers them with their places. Locks
 * their logs and the shop's counter first, as the head of an insert-only chain cannot be locked. Ids must be new and
 * jobs present. Take a change number (logEntry) for each.
 */
export async function appendLogEntries(
  tx: ShopTx,
  given: { entries: readonly LogEntry[]; receivedAt: Instant },
): Promise<LogRow[]> {
  if (given.entries.length === 0) return []
  await lockShop(
    tx,
    given.entries.map(({ jobId }) => jobId),
  )
  const links = await linkEntries(tx, given)
  await insertLinks(tx, links)
  const { receivedAt } = given
  return links.rows.map(({ entry, order, hash }) => ({ ...entry, receivedAt, order, hash }))
}

type NewLink = {
  entry: LogEntry
  order: number
  canonical: string
  prevHash: string | null
  hash: string
}

/** Entries that follow on their jobs' chains as these stood when they were linked; `text` is the rows as JSON. */
export type NewLinks = { rows: readonly NewLink[]; text: string; receivedAt: Instant }

/**
 * Links entries to their jobs' chains without storing them: places, canonical texts and hashes. They hold
 * as long as nobody adds to these jobs, which the locks that lockShop takes alone can promise.
 */
export async function linkEntries(
  tx: ShopTx,
  { entries, receivedAt }: { entries: readonly LogEntry[]; receivedAt: Instant },
): Promise<NewLinks> {
  if (entries.length === 0) return { rows: [], text: '[]', receivedAt }
  const heads = await chainHeads(tx, [...new Set(entries.map((entry) => entry.jobId))])
  const rows = entries.map((entry) => {
    const head = heads.get(entry.jobId) ?? { order: 0, hash: null }
    const order = head.order + 1
    const canonical = canonicalText(recordOf(entry, { order, receivedAt, shop: tx.shopId }))
    const hash = linkHash(head.hash, canonical)
    heads.set(entry.jobId, { order, hash })
    return { entry, order, canonical, prevHash: head.hash, hash }
  })
  const plain = rows.map(({ entry, ...link }) => ({ ...entry, ...link, kind: entry.body.kind }))
  return { rows, text: JSON.stringify(plain), receivedAt }
}

/**
 * Stores linked entries, with the shop's counter locked by the caller. One statement with one parameter:
 * 500 entries as 9,000 parameters hold the lock three times as long.
 */
export async function insertLinks(tx: ShopTx, { rows, text, receivedAt }: NewLinks): Promise<void> {
  if (rows.length === 0) return
  await sql`
    insert into log_entry (shop_id, id, job_id, order_no, supersedes, happened_at, written_at, zone,
      author_id, device_id, engine_version, book_version, kind, body, received_at, canonical,
      prev_hash, hash)
    select ${tx.shopId}::uuid, e.id, e."jobId", e."order", e.supersedes, e."happenedAt", e."writtenAt",
      e.zone, e."authorId", e."deviceId", e."engineVersion", e."bookVersion", e.kind, e.body,
      ${receivedAt}::timestamptz, e.canonical, e."prevHash", e.hash
    from json_to_recordset(${text}::json) as e (id uuid, "jobId" uuid,
      "order" integer, supersedes uuid, "happenedAt" timestamptz, "writtenAt" timestamptz, zone text,
      "authorId" uuid, "deviceId" uuid, "engineVersion" text, "bookVersion" integer, kind text,
      body jsonb, canonical text, "prevHash" text, hash text)
  `.execute(tx)
}

/** What the hash of an entry covers. */
const recordOf = (entry: LogEntry, at: { order: number; receivedAt: Instant; shop: Id }) => ({
  ...at,
  entry,
})

async function chainHeads(tx: ShopTx, jobIds: Id[]) {
  const { rows } = await sql<{ jobId: Id; order: number; hash: string }>`
    select j.id as job_id, e.order_no as order, e.hash
    from unnest(${jobIds}::uuid[]) as j (id) cross join lateral (
      select order_no, hash from log_entry
      where shop_id = ${tx.shopId} and job_id = j.id order by order_no desc limit 1) e
  `.execute(tx)
  return new Map<Id, { order: number; hash: string | null }>(rows.map((row) => [row.jobId, row]))
}

/** Answers a job's log in chain order. */
export async function listLog(tx: ShopTx, jobId: Id): Promise<LogRow[]> {
  const rows = await entries(tx).where('jobId', '=', jobId).orderBy('orderNo').execute()
  return rows.map(toLogRow)
}

/**
 * Answers the log of a job and of those merged into it, as it came in: each chain in its own order, the
 * chains laid into each other by the time at which they reached the shop.
 */
export async function listWholeLog(tx: ShopTx, jobId: Id): Promise<LogRow[]> {
  const rows = await entries(tx)
    .where(
      sql<boolean>`job_id in (select g.id from job g where g.shop_id = log_entry.shop_id
        and (g.id = ${jobId} or g.merged_root = ${jobId}))`,
    )
    .orderBy(sql`max(received_at) over (partition by job_id order by order_no)`)
    .orderBy('jobId')
    .orderBy('orderNo')
    .execute()
  return rows.map(toLogRow)
}

/** Answers the entries with these ids that are there, in no order. */
export async function logEntriesById(tx: ShopTx, ids: readonly Id[]): Promise<LogRow[]> {
  if (ids.length === 0) return []
  return (await entries(tx).where('id', 'in', ids).execute()).map(toLogRow)
}

/**
 * Answers the entries that decide on others, in no order: those with these ids, and of these jobs every way
 * out, every photo and whatever points back.
 */
export async function decidingEntries(
  tx: ShopTx,
  { ids, jobIds }: { ids: readonly Id[]; jobIds: readonly Id[] },
): Promise<LogRow[]> {
  if (ids.length === 0 && jobIds.length === 0) return []
  const rows = await entries(tx)
    .where(({ and, eb, or }) =>
      or([
        eb('id', 'in', [...ids, NO_ID]),
        and([
          eb('jobId', 'in', [...jobIds, NO_ID]),
          or([eb('kind', 'in', ['wayOut', 'photo']), eb('supersedes', 'is not', null)]),
        ]),
      ]),
    )
    .execute()
  return rows.map(toLogRow)
}
/** Of nobody: keeps an empty list of ids a list. */
const NO_ID = '00000000-0000-0000-0000-000000000000'

/** Answers where these entries stand in their jobs' chains, by id: for whoever has their words. */
export async function placesOfEntries(
  tx: ShopTx,
  ids: readonly Id[],
): Promise<Pick<LogRow, 'id' | 'jobId' | 'order' | 'receivedAt'>[]> {
  if (ids.length === 0) return []
  return await tx
    .selectFrom('logEntry')
    .select(['id', 'jobId', 'orderNo as order', 'receivedAt'])
    .where('shopId', '=', tx.shopId)
    .where('id', '=', sql<Id>`any(${ids}::uuid[])`)
    .execute()
}

/** Answers which of these ids are entries, with the job each is of. */
export async function jobsOfEntries(tx: ShopTx, ids: readonly Id[]): Promise<Map<Id, Id>> {
  if (ids.length === 0) return new Map()
  const rows = await tx
    .selectFrom('logEntry')
    .select(['id', 'jobId'])
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .execute()
  return new Map(rows.map((row) => [row.id, row.jobId]))
}

/** Answers how many entries of the job's chain hold, or where it breaks: hash, order, or a column. */
export async function verifyLog(tx: ShopTx, jobId: Id): Promise<Result<number, ChainProblem>> {
  const rows = await entries(tx).where('jobId', '=', jobId).orderBy('orderNo').execute()
  const links = rows.map((row) => ({ ...row, order: row.orderNo }))
  return verifyChain(links, (link) => {
    const { order, hash, receivedAt, ...entry } = toLogRow(link)
    return link.canonical === canonicalText(recordOf(entry, { order, receivedAt, shop: tx.shopId }))
  })
}

const entries = (tx: ShopTx) =>
  tx.selectFrom('logEntry').selectAll().where('shopId', '=', tx.shopId)

const toLogRow = (row: Selectable<LogEntryTable>): LogRow => ({
  id: row.id,
  jobId: row.jobId,
  supersedes: row.supersedes,
  happenedAt: row.happenedAt,
  writtenAt: row.writtenAt,
  zone: row.zone,
  authorId: row.authorId,
  deviceId: row.deviceId,
  engineVersion: row.engineVersion,
  bookVersion: row.bookVersion,
  body: row.body,
  receivedAt: row.receivedAt,
  order: row.orderNo,
  hash: row.hash,
})
