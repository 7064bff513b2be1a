import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { ShopTx } from '../client'

/** A machine as ops are judged by it; `isPurged`: taken back so long ago that its tombstone is gone. */
export type MachineStand = {
  isFleet: boolean
  isDropped: boolean
  isPurged: boolean
  /** The machine that stands for it, after a merge. */
  mergedInto: Id | null
}

/** Answers how these machines stand, also those that were taken back, by id. */
export async function machineStands(
  tx: ShopTx,
  ids: readonly Id[],
): Promise<Map<Id, MachineStand>> {
  if (ids.length === 0) return new Map()
  const rows = await tx
    .selectFrom('machine as m')
    .select(['m.id', 'm.fleet', 'm.deletedAt', 'm.mergedRoot'])
    .select(
      sql<boolean>`m.deleted_at is not null and not exists (select 1 from change_log c
        where c.shop_id = m.shop_id and c.entity = 'machine' and c.entity_id = m.id::text)`.as(
        'isPurged',
      ),
    )
    .where('m.shopId', '=', tx.shopId)
    .where('m.id', 'in', ids)
    .execute()
  return new Map(
    rows.map(({ id, fleet, deletedAt, mergedRoot, isPurged }) => [
      id,
      { isFleet: fleet, isDropped: deletedAt !== null, isPurged, mergedInto: mergedRoot },
    ]),
  )
}

/** Answers which phones (null: the desk) opened jobs on these machines, by machine. */
export async function openersOnMachines(
  tx: ShopTx,
  ids: readonly Id[],
): Promise<Map<Id, (Id | null)[]>> {
  const openers = new Map<Id, (Id | null)[]>()
  if (ids.length === 0) return openers
  const rows = await tx
    .selectFrom('job')
    .select(['machineId', 'openedOn'])
    .where('shopId', '=', tx.shopId)
    .where('machineId', 'in', ids)
    .where('deletedAt', 'is', null)
    .execute()
  for (const { machineId, openedOn } of rows) {
    openers.set(machineId, [...(openers.get(machineId) ?? []), openedOn])
  }
  return openers
}
