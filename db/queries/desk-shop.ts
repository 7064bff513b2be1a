import type { Id } from '@/lib/model/id'
import type { Shop } from '@/lib/model/shop'
import { asShop } from '../client'
import { getShop } from './shop'

/** Answers what the desk's frame shows of its shop. */
export function readDeskShop(shopId: Id): Promise<Pick<Shop, 'name' | 'zone' | 'currency'>> {
  return asShop(shopId, async (tx) => {
    const { name, zone, currency } = await getShop(tx)
    return { name, zone, currency }
  })
}
