import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { PartyTable } from '../tables/person'

/** Somebody outside the shop: a rider, an owner, who pays, who has a machine on hire (R9). */
export type Party = {
  id: Id
  kind: PartyTable['kind']
  name: string | null
  phone: string | null
  email: string | null
}

/** Stores a party and, apart from it, how to reach it; an id that is there is left as it is. */
export async function insertParty(tx: ShopTx, { id, kind, ...contact }: Party): Promise<void> {
  await tx
    .insertInto('party')
    .values({ shopId: tx.shopId, id, kind })
    .onConflict((on) => on.doNothing())
    .execute()
  await tx
    .insertInto('partyContact')
    .values({ shopId: tx.shopId, partyId: id, ...contact })
    .onConflict((on) => on.doNothing())
    .execute()
}

/** Erases how a party was called and reached; consents and bookings keep its id (R23). */
export async function eraseParty(tx: ShopTx, { id, now }: { id: Id; now: Instant }): Promise<void> {
  await tx
    .deleteFrom('partyContact')
    .where('shopId', '=', tx.shopId)
    .where('partyId', '=', id)
    .execute()
  await tx
    .updateTable('party')
    .set({ erasedAt: now })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .execute()
}
