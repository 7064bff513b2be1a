import { AppError } from '@/lib/model/result'
import type { Core } from './core'
import {
  type DraftRecord,
  type MetaName,
  type MetaValues,
  type OutboxRecord,
  type PhoneDb,
  type PhotoRecord,
  type RowRecord,
  readMeta,
} from './phone-db'

/** Everything one transaction writes, prepared before it starts: crypto inside would end it. */
export type Writes = {
  /** `turn` is filled in when it is written. */
  rows: Omit<RowRecord, 'turn'>[]
  dropRows: string[]
  outbox: OutboxRecord[]
  dropOutbox: number[]
  photos: PhotoRecord[]
  dropDrafts: string[]
  drafts: DraftRecord[]
  meta: Partial<MetaValues>
}

/** Writes that change nothing, to be filled in. */
export const noWrites = (): Writes => ({
  rows: [],
  dropRows: [],
  outbox: [],
  dropOutbox: [],
  photos: [],
  dropDrafts: [],
  drafts: [],
  meta: {},
})

/** Another tab wrote this often in between before we give up: it does not happen by chance. */
const MOST_TRIES = 60

/**
 * Prepares writes and writes them in one transaction, provided nothing was written since `prepare`
 * began; else prepares again. So two tabs never give out one number twice (P2), and what was worked
 * out from rows that have changed is worked out anew. `prepare` answers null to write nothing.
 */
export async function commit(
  core: Pick<Core, 'db' | 'step'>,
  prepare: () => Promise<Writes | null>,
): Promise<boolean> {
  for (let tries = 0; tries < MOST_TRIES; tries += 1) {
    const turn = (await readMeta(core.db, 'turn')) ?? 0
    core.step('prepare')
    const writes = await prepare()
    if (writes === null) return false
    core.step('write')
    if (await writeAll(core, turn, writes)) return true
  }
  throw new AppError('storeTooBusy', { retry: true })
}

function writeAll(core: Pick<Core, 'db' | 'step'>, turn: number, writes: Writes): Promise<boolean> {
  const { db } = core
  return db.transaction('rw', [db.row, db.outbox, db.photo, db.draft, db.meta], async () => {
    const now = (await readMeta(db, 'turn')) ?? 0
    if (now !== turn) return false
    core.step('turn')
    await db.meta.put({ name: 'turn', value: turn + 1 })
    core.step('outbox')
    if (writes.outbox.length > 0) await db.outbox.bulkPut(writes.outbox)
    if (writes.dropOutbox.length > 0) await db.outbox.bulkDelete(writes.dropOutbox)
    core.step('rows')
    await putRows(db, turn + 1, writes)
    core.step('photos')
    if (writes.photos.length > 0) await db.photo.bulkPut(writes.photos)
    core.step('drafts')
    if (writes.drafts.length > 0) await db.draft.bulkPut(writes.drafts)
    if (writes.dropDrafts.length > 0) await db.draft.bulkDelete(writes.dropDrafts)
    core.step('meta')
    const facts = Object.entries(writes.meta) as [MetaName, unknown][]
    if (facts.length > 0) {
      await db.meta.bulkPut(facts.map(([name, value]) => ({ name, value })))
    }
    core.step('written')
    return true
  })
}

async function putRows(db: PhoneDb, turn: number, writes: Writes): Promise<void> {
  if (writes.rows.length > 0) await db.row.bulkPut(writes.rows.map((row) => ({ ...row, turn })))
  if (writes.dropRows.length > 0) await db.row.bulkDelete(writes.dropRows)
}
