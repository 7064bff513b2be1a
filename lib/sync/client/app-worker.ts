import { envPublic } from '@/lib/env-public'
import type { Id } from '@/lib/model/id'
import { SEND_TAG } from './background'
import type { Needs } from './book-fetch'
import { Cell } from './watch'

/** What the page says to the service worker (app/sw.ts). */
export type WorkerMessage = { type: 'SKIP_WAITING' } | { type: 'book'; shopId: Id; needs?: Needs }

type SyncManager = { register(tag: string): Promise<void> }

/** How often a page that is looked at asks for a newer version of the app (a choice). */
const ASK_EVERY_MS = 3600 * 1000

/** The service worker as the page sees it: registered in production only, renewed on the person's word. */
export class AppWorker {
  /** A newer version waits for the person. */
  readonly waiting = new Cell(false)
  /** The browser can wake the worker to send with the app closed (P20); not every one can. */
  readonly sendsClosed = new Cell(false)
  #registration: ServiceWorkerRegistration | null = null
  #asked: boolean = false
  #replaced: boolean = false
  #lastAskMs = Number.NEGATIVE_INFINITY

  /** Registers the worker; resolves when one is active, or at once where there is none. */
  async register(): Promise<void> {
    const container = globalThis.navigator?.serviceWorker as ServiceWorkerContainer | undefined
    if (container === undefined || !envPublic.production || this.#registration !== null) return
    // Null at first: the first worker taking over this page is no reason to load it again.
    let previous = container.controller
    container.addEventListener('controllerchange', () => {
      if (previous !== null) this.#onReplaced()
      previous = container.controller
    })
    document.addEventListener('visibilitychange', () => {
      if (document.visibilityState === 'hidden' && this.#replaced) location.reload()
    })
    const registration = await container.register('/sw.js', { updateViaCache: 'none' })
    this.#registration = registration
    this.sendsClosed.set('sync' in registration)
    this.#watch(registration, container)
    await container.ready
  }

  /** Takes the newer version: the page loads again. Drafts are kept to the keystroke, so nothing is lost. */
  readonly apply = (): void => {
    if (this.#replaced) {
      location.reload()
      return
    }
    this.#asked = true
    this.#tell(this.#registration?.waiting, { type: 'SKIP_WAITING' })
  }

  /** Has the worker look for a newer code book and those needed; false when there is no worker to do it. */
  loadBook(shopId: Id, needs: Needs): boolean {
    return this.#tell(this.#registration?.active, { type: 'book', shopId, needs })
  }

  /** Has the browser wake the worker when there is signal, where it can (P20). */
  async askToSendLater(): Promise<void> {
    const manager = (this.#registration as { sync?: SyncManager } | null)?.sync
    await manager?.register(SEND_TAG)
  }

  /** Looks for a newer version of the app, now and then. */
  async askForUpdate(nowMs: number): Promise<void> {
    if (this.#registration === null || nowMs - this.#lastAskMs < ASK_EVERY_MS) return
    this.#lastAskMs = nowMs
    await this.#registration.update()
  }

  #tell(worker: ServiceWorker | null | undefined, message: WorkerMessage): boolean {
    if (worker === null || worker === undefined) return false
    worker.postMessage(message)
    return true
  }

  #watch(registration: ServiceWorkerRegistration, container: ServiceWorkerContainer): void {
    const look = () =>
      this.waiting.set(registration.waiting !== null && container.controller !== null)
    look()
    registration.addEventListener('updatefound', () => {
      registration.installing?.addEventListener('statechange', look)
    })
  }

  /** Another worker has this page now: load again where that was asked for or is not seen, else offer it. */
  #onReplaced(): void {
    if (this.#asked || document.visibilityState === 'hidden') {
      location.reload()
      return
    }
    this.#replaced = true
    this.waiting.set(true)
  }
}
