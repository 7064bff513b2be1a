import { type Selectable, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Result } from '@/lib/model/result'
import type { Instant } from '@/lib/model/time'
import { type ChainProblem, canonicalText, linkHash, verifyChain } from '../chain'
import type { ShopTx } from '../client'
import type { AuditEntryTable } from '../tables/log-entry'
import { lockShop } from './changes'

/**
 * Something a person or the server did. `detail` holds ids and figures, never a name, phone or e-mail
 * address, as the trail cannot be erased. `jobId` null: the shop's own chain.
 */
export type AuditEntry = {
  id: Id
  jobId: Id | null
  at: Instant
  actorId: Id | null
  deviceId: Id | null
  action: string
  entity: string
  entityId: string
  detail: Record<string, unknown>
}

/** Appends to the audit trail, each entry to its job's chain or the shop's. Locks the shop's counter first. */
export async function appendAudit(tx: ShopTx, entries: readonly AuditEntry[]): Promise<void> {
  if (entries.length === 0) return
  await lockShop(tx)
  const heads = await chainHeads(tx, [...new Set(entries.map((entry) => chainOf(tx, entry)))])
  const rows = entries.map((entry) => {
    const chain = chainOf(tx, entry)
    const head = heads.get(chain) ?? { order: 0, hash: null }
    const order = head.order + 1
    const canonical = canonicalText({ entry, order, shop: tx.shopId })
    const hash = linkHash(head.hash, canonical)
    heads.set(chain, { order, hash })
    const detail = JSON.stringify(entry.detail)
    return {
      ...entry,
      detail,
      shopId: tx.shopId,
      chain,
      orderNo: order,
      canonical,
      prevHash: head.hash,
      hash,
    }
  })
  await tx.insertInto('auditEntry').values(rows).execute()
}

/** Answers the audit trail of a job, or the shop's own for null, in chain order. */
export async function listAudit(tx: ShopTx, jobId: Id | null): Promise<AuditEntry[]> {
  return (await chain(tx, jobId).execute()).map(toAuditEntry)
}

/** Answers how many entries of that chain hold, or where it breaks. */
export async function verifyAudit(
  tx: ShopTx,
  jobId: Id | null,
): Promise<Result<number, ChainProblem>> {
  const links = (await chain(tx, jobId).execute()).map((row) => ({ ...row, order: row.orderNo }))
  return verifyChain(links, (link) => {
    const entry = toAuditEntry(link)
    return link.canonical === canonicalText({ entry, order: link.order, shop: tx.shopId })
  })
}

const chainOf = (tx: ShopTx, entry: { jobId: Id | null }) => entry.jobId ?? tx.shopId

const chain = (tx: ShopTx, jobId: Id | null) =>
  tx
    .selectFrom('auditEntry')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where('chain', '=', chainOf(tx, { jobId }))
    .orderBy('orderNo')

async function chainHeads(tx: ShopTx, chains: Id[]) {
  const { rows } = await sql<{ chain: Id; order: number; hash: string }>`
    select c.id as chain, e.order_no as order, e.hash
    from unnest(${chains}::uuid[]) as c (id) cross join lateral (
      select order_no, hash from audit_entry
      where shop_id = ${tx.shopId} and chain = c.id order by order_no desc limit 1) e
  `.execute(tx)
  return new Map<Id, { order: number; hash: string | null }>(rows.map((row) => [row.chain, row]))
}

const toAuditEntry = (row: Selectable<AuditEntryTable>): AuditEntry => ({
  id: row.id,
  jobId: row.jobId,
  at: row.at,
  actorId: row.actorId,
  deviceId: row.deviceId,
  action: row.action,
  entity: row.entity,
  entityId: row.entityId,
  detail: row.detail,
})
