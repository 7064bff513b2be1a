import { sql } from 'kysely'
import { AppError } from '@/lib/model/result'
import type { Shop } from '@/lib/model/shop'
import type { ShopTx } from '../client'

/** Answers the shop's settings; throws when this transaction's shop does not exist. */
export async function getShop(tx: ShopTx): Promise<Shop> {
  const found = await findShop(tx)
  if (!found) throw new AppError('noSuchShop', { context: { shopId: tx.shopId } })
  return found
}

/** Answers the shop's settings; undefined when there is no such shop. */
export async function findShop(tx: ShopTx): Promise<Shop | undefined> {
  return await tx
    .selectFrom('shop')
    .select([
      'shopId as id',
      'name',
      'zone',
      'currency',
      'perMinuteMinor',
      'towMinor',
      'recoveryMinor',
      'emergencyNumber',
      'phone',
    ])
    .where('shopId', '=', tx.shopId)
    .executeTakeFirst()
}

/** Stores a shop with its counter, or new settings of one; take a change number for entity `shop`. */
export async function saveShop(tx: ShopTx, shop: Shop): Promise<void> {
  const { id, ...settings } = shop
  await tx
    .insertInto('shop')
    .values({ shopId: id, ...settings })
    .onConflict((on) => on.column('shopId').doUpdateSet({ ...settings, updatedAt: sql`now()` }))
    .execute()
  await sql`select start_counter(${id})`.execute(tx)
}
