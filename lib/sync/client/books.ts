import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { AppWorker } from './app-worker'
import type { BookDb } from './book-store'
import type { Phone } from './phone'
import { type Indexed, writeMeta } from './phone-db'
import type { BookView } from './views'
import { type Cell, LiveCell } from './watch'

/** A code book that is held is asked after no more often than this (a choice). */
const BOOK_EVERY_MS = 10 * 60 * 1000

const NO_BOOK_YET: BookView = {
  status: 'opening',
  index: null,
  version: null,
  versions: [],
  of: () => null,
}

const none = (): void => undefined

/** The code books of who is at work: what is held, and when the shop is asked for more. */
export class Books {
  readonly view: LiveCell<BookView>
  readonly #indexed: Indexed
  #db: BookDb | null = null
  readonly #ports: Pick<SyncPorts, 'clock' | 'network'>
  readonly #worker: Pick<AppWorker, 'loadBook'>
  readonly #phone: Cell<Phone | null>
  readonly #failed: (cause: unknown) => void
  #noted: number | null = null
  #askedMs = Number.NEGATIVE_INFINITY

  constructor(of: {
    ports: Pick<SyncPorts, 'clock' | 'network'>
    indexed: Indexed
    worker: Pick<AppWorker, 'loadBook'>
    phone: Cell<Phone | null>
    failed: (cause: unknown) => void
  }) {
    this.#indexed = of.indexed
    this.#ports = of.ports
    this.#worker = of.worker
    this.#phone = of.phone
    this.#failed = of.failed
    this.view = new LiveCell(NO_BOOK_YET, (emit) => this.#follow(emit))
  }

  #follow(emit: (view: BookView) => void): () => void {
    let leave: () => void = none
    const follow = () => {
      leave()
      leave = none
      const phone = this.#phone.get()
      if (phone !== null) leave = this.#watch(phone, emit)
    }
    const end = this.#phone.subscribe(follow)
    follow()
    return () => {
      end()
      leave()
    }
  }

  /** Watches the books of who is at work, with what reads them fetched first. */
  #watch(phone: Phone, emit: (view: BookView) => void): () => void {
    let isOver = false
    let leave: () => void = none
    Promise.all([import('./book-store'), import('./book-watch')]).then(
      ([{ BookDb }, { watchBook }]) => {
        if (isOver) return
        this.#db ??= new BookDb(this.#indexed)
        const book = watchBook(this.#db, phone.actor.shopId, this.#failed)
        leave = book.subscribe(() => {
          emit(book.get())
          this.#noteVersion(phone, book.get().version)
        })
      },
      this.#failed,
    )
    return () => {
      isOver = true
      leave()
    }
  }

  /** Has the shop told of a version that came in, and those looked through that no job needs any more. */
  #noteVersion({ core }: Phone, version: number | null): void {
    if (version === null || version === this.#noted) return
    const isNewer = this.#noted !== null
    this.#noted = version
    writeMeta(core.db, 'bookVersion', version).catch(() => undefined)
    if (isNewer) this.ask(true)
  }

  /** Has the code books looked after; unless `now`, only when none is held or it is a while since. */
  ask(now: boolean): void {
    const phone = this.#phone.get()
    const isHeld = this.view.get().status === 'ready'
    const sinceMs = this.#ports.clock.now() - this.#askedMs
    if (phone === null || (!now && isHeld && sinceMs < BOOK_EVERY_MS)) return
    this.#askedMs = this.#ports.clock.now()
    this.#lookAfter(phone).catch(() => undefined)
  }

  /** By the worker where there is one. What does it here is fetched only where there is none. */
  async #lookAfter(phone: Phone): Promise<void> {
    const { neededBooks } = await import('./book-needs')
    const { shopId } = phone.actor
    const needs = await neededBooks(phone.core, this.view.get().version)
    if (this.#worker.loadBook(shopId, needs)) return
    const [{ BookDb }, { fetchBook }] = await Promise.all([
      import('./book-store'),
      import('./book-fetch'),
    ])
    this.#db ??= new BookDb(this.#indexed)
    await fetchBook(this.#db, this.#ports.network, { shopId, needs })
  }
}
