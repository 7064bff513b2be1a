import { asShop } from '@/db/client'
import { type ChangeListener, listenForChanges } from '@/db/listen'
import { changesAfter } from '@/db/queries/change-log'
import { lastChange } from '@/db/queries/changes'
import type { Id } from '@/lib/model/id'

/**
 * One ear per process for the shops' changes (bones.md 4): PostgreSQL tells that a shop moved on, the
 * rows are read from the log once and handed to everybody who listens to that shop. So what was told
 * while the line to the database was down is read afterwards, and nothing is told that did not commit.
 */
export type ShopChange = { seq: number; entity: string; id: string; jobId: Id | null }
export type Heard = (changes: readonly ShopChange[]) => void

type Ear = { ready: Promise<void>; close: () => Promise<void> }
type ShopEar = {
  /** Everything up to this number was handed out. */
  at: number
  readers: Set<Heard>
  reading: boolean
  again: boolean
}

const PAGE = 500
const FIRST_WAIT_MS = 100
const LONGEST_WAIT_MS = 5_000

/** The hub of one process; tests make their own. */
export class EventHub {
  readonly #shops = new Map<Id, ShopEar>()
  readonly #streams = new Set<() => void>()
  readonly #ear: Ear
  #isClosed = false

  constructor(listen: (listener: ChangeListener) => Ear = listenForChanges) {
    this.#ear = listen({
      onChange: (shopId) => this.#read(shopId),
      onResync: () => {
        for (const shopId of this.#shops.keys()) this.#read(shopId)
      },
    })
  }

  /** True once the process is ending: a desk that comes back now would keep it from stopping. */
  get isClosed(): boolean {
    return this.#isClosed
  }

  /** Open streams of this process. */
  get size(): number {
    return this.#streams.size
  }

  /**
   * Hears every change of the shop from now on; answers how to stop. Once it resolves, whatever commits
   * is heard; what committed before has to be read from the log.
   */
  async subscribe(shopId: Id, heard: Heard): Promise<() => void> {
    await this.#ear.ready
    const ear = this.#shops.get(shopId) ?? (await this.#open(shopId))
    ear.readers.add(heard)
    return () => {
      ear.readers.delete(heard)
      if (ear.readers.size === 0 && this.#shops.get(shopId) === ear) this.#shops.delete(shopId)
    }
  }

  async #open(shopId: Id): Promise<ShopEar> {
    const at = await asShop(shopId, lastChange)
    const known = this.#shops.get(shopId)
    if (known) return known
    const ear: ShopEar = { at, readers: new Set(), reading: false, again: false }
    this.#shops.set(shopId, ear)
    // What committed between the reading and now was told to nobody.
    this.#read(shopId)
    return ear
  }

  #read(shopId: Id): void {
    const ear = this.#shops.get(shopId)
    if (!ear) return
    ear.again = true
    if (!ear.reading) void this.#readOn(shopId, ear)
  }

  async #readOn(shopId: Id, ear: ShopEar): Promise<void> {
    ear.reading = true
    let waitMs = FIRST_WAIT_MS
    while (ear.again) {
      ear.again = false
      try {
        await this.#readPages(shopId, ear)
        waitMs = FIRST_WAIT_MS
      } catch {
        // The database is away: what is in the log now is there later too.
        await new Promise((resume) => setTimeout(resume, waitMs))
        waitMs = Math.min(waitMs * 2, LONGEST_WAIT_MS)
        ear.again = this.#shops.get(shopId) === ear
      }
    }
    ear.reading = false
  }

  async #readPages(shopId: Id, ear: ShopEar): Promise<void> {
    for (let full = true; full; ) {
      const changes = await asShop(shopId, (tx) => changesAfter(tx, { seq: ear.at, limit: PAGE }))
      full = changes.length === PAGE
      ear.at = changes.at(-1)?.seq ?? ear.at
      if (changes.length > 0) for (const heard of [...ear.readers]) heard(changes)
    }
  }

  /** Keeps a stream to be closed when the process ends; answers how to let it go. */
  keep(close: () => void): () => void {
    this.#streams.add(close)
    return () => this.#streams.delete(close)
  }

  /** Ends every stream and stops listening: an open stream would keep the server from stopping. */
  async close(): Promise<void> {
    this.#isClosed = true
    for (const close of [...this.#streams]) close()
    await this.#ear.close()
  }
}

const HUB = Symbol.for('farbench.events')

/** The hub of this process, made at the first use; it ends with SIGTERM or SIGINT, and none follows it. */
export function eventHub(): EventHub {
  const holder = globalThis as { [key: symbol]: EventHub | undefined }
  const known = holder[HUB]
  if (known) return known
  const hub = new EventHub()
  holder[HUB] = hub
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.once(signal, () => void hub.close())
  }
  return hub
}
