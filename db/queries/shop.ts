import { sql } from 'kysely'
import { AppError } from '@/lib/model/result'
import type { Shop } from '@/lib/model/shop'
import type { ShopTx } from '../client'

/** Answers the shop's settings; throws when this transaction's shop does not exist. */
export async function getShop(tx: ShopTx): Promise<Shop> {
  const row = await tx
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
  if (!row) throw new AppError('noSuchShop', { context: { shopId: tx.shopId } })
  return row
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
