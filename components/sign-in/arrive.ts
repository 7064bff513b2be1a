import type { Actor } from '@/lib/model/person'
import type { ShopLine } from '@/lib/ports/shop-line'
import type { Indexed } from '@/lib/sync/client/phone-db'
import { readActor } from './read-actor'

/**
 * After a good sign-in: who it is, or null. Whoever signed out without signal and now signs in again means
 * to stay, so the sign-out that was still to be told to the shop is forgotten; else the field app would end
 * the new session in place of the old one. A browser without storage has nothing to forget.
 */
export async function arrive(line: ShopLine, indexed?: Indexed): Promise<Actor | null> {
  const actor = await readActor(line)
  if (actor !== null) await forgetSignOut(indexed).catch(() => undefined)
  return actor
}

/** Fetched only now: the sign-in page itself needs no database. */
async function forgetSignOut(indexed?: Indexed): Promise<void> {
  const { DeviceDb, stayHere } = await import('@/lib/sync/client/device-db')
  const device = new DeviceDb(indexed)
  try {
    await stayHere(device)
  } finally {
    device.close()
  }
}
