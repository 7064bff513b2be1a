import { sql } from 'kysely'
import type { Role } from '@/lib/model/role'
import type { ShopTx } from '../client'

/** Answers the e-mail addresses of everyone who holds this role today, in order of address. */
export async function emailsOfRole(tx: ShopTx, role: Role): Promise<string[]> {
  const rows = await tx
    .selectFrom('membership as m')
    .innerJoin('personContact as c', (join) =>
      join.onRef('c.shopId', '=', 'm.shopId').onRef('c.personId', '=', 'm.personId'),
    )
    .select('c.email')
    .where('m.shopId', '=', tx.shopId)
    .where('m.revokedAt', 'is', null)
    .where(sql<boolean>`${role} = any(m.roles)`)
    .where('c.email', 'is not', null)
    .orderBy('c.email')
    .execute()
  return rows.flatMap((row) => row.email ?? [])
}
