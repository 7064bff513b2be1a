import { commit, noWrites } from './commit'
import type { Core } from './core'
import { type OutboxRecord, type PhotoRecord, sealedPhoto } from './phone-db'

/**
 * Before a phone empties itself (Q4), what the shop once refused is offered as well: what is stuck, what its
 * person gave up sending, and files that were refused and are still here. True when there was any of it.
 */
export async function offerAll(core: Pick<Core, 'db' | 'step'>): Promise<boolean> {
  return await commit(core, async () => {
    const { db } = core
    const stuck = await db.outbox.where('state').equals('stuck').toArray()
    const letGo = await db.letGo.toArray()
    const photos = await refusedPhotos(core)
    if (stuck.length + letGo.length + photos.length === 0) return null
    const given = letGo.map(({ letGoAt: _, ...record }) => record)
    return {
      ...noWrites(),
      outbox: [...stuck, ...given].map((record) => ({ ...record, ...AGAIN })),
      takeBack: letGo.map((record) => record.opId),
      photos: photos.map((photo) => ({ ...photo, state: 'waiting', reason: null, uploaded: null })),
    }
  })
}

const AGAIN = {
  state: 'waiting',
  reason: null,
  detail: null,
  unsettled: 1,
} as const satisfies Partial<OutboxRecord>

async function refusedPhotos({ db }: Pick<Core, 'db'>): Promise<PhotoRecord[]> {
  const stuck = await db.photo.where('state').equals('stuck').toArray()
  const here = await Promise.all(stuck.map((photo) => sealedPhoto(db, photo)))
  return stuck.filter((_, index) => here[index] !== null)
}
