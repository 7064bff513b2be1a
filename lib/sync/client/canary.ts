import type { SyncPorts } from '@/lib/ports/sync-ports'
import { ifThereIsRoom } from './free-room'
import { type PhoneDb, readMeta, writeMeta } from './phone-db'

/** Puts the row into a new store by which the shop tells it from one that was emptied (P22). */
export async function plantCanary(
  db: PhoneDb,
  { ids, clock }: Pick<SyncPorts, 'ids' | 'clock'>,
): Promise<void> {
  if ((await readMeta(db, 'canary')) !== undefined) return
  const canary = { id: ids.next(), madeAt: clock.now() }
  await ifThereIsRoom(() => writeMeta(db, 'canary', canary))
}
