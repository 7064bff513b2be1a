import { AppError } from '@/lib/model/result'
import type { Core } from './core'
import {
  type DraftRecord,
  type LetGoRecord,
  type MetaName,
  type MetaValues,
  type OutboxRecord,
  type PhotoBytesRecord,
  type PhotoRecord,
  type RowRecord,
  readMeta,
} from './phone-db'

/** The store, and who is told of each step. */
type Home = Pick<Core, 'db' | 'step'>

/** Everything one transaction writes, prepared before it starts: crypto inside would end it. */
export type Writes = {
  /** `turn` is filled in when it is written. */
  rows: Omit<RowRecord, 'turn'>[]
  dropRows: string[]
  outbox: OutboxRecord[]
  dropOutbox: number[]
  letGo: LetGoRecord[]
  /** Op ids of records that are to be sent after all. */
  takeBack: string[]
  photos: PhotoRecord[]
  photoBytes: PhotoBytesRecord[]
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
  letGo: [],
  takeBack: [],
  photos: [],
  photoBytes: [],
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
export async function commit(core: Home, prepare: () => Promise<Writes | null>): Promise<boolean> {
  for (let tries = 0; tries < MOST_TRIES; tries += 1) {
    const outcome = await core.db.life.run(() => tryOnce(core, prepare))
    if (outcome !== 'overtaken') return outcome === 'written'
  }
  throw new AppError('storeTooBusy', { retry: true })
}

async function tryOnce(
  core: Home,
  prepare: () => Promise<Writes | null>,
): Promise<'written' | 'nothing' | 'overtaken'> {
  const turn = (await readMeta(core.db, 'turn')) ?? 0
  core.step('prepare')
  const writes = await prepare()
  if (writes === null) return 'nothing'
  core.step('write')
  const isWritten = await writeAll(core, turn, writes)
  core.step('committed')
  return isWritten ? 'written' : 'overtaken'
}

function writeAll(core: Home, turn: number, writes: Writes): Promise<boolean> {
  const { db } = core
  const tables = [db.row, db.outbox, db.letGo, db.photo, db.photoBytes, db.draft, db.meta]
  return db.transaction('rw', tables, async () => {
    const now = (await readMeta(db, 'turn')) ?? 0
    if (now !== turn) return false
    core.step('turn')
    await db.meta.put({ name: 'turn', value: turn + 1 })
    core.step('outbox')
    await putOps(core, writes)
    core.step('rows')
    await putRows(core, turn + 1, writes)
    core.step('photos')
    await putPhotos(core, writes)
    core.step('drafts')
    if (writes.drafts.length > 0) await db.draft.bulkPut(writes.drafts)
    core.step('dropDrafts')
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

async function putOps({ db, step }: Home, writes: Writes): Promise<void> {
  if (writes.outbox.length > 0) await db.outbox.bulkPut(writes.outbox)
  step('letGo')
  if (writes.letGo.length > 0) await db.letGo.bulkPut(writes.letGo)
  if (writes.takeBack.length > 0) await db.letGo.bulkDelete(writes.takeBack)
  step('dropOutbox')
  if (writes.dropOutbox.length > 0) await db.outbox.bulkDelete(writes.dropOutbox)
}

async function putPhotos({ db, step }: Home, writes: Writes): Promise<void> {
  if (writes.photoBytes.length > 0) await db.photoBytes.bulkPut(writes.photoBytes)
  step('photoBytes')
  if (writes.photos.length > 0) await db.photo.bulkPut(writes.photos)
}

async function putRows({ db, step }: Home, turn: number, writes: Writes): Promise<void> {
  if (writes.rows.length > 0) await db.row.bulkPut(writes.rows.map((row) => ({ ...row, turn })))
  step('dropRows')
  if (writes.dropRows.length > 0) await db.row.bulkDelete(writes.dropRows)
}
