import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { ShopTx } from '../client'
import type { Change } from './changes'
import type { NewLinks } from './log-entries'
import type { StoredOp } from './sync-ops'

/** Entries that only add to jobs, as they were linked, with their ops and numbers, and what they rest on. */
export type Evidence = {
  links: NewLinks
  stored: readonly StoredOp[]
  changes: readonly Change[]
  /** The shop's last change number when all this was worked out. */
  readAt: number
  /** Jobs and rows that must not have changed since, and ops that must not have come. */
  rests: { jobIds: readonly Id[]; entityIds: readonly string[]; opIds: readonly string[] }
}

/**
 * Writes evidence, locks the shop's counter and takes the change numbers, in one statement; false, and nothing
 * is written, when something it rests on changed meanwhile. The logs of its jobs and the counter stay locked
 * until the transaction ends either way.
 */
export async function takeEvidence(tx: ShopTx, of: Evidence): Promise<boolean> {
  const { links, stored, changes, readAt, rests } = of
  const { rows } = await sql<{ taken: boolean }>`
    select taken, locked_ms from take_evidence(${tx.shopId}, ${readAt}, ${rests.jobIds}::uuid[],
      ${rests.entityIds}::text[], ${rests.opIds}::text[], ${links.receivedAt}, ${links.text}::json,
      ${JSON.stringify(stored)}::json, ${JSON.stringify(changes)}::jsonb)
  `.execute(tx)
  return rows[0]?.taken === true
}
