import type { SyncRequest } from '@/lib/sync/protocol/message'
import type { OutboxRecord, PhoneDb } from './phone-db'

export type Held = NonNullable<SyncRequest['held']>

/**
 * What the phone still holds besides the first so many of `records`: the shop then knows what it does not know
 * of a phone that is not heard of again. `records`: all that is to be sent, oldest first; `waiting`: those of
 * them, and of what was sent in vain already, that the shop does not have.
 */
export async function heldBeyond(
  db: PhoneDb,
  { records, waiting }: Record<'records' | 'waiting', readonly OutboxRecord[]>,
): Promise<(sent: number) => Held> {
  const photos = await db.photo.where('state').equals('waiting').sortBy('since')
  return (sent) => {
    const going = new Set(records.slice(0, sent).map((record) => record.dseq))
    const left = waiting.filter((record) => !going.has(record.dseq))
    const since = [...left, ...photos].map((one) => one.since)
    const oldestAt = since.length === 0 ? null : new Date(Math.min(...since)).toISOString()
    return { ops: left.length, photos: photos.length, oldestAt }
  }
}
