import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import type { PullRow } from '@/lib/sync/protocol/message'
import { commit, noWrites } from './commit'
import type { Core } from './core'
import { ON_TOP, recordsIn } from './outbox'
import { type PhoneDb, type RowRecord, readMeta } from './phone-db'
import { dropSentThumbs } from './photo-store'

/**
 * Makes room for a record (P21) by letting go of what the shop has and can show again: first the small
 * copies of photos that were sent, then the rows of closed jobs with nothing unsent in them. Work that
 * the shop does not have is never touched. False when there was nothing to let go of.
 */
export async function freeRoom(core: Core): Promise<boolean> {
  if (await dropSentThumbs(core.db)) return true
  return await dropClosedJobs(core)
}

/** Rows that hang on a job; machines and people stay, others may need them. */
async function dropClosedJobs(core: Core): Promise<boolean> {
  return await commit(core, async () => {
    const { db } = core
    const closed = await closedJobs(core)
    const records = await recordsIn(db, ...ON_TOP)
    const unsent = new Set(records.map((record) => record.jobId))
    const jobIds = new Set(closed.map((row) => row.id).filter((jobId) => !unsent.has(jobId)))
    if (jobIds.size === 0) return null
    const rows = await db.row.filter((row) => row.jobId !== null && jobIds.has(row.jobId)).toArray()
    const gen = (await readMeta(db, 'gen')) ?? 0
    const dropped = { gen, jobIds: [...new Set([...(await droppedJobs(db)), ...jobIds])] }
    return { ...noWrites(), dropRows: rows.map((row) => row.key), meta: { dropped } }
  })
}

/** Jobs this store let go of for room, and has not pulled anew since. */
export async function droppedJobs(db: PhoneDb): Promise<Id[]> {
  const dropped = await readMeta(db, 'dropped')
  const gen = (await readMeta(db, 'gen')) ?? 0
  return dropped?.gen === gen ? dropped.jobIds : []
}

/**
 * True when a page brings a job back to work that was let go of for room: its entries are older than the
 * cursor and would not come with it, so that only a whole pull shows the job whole.
 */
export async function bringsBack(db: PhoneDb, rows: readonly PullRow[]): Promise<boolean> {
  const dropped = new Set(await droppedJobs(db))
  if (dropped.size === 0) return false
  return rows.some((row) => {
    if (row.entity !== 'job' || row.state !== 'present' || !dropped.has(row.id)) return false
    return (row.row as { state?: unknown } | null)?.state !== 'closed'
  })
}

async function closedJobs(core: Core): Promise<RowRecord[]> {
  const rows = await core.db.row.where('entity').equals('job').toArray()
  const opened = await Promise.all(
    rows.map(async (row) => ({ row, job: (await core.cache.row(core.keys, row)) as Job })),
  )
  return opened.filter(({ job }) => job.state === 'closed').map(({ row }) => row)
}

/** IndexedDB's word for "no room", also as the cause of an aborted transaction. */
export function isFull(cause: unknown): boolean {
  if (typeof cause !== 'object' || cause === null) return false
  const { name, inner } = cause as { name?: unknown; inner?: unknown }
  return name === 'QuotaExceededError' || isFull(inner)
}

/** Runs a write; when the phone has no room, makes some and runs it once more. The second failure is thrown. */
export async function withRoom<T>(core: Core, write: () => Promise<T>): Promise<T> {
  try {
    return await write()
  } catch (cause) {
    if (!isFull(cause) || !(await freeRoom(core))) throw cause
    return await write()
  }
}

/** Runs a write that can as well be done later: without room it is left undone. */
export async function ifThereIsRoom(write: () => Promise<unknown>): Promise<void> {
  try {
    await write()
  } catch (cause) {
    if (!isFull(cause)) throw cause
  }
}
