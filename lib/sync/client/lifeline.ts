import { AppError } from '@/lib/model/result'
import { Cell } from './watch'

/** Names of errors that say that the connection to the store is gone, not that what was asked is wrong. */
const DEAD = ['InvalidStateError', 'UnknownError', 'DatabaseClosedError']

/** True when the browser has let the connection die (it happens after a time in the background). */
export function isDead(cause: unknown): boolean {
  if (typeof cause !== 'object' || cause === null) return false
  const { name, inner } = cause as { name?: unknown; inner?: unknown }
  return (typeof name === 'string' && DEAD.includes(name)) || isDead(inner)
}

/** A store that can be closed and opened. */
type Closable = {
  close(how: { disableAutoOpen: boolean }): void
  open(): PromiseLike<unknown>
}

/**
 * Keeps a store usable when the browser lets its connection die (P25): it is opened anew once and the
 * work done again; if that fails too, `lost` says that the page must be loaded again. Work handed in
 * must do no harm when it is done twice.
 */
export class Lifeline {
  /** The store cannot be reached from this page any more. */
  readonly lost = new Cell(false)
  /** Counts how often the store was opened anew: what watches it looks again. */
  readonly reopened = new Cell(0)
  readonly #db: Closable
  #over: boolean = false
  #reopening: Promise<void> | null = null

  constructor(db: Closable) {
    this.#db = db
  }

  /** The store is closed on purpose: from now on nothing is opened again. */
  end(): void {
    this.#over = true
  }

  /** Does the work; once more on a new connection when the old one is dead. Throws AppError `storeLost`. */
  async run<T>(work: () => Promise<T>): Promise<T> {
    try {
      return await work()
    } catch (cause) {
      if (this.#over || !isDead(cause)) throw cause
      await this.reopen()
      return await work().catch((again: unknown) => {
        if (this.#over || !isDead(again)) throw again
        throw this.#lose(again)
      })
    }
  }

  /** Opens the store anew; several who ask at once wait for the same opening. */
  reopen(): Promise<void> {
    this.#reopening ??= this.#open().finally(() => {
      this.#reopening = null
    })
    return this.#reopening
  }

  async #open(): Promise<void> {
    try {
      this.#db.close({ disableAutoOpen: false })
      await this.#db.open()
    } catch (cause) {
      throw this.#lose(cause)
    }
    this.reopened.set(this.reopened.get() + 1)
  }

  #lose(cause: unknown): AppError {
    this.lost.set(true)
    return new AppError('storeLost', { cause })
  }
}
