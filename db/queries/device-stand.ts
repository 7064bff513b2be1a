import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { Sender } from './exchange'
import type { Quarantine } from './quarantine'

/**
 * As whom a phone is heard, and why what it sends is kept apart from every job (R22): with the roles as
 * they were when it was revoked or the membership ended. Null: its person is nobody of the shop's any more.
 */
export function standOf({
  device,
  person,
}: Pick<Sender, 'device' | 'person'>): { actor: Actor; quarantine: Quarantine | null } | null {
  if (person === null) return null
  const { actor, isMember } = person
  if (device.revokedAt !== null) {
    const roles = device.revokedRoles ?? actor.roles
    return { actor: { ...actor, roles }, quarantine: 'deviceRevoked' }
  }
  return { actor, quarantine: isMember ? null : 'membershipEnded' }
}

/** A phone that said at its last contact what it still held, and was not heard since. */
export type Silent = { id: Id; lastSeenAt: Instant; ops: number; photos: number }

/**
 * Answers the other phones of this phone's person that told of unsent work when they were last heard, the
 * one heard last first (P22). Not those whose store is known to be gone, nor those that were taken out.
 */
export async function silentPhones(tx: ShopTx, id: Id): Promise<Silent[]> {
  const rows = await tx
    .selectFrom('device as d')
    .innerJoin('device as own', (join) =>
      join.onRef('own.shopId', '=', 'd.shopId').onRef('own.personId', '=', 'd.personId'),
    )
    .select(['d.id', 'd.lastSeenAt', 'd.heldOps as ops', 'd.heldPhotos as photos'])
    .where('d.shopId', '=', tx.shopId)
    .where('own.id', '=', id)
    .where('d.id', '!=', id)
    .where('d.replacedBy', 'is', null)
    .where('d.revokedAt', 'is', null)
    .where('d.wipeToldAt', 'is', null)
    .where(sql<boolean>`d.held_ops + d.held_photos > 0`)
    .orderBy('d.lastSeenAt', 'desc')
    .execute()
  return rows.map(({ lastSeenAt, ops, photos, ...row }) => ({
    ...row,
    lastSeenAt: lastSeenAt ?? '',
    ops: ops ?? 0,
    photos: photos ?? 0,
  }))
}
