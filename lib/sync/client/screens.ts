import type { Id } from '@/lib/model/id'
import type { LogEntry, LogRow } from '@/lib/model/log-entry'
import type { Core } from './core'
import type { RowOf, StoredEntity } from './entities'
import { liveCell } from './live'
import type { OutboxRecord, RowRecord } from './phone-db'
import { photoPlace } from './record'
import { openBytes } from './seal'
import { unsentIds } from './unsent'
import type { PhotoView, StoredEntry } from './views'
import type { Watch } from './watch'

/** What screens read of an open store: each watch is made once and runs only while it is looked at. */
export class Screens {
  readonly #core: Core
  readonly #failed: (cause: unknown) => void
  readonly #rows = new Map<string, Watch<unknown>>()
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
    })
  }

  #find(entity: StoredEntity, jobId?: Id): Promise<RowRecord[]> {
    const { row } = this.#core.db
    return jobId === undefined
      ? row.where('entity').equals(entity).toArray()
      : row.where('[entity+jobId]').equals([entity, jobId]).toArray()
  }

  #openAll(records: RowRecord[]): Promise<unknown[]> {
    const { cache, keys } = this.#core
    return Promise.all(records.map((record) => cache.row(keys, record)))
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
        await db.outbox.where('jobId').equals(jobId).toArray(),
      ],
      open: async ([rows, outbox]) => {
        const opened = (await this.#openAll(rows)) as (LogRow | LogEntry)[]
        return inOrder(opened, unsentIds(outbox))
      },
      failed: this.#failed,
    })
  }

  /** A photo: its bytes held here, else the shop's copy once the shop has it. */
  photo(hash: string): Watch<PhotoView> {
    const held = this.#photos.get(hash) ?? this.#livePhoto(hash)
    this.#photos.set(hash, held)
    return held
  }

  #livePhoto(hash: string): Watch<PhotoView> {
    const { db, keys } = this.#core
    let made: string | null = null
    return liveCell<
      { sealed: Uint8Array<ArrayBuffer> | null; mime: string; atShop: boolean },
      PhotoView
    >({
      initial: { url: null, onPhone: false },
      read: async () => {
        const photo = await db.photo.get(hash)
        const atShop = (await db.row.where('key').equals(`photo/${hash}`).count()) > 0
        return { sealed: photo?.bytes ?? null, mime: photo?.mime ?? '', atShop }
      },
      open: async ({ sealed, mime, atShop }) => {
        if (sealed === null) return { url: atShop ? `/api/photos/${hash}` : null, onPhone: false }
        made ??= URL.createObjectURL(
          new Blob([await openBytes(keys.store, photoPlace(hash), sealed)], { type: mime }),
        )
        return { url: made, onPhone: true }
      },
      failed: this.#failed,
      ended: () => {
        if (made !== null) URL.revokeObjectURL(made)
        made = null
      },
    })
  }
}

function inOrder(rows: (LogRow | LogEntry)[], unsent: ReadonlyMap<Id, number>): StoredEntry[] {
  return rows
    .map((row) => ({ ...storedEntry(row), unsentAs: unsent.get(row.id) }))
    .map((one) => ({ ...one, sent: one.unsentAs === undefined }))
    .sort((a, b) => {
      const byPlace = place(a) - place(b)
      return byPlace !== 0 ? byPlace : a.entry.id < b.entry.id ? -1 : 1
    })
    .map(({ entry, sent, order }) => ({ entry, sent, order }))
}

/** First the shop's order, then what the shop took without having shown it back, then the unsent as made. */
const TAKEN = 1e9
const UNSENT = 2e9
const place = (one: { order: number | null; unsentAs: number | undefined }): number =>
  one.order ?? (one.unsentAs === undefined ? TAKEN : UNSENT + one.unsentAs)

function storedEntry(row: LogRow | LogEntry): { entry: LogEntry; order: number | null } {
  if (!('order' in row)) return { entry: row, order: null }
  const { order, hash: _hash, receivedAt: _receivedAt, ...entry } = row
  return { entry, order }
}
