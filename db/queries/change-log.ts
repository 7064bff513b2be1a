import { type RawBuilder, type SqlBool, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { LogRow } from '@/lib/model/log-entry'
import type { Actor } from '@/lib/model/person'
import type { Role } from '@/lib/model/role'
import type { ShopTx } from '../client'
import type { ChangeEntity } from './changes'
import { versionsByNumber } from './code-book'
import { listWithdrawals } from './code-book-withdrawal'
import type { LogStand } from './exchange'
import { jobsById, onPhoneOf } from './jobs'
import { logEntriesById, placesOfEntries } from './log-entries'
import { listBags, listMeters, listModels, machinesById } from './machines'
import { listPartRequests } from './part-requests'
import { findMembership, peopleById } from './people'
import { photosByHash } from './photos'
import { getShop } from './shop'

/** Where a device stands: the same shape as the sync protocol's cursor (P12). */
export type LogCursor = { epoch: string; shop: Id; scopeVersion: number; seq: number }

/** One row of a page. `evict`: it left this person's scope; then and for `deleted` the row is null. */
export type LogPageRow = {
  seq: number
  entity: ChangeEntity
  id: string
  jobId: Id | null
  state: 'present' | 'deleted' | 'evict'
  row: unknown
  /** Only its place in the chain is told: the phone has the entry's words. */
  own?: true
}

export type LogPage =
  | { kind: 'page'; rows: LogPageRow[]; cursor: LogCursor; more: boolean }
  | { kind: 'reset'; cursor: LogCursor }
  | { kind: 'signIn' }

export type PullArgs = {
  actor: Pick<Actor, 'personId'>
  cursor: LogCursor | null
  limit: number
  deviceId?: Id | null
  /** For a phone that wants no word twice: entries whose words it has, by id, and no hashes of the others. */
  brief?: { own: ReadonlyMap<Id, { jobId: Id }> } | null
}

/** A page ends at 256 KB of rows (P7). */
const PAGE_BYTES = 256 * 1024

/**
 * Answers what changed for this person after the cursor, in change order, each row once at its last
 * change (P7). The roles are read from the membership, never from the caller (P11). Null for a cursor:
 * from the start. `deviceId`: the phone that asks, so that it is also told of rows made on it that are
 * out of scope by now. `reset`: the cursor is of another epoch, shop or scope, of the future, or from
 * before the tombstones that are purged (P10); a pull begun since then goes on, whatever its number.
 * `signIn`: there is no live membership. The cursor of an empty page moves on all the same.
 */
export async function pullPage(
  tx: ShopTx,
  { actor, cursor, limit, deviceId = null, brief = null }: PullArgs,
): Promise<LogPage> {
  const membership = await findMembership(tx, actor.personId)
  if (!membership) return { kind: 'signIn' }
  const counter = await readCounter(tx)
  const { seq: upTo } = counter
  const start = {
    epoch: epochText(counter),
    shop: tx.shopId,
    scopeVersion: membership.scopeVersion,
    seq: 0,
  }
  if (cursor !== null && !fits(cursor, start, counter)) return { kind: 'reset', cursor: start }
  const after = cursor?.seq ?? 0
  const { personId } = actor
  const scope = { shopId: tx.shopId, personId, roles: membership.roles, deviceId }
  const heads = await readHeads(tx, scope, { after, upTo, limit: limit + 1 })
  const { rows, isCut } = cutPage(await withRows(tx, heads.slice(0, limit), brief))
  const more = isCut || heads.length > limit
  const seq = more ? (rows.at(-1)?.seq ?? after) : upTo
  return { kind: 'page', rows, cursor: { ...start, seq }, more }
}

/** The page of one who has everything, told without another question; null when there is something to tell. */
export function evenPage(stand: LogStand, shop: Id, cursor: LogCursor): LogPage | null {
  const { scopeVersion, seq } = stand
  const start = { epoch: epochText(stand), shop, scopeVersion, seq: 0 }
  if (cursor.seq !== seq || !fits(cursor, start, stand)) return null
  return { kind: 'page', rows: [], cursor: { ...start, seq }, more: false }
}

/**
 * Answers up to `limit` changes after `seq` as they were numbered, for the desk's stream of events. What
 * is of a merged job is told as of the one that goes on.
 */
export async function changesAfter(
  tx: ShopTx,
  { seq, limit }: { seq: number; limit: number },
): Promise<{ seq: number; entity: string; id: string; jobId: Id | null; state: string }[]> {
  return await tx
    .selectFrom('changeLog as c')
    .leftJoin('job as j', (join) =>
      join.onRef('j.shopId', '=', 'c.shopId').onRef('j.id', '=', 'c.jobId'),
    )
    .select(['c.seq', 'c.entity', 'c.entityId as id', 'c.state'])
    .select(sql<Id | null>`coalesce(j.merged_root, c.job_id)`.as('jobId'))
    .where('c.shopId', '=', tx.shopId)
    .where('c.seq', '>', seq)
    .orderBy('c.seq')
    .limit(limit)
    .execute()
}

type Counter = { epoch: string; seq: number; horizon: number }
type Scope = { shopId: Id; personId: Id; roles: readonly Role[]; deviceId: Id | null }
type Head = Omit<LogPageRow, 'row'>

async function readCounter(tx: ShopTx): Promise<Counter> {
  return await tx
    .selectFrom('shopCounter')
    .select(['epoch', 'seq', 'horizon'])
    .where('shopId', '=', tx.shopId)
    .executeTakeFirstOrThrow()
}

/** The epoch as cursors carry it: with the horizon it was made under, once there is one. */
const epochText = ({ epoch, horizon }: Counter): string =>
  horizon === 0 ? epoch : `${epoch}.${horizon}`

function fits(cursor: LogCursor, start: LogCursor, counter: Counter): boolean {
  const [epoch, madeUnder = '0'] = cursor.epoch.split('.')
  const isOurs =
    epoch === counter.epoch &&
    cursor.shop === start.shop &&
    cursor.scopeVersion === start.scopeVersion
  const { horizon } = counter
  const isWhole = cursor.seq === 0 || cursor.seq >= horizon || Number(madeUnder) >= horizon
  return isOurs && isWhole && cursor.seq <= counter.seq
}

/**
 * The last change of each entity within (after, upTo]; rows of a merged job travel as of the one that goes
 * on. The counter was read by an earlier statement, so
 * every number up to it is visible in this one. A row that is gone or out of scope is told only to
 * those who could hold it: it had a number at or before their cursor, or it was made on their phone.
 */
async function readHeads(
  tx: ShopTx,
  scope: Scope,
  { after, upTo, limit }: { after: number; upTo: number; limit: number },
): Promise<Head[]> {
  if (after >= upTo) return []
  const { rows } = await sql<Head>`
    select c.seq, c.entity, c.entity_id as id, coalesce(r.merged_root, c.job_id) as job_id,
      case when v.visible then c.state else 'evict' end as state
    from change_log c
      left join job r on r.shop_id = c.shop_id and r.id = c.job_id and c.entity <> 'job'
      cross join lateral (select ${isVisible(scope)} as visible) v
    where c.shop_id = ${scope.shopId} and c.seq > ${after} and c.seq <= ${upTo}
      and not exists (select 1 from change_log l
        where l.shop_id = c.shop_id and l.entity = c.entity and l.entity_id = c.entity_id
          and l.seq > c.seq and l.seq <= ${upTo})
      and ((v.visible and c.state = 'present')
        or exists (select 1 from change_log b
          where b.shop_id = c.shop_id and b.entity = c.entity and b.entity_id = c.entity_id
            and b.seq <= ${after})
        or ${wasMadeOn(scope)})
    order by c.seq
    limit ${limit}
  `.execute(tx)
  return rows
}

/** Rows that a phone made are on it before they have a number. */
function wasMadeOn({ shopId, deviceId }: Scope): RawBuilder<SqlBool> {
  if (deviceId === null) return sql<SqlBool>`false`
  const made = (table: string, column: string) => sql<SqlBool>`exists (select 1
    from ${sql.table(table)} m where m.shop_id = ${shopId} and m.id = c.entity_id::uuid
      and ${sql.ref(`m.${column}`)} = ${deviceId})`
  // A case, so that only ids of these tables are read as a uuid.
  return sql<SqlBool>`case c.entity
    when 'logEntry' then ${made('log_entry', 'device_id')}
    when 'partRequest' then ${made('part_request', 'asked_on')}
    when 'job' then ${made('job', 'opened_on')}
    else false end`
}

const FIELD: readonly Role[] = ['mechanic', 'guide']
const ALL: readonly Role[] = ['dispatcher', 'owner']

/** What each role's devices hold (P11); a person's roles are a set, so it is the union. */
function isVisible(scope: Scope): RawBuilder<SqlBool> {
  const has = (roles: readonly Role[]) => scope.roles.some((role) => roles.includes(role))
  if (has(ALL)) return sql<SqlBool>`true`
  const parts: RawBuilder<SqlBool>[] = []
  if (scope.roles.length > 0) {
    parts.push(sql`c.entity in ('shop', 'person', 'machineModel', 'machine', 'book',
      'bookWithdrawal')`)
  }
  if (has(['parts'])) parts.push(sql`c.entity = 'partRequest'`)
  if (has(FIELD)) {
    parts.push(
      sql`c.entity = 'meterProfile'`,
      sql`c.entity = 'bag' and exists (select 1 from bag g where g.shop_id = ${scope.shopId}
        and g.id::text = c.entity_id and g.person_id = ${scope.personId})`,
      sql`c.entity in ('job', 'logEntry', 'partRequest', 'photo')
        and ${onPhoneOf(scope, sql.ref('c.jobId'))}`,
    )
  }
  return parts.length === 0
    ? sql<SqlBool>`false`
    : sql<SqlBool>`(${sql.join(
        parts.map((part) => sql`(${part})`),
        sql` or `,
      )})`
}

type Keyed = readonly [id: string, row: unknown]
const keyed = <R>(rows: readonly R[], key: (row: R) => string): Keyed[] =>
  rows.map((row) => [key(row), row])

/** How the rows of each entity are read, as the phone and the desk are to have them. */
const READ: Record<ChangeEntity, (tx: ShopTx, ids: string[]) => Promise<Keyed[]>> = {
  shop: async (tx) => keyed([await getShop(tx)], (row) => row.id),
  person: async (tx, ids) => keyed(await peopleById(tx, ids), (row) => row.id),
  machineModel: async (tx, ids) => keyed(await listModels(tx, ids), (row) => row.id),
  machine: async (tx, ids) => keyed(await machinesById(tx, ids), (row) => row.id),
  meterProfile: async (tx, ids) => keyed(await listMeters(tx, ids), (row) => row.id),
  bag: async (tx, ids) => keyed(await listBags(tx, ids), (row) => row.id),
  job: async (tx, ids) => keyed(await jobsById(tx, ids), (row) => row.id),
  logEntry: async (tx, ids) => keyed(await logEntriesById(tx, ids), (row) => row.id),
  partRequest: async (tx, ids) => keyed(await listPartRequests(tx, { ids }), (row) => row.id),
  photo: async (tx, hashes) => keyed(await photosByHash(tx, hashes), (row) => row.hash),
  book: async (tx, ids) =>
    keyed(await versionsByNumber(tx, ids.map(Number)), (row) => String(row.version)),
  bookWithdrawal: async (tx, ids) => keyed(await listWithdrawals(tx, ids), (row) => row.id),
}

/** Puts the rows to the heads. One deleted since then is told as such: its own number follows. */
async function withRows(
  tx: ShopTx,
  heads: readonly Head[],
  brief: PullArgs['brief'],
): Promise<LogPageRow[]> {
  const wanted = new Map<ChangeEntity, string[]>()
  const own: Id[] = []
  for (const head of heads) {
    if (head.state !== 'present') continue
    if (isOwn(head, brief)) {
      own.push(head.id)
      continue
    }
    const ids = wanted.get(head.entity) ?? []
    wanted.set(head.entity, ids)
    ids.push(head.id)
  }
  const found = new Map<ChangeEntity, Map<string, unknown>>()
  for (const [entity, ids] of wanted) found.set(entity, new Map(await READ[entity](tx, ids)))
  const places = new Map(keyed(await placesOfEntries(tx, own), (row) => row.id))
  return heads.map((head) => {
    if (head.state !== 'present') return { ...head, row: null }
    const place = places.get(head.id)
    if (place !== undefined) return { ...head, row: place, own: true }
    const row = found.get(head.entity)?.get(head.id)
    if (row === undefined) return { ...head, state: 'deleted', row: null }
    return { ...head, row: brief && head.entity === 'logEntry' ? withoutLink(row) : row }
  })
}

/** One that travels under another job, after a merge, is told in full. */
const isOwn = ({ entity, id, jobId }: Head, brief: PullArgs['brief']): boolean =>
  entity === 'logEntry' && jobId !== null && brief?.own.get(id)?.jobId === jobId

function withoutLink(row: unknown): unknown {
  const { hash: _, ...rest } = row as LogRow
  return rest
}

/** At least one row, and no more than fit the page. */
function cutPage(rows: readonly LogPageRow[]): { rows: LogPageRow[]; isCut: boolean } {
  let bytes = 0
  const end = rows.findIndex((row, index) => {
    bytes += Buffer.byteLength(JSON.stringify(row))
    return index > 0 && bytes > PAGE_BYTES
  })
  return end === -1 ? { rows: [...rows], isCut: false } : { rows: rows.slice(0, end), isCut: true }
}
