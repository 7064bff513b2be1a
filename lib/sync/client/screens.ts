import type { Id } from '@/lib/model/id'
import type { LogEntry, LogRow } from '@/lib/model/log-entry'
import type { Core } from './core'
import type { RowOf, StoredEntity } from './entities'
import { liveCell } from './live'
import { type Notice, type OutboxRecord, type RowRecord, readMeta } from './phone-db'
import { livePhoto } from './photo-view'
import { unsentIds } from './unsent'
import type { PhotoView, StoredEntry } from './views'
import type { Watch } from './watch'

/** What screens read of an open store: each watch is made once and runs only while it is looked at. */
export class Screens {
  readonly #core: Core
  readonly #failed: (cause: unknown) => void
  readonly #rows = new Map<string, Watch<unknown>>()
  readonly #notices = new Map<Id, Watch<Notice[]>>()
  readonly #logs = new Map<Id, Watch<StoredEntry[] | undefined>>()
  readonly #photos = new Map<string, Watch<PhotoView>>()

  constructor(core: Core, failed: (cause: unknown) => void) {
    this.#core = core
    this.#failed = failed
  }

  /** Rows of an entity, of one job when it is named, in no order; undefined before the first look. */
  rows<E extends StoredEntity>(entity: E, jobId?: Id): Watch<RowOf<E>[] | undefined> {
    const key = `${entity} ${jobId ?? ''}`
    const held = this.#rows.get(key) ?? this.#liveRows<E>(entity, jobId)
    this.#rows.set(key, held)
    return held as Watch<RowOf<E>[] | undefined>
  }

  #liveRows<E extends StoredEntity>(entity: E, jobId?: Id): Watch<RowOf<E>[] | undefined> {
    return liveCell<RowRecord[], RowOf<E>[] | undefined>({
      initial: undefined,
      read: () => this.#find(entity, jobId),
      open: async (found) => (await this.#openAll(found)) as RowOf<E>[],
      failed: this.#failed,
      life: this.#core.db.life,
    })
  }

  async #find(entity: StoredEntity, jobId?: Id): Promise<RowRecord[]> {
    const { row } = this.#core.db
    if (jobId === undefined) return await row.where('entity').equals(entity).toArray()
    const keys = (await this.#jobsOf(jobId)).map((id) => [entity, id])
    return await row.where('[entity+jobId]').anyOf(keys).toArray()
  }

  /** The job and those merged into it (R13): what was written to any of them shows in the one that goes on. */
  async #jobsOf(jobId: Id): Promise<Id[]> {
    const jobs = this.#core.db.row.where('entity').equals('job')
    const merged = await jobs.filter((record) => record.mergedInto === jobId).toArray()
    return [jobId, ...merged.map((record) => record.id)]
  }

  #openAll(records: RowRecord[]): Promise<unknown[]> {
    const { cache, keys } = this.#core
    return Promise.all(records.map((record) => cache.row(keys, record)))
  }

  /** What the person has not seen yet of what the shop did with their work on a job. */
  notices(jobId: Id): Watch<Notice[]> {
    const held = this.#notices.get(jobId) ?? this.#liveNotices(jobId)
    this.#notices.set(jobId, held)
    return held
  }

  #liveNotices(jobId: Id): Watch<Notice[]> {
    const { db } = this.#core
    return liveCell<Notice[], Notice[]>({
      initial: [],
      read: async () => (await readMeta(db, 'notices')) ?? [],
      open: (all) => all.filter((notice) => notice.jobId === jobId),
      failed: this.#failed,
      life: db.life,
    })
  }

  /** The log of a job: what the shop has in its order, then what it has not, as it was made. */
  log(jobId: Id): Watch<StoredEntry[] | undefined> {
    const held = this.#logs.get(jobId) ?? this.#liveLog(jobId)
    this.#logs.set(jobId, held)
    return held
  }

  #liveLog(jobId: Id): Watch<StoredEntry[] | undefined> {
    const { db } = this.#core
    return liveCell<[RowRecord[], OutboxRecord[]], StoredEntry[] | undefined>({
      initial: undefined,
      read: async () => [
        await this.#find('logEntry', jobId),
        await db.outbox
          .where('jobId')
          .anyOf(await this.#jobsOf(jobId))
          .toArray(),
      ],
      open: async ([rows, outbox]) => {
        const opened = (await this.#openAll(rows)) as (LogRow | LogEntry)[]
        return inOrder(opened, unsentIds(outbox))
      },
      failed: this.#failed,
      life: this.#core.db.life,
    })
  }

  /** A photo or a voice note: its bytes held here, else the shop's copy once the shop has it. */
  photo(hash: string): Watch<PhotoView> {
    const held = this.#photos.get(hash) ?? livePhoto(this.#core, hash, this.#failed)
    this.#photos.set(hash, held)
    return held
  }
}

function inOrder(rows: (LogRow | LogEntry)[], unsent: ReadonlyMap<Id, number>): StoredEntry[] {
  const places = placesOf(rows)
  return rows
    .map((row) => ({ ...storedEntry(row), unsentAs: unsent.get(row.id) }))
    .map((one) => ({ ...one, sent: one.unsentAs === undefined, at: places.get(one.entry.id) }))
    .sort((a, b) => {
      const byPlace = place(a) - place(b)
      return byPlace !== 0 ? byPlace : a.entry.id < b.entry.id ? -1 : 1
    })
    .map(({ entry, sent, order }) => ({ entry, sent, order }))
}

/**
 * The place of each entry the shop has: each job's chain in its own order, the chains of jobs that were
 * merged laid into each other by the time at which they reached the shop.
 */
function placesOf(rows: readonly (LogRow | LogEntry)[]): Map<Id, number> {
  const chained = rows.filter((row): row is LogRow => 'order' in row)
  const latest = new Map<Id, string>()
  const keyed = chained
    .toSorted((a, b) => a.order - b.order)
    .map((row) => {
      const [, at = row.receivedAt] = [latest.get(row.jobId) ?? '', row.receivedAt].sort()
      latest.set(row.jobId, at)
      return { id: row.id, key: [at, row.jobId, String(row.order).padStart(9, '0')].join(' ') }
    })
    .sort((a, b) => (a.key < b.key ? -1 : 1))
  return new Map(keyed.map(({ id }, n) => [id, n]))
}

/** First the shop's order, then what the shop took without having shown it back, then the unsent as made. */
const TAKEN = 1e9
const UNSENT = 2e9
const place = (one: { at: number | undefined; unsentAs: number | undefined }): number =>
  one.at ?? (one.unsentAs === undefined ? TAKEN : UNSENT + one.unsentAs)

function storedEntry(row: LogRow | LogEntry): { entry: LogEntry; order: number | null } {
  if (!('order' in row)) return { entry: row, order: null }
  const { order, hash: _hash, receivedAt: _receivedAt, ...entry } = row
  return { entry, order }
}
