import { commit, noWrites } from './commit'
import type { Core } from './core'
import { recordsIn } from './outbox'
import { type OutboxRecord, type PhotoRecord, sealedPhoto } from './phone-db'
import { photosToOffer } from './photo-store'

/**
 * Before a phone empties itself (Q4), all that is still on it is offered: what is stuck, what its person gave
 * up sending, files that were refused and are still here; and what the shop took lately, as a shop that was
 * restored from a backup meanwhile may have it no more (P12). True when there was any of it.
 */
export async function offerAll(core: Pick<Core, 'db' | 'step'>): Promise<boolean> {
  return await commit(core, async () => {
    const { db } = core
    const held = await recordsIn(db, 'stuck', 'taken', 'done')
    const letGo = await db.letGo.toArray()
    const refused = await refusedPhotos(core)
    const photos = [...refused, ...(await photosToOffer(db, 0))]
    if (held.length + letGo.length + photos.length === 0) return null
    const given = letGo.map(({ letGoAt: _, ...record }) => record)
    return {
      ...noWrites(),
      outbox: [...held, ...given].map((record) => ({ ...record, ...AGAIN })),
      takeBack: letGo.map((record) => record.opId),
      photos: photos.map((photo) => ({ ...photo, state: 'waiting', reason: null, uploaded: null })),
    }
  })
}

const AGAIN = {
  state: 'waiting',
  reason: null,
  detail: null,
  takenAt: null,
  unsettled: 1,
} as const satisfies Partial<OutboxRecord>

async function refusedPhotos({ db }: Pick<Core, 'db'>): Promise<PhotoRecord[]> {
  const stuck = await db.photo.where('state').equals('stuck').toArray()
  const here = await Promise.all(stuck.map((photo) => sealedPhoto(db, photo)))
  return stuck.filter((_, index) => here[index] !== null)
}
