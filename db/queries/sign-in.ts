import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { Role } from '@/lib/model/role'
import type { Instant } from '@/lib/model/time'
import type { NoShopTx, ShopTx } from '../client'

/** A membership that an e-mail address may sign in to, with the hash to check first. */
export type SignInCandidate = {
  shopId: Id
  personId: Id
  name: string | null
  roles: Role[]
  passwordHash: string
}

/** Answers the memberships of this e-mail address (case does not count), one per shop; none: empty. */
export async function findSignIn(tx: NoShopTx, email: string): Promise<SignInCandidate[]> {
  const { rows } = await sql<SignInCandidate>`select * from find_sign_in(${email})`.execute(tx)
  return rows
}

/** Answers whose session this is; undefined when it is unknown, over, revoked, or the membership is. */
export async function liveSession(
  tx: NoShopTx,
  { id, now }: { id: Id; now: Instant },
): Promise<Actor | undefined> {
  const { rows } = await sql<Actor>`select * from find_session(${id}, ${now})`.execute(tx)
  return rows[0]
}

/** Stores a session of the shop's person. */
export async function insertSession(
  tx: ShopTx,
  session: { id: Id; personId: Id; createdAt: Instant; expiresAt: Instant },
): Promise<void> {
  await tx
    .insertInto('session')
    .values({ ...session, shopId: tx.shopId, revokedAt: null })
    .execute()
}

/** Ends one session for good. */
export async function revokeSession(
  tx: ShopTx,
  { id, now }: { id: Id; now: Instant },
): Promise<void> {
  await tx
    .updateTable('session')
    .set({ revokedAt: now })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .where('revokedAt', 'is', null)
    .execute()
}

/** Ends every session of a person for good. */
export async function revokeSessionsOf(
  tx: ShopTx,
  { personId, now }: { personId: Id; now: Instant },
): Promise<void> {
  await tx
    .updateTable('session')
    .set({ revokedAt: now })
    .where('shopId', '=', tx.shopId)
    .where('personId', '=', personId)
    .where('revokedAt', 'is', null)
    .execute()
}
