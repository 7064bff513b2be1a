import type { Timer } from '@/lib/ports/clock'
import { Cell } from './watch'

/** What the browser says about keeping our store (P21). */
export type Room = {
  storageKept: boolean | null
  quotaShare: number | null
  /** Bytes still free; null when the browser does not say. */
  freeBytes: number | null
}

/** How often it is looked how much is used (a choice). */
const LOOK_EVERY_MS = 5 * 60 * 1000
/** From this share on the person is warned (P21). */
export const WARN_SHARE = 0.8

/** Share of the room that photos may fill; the rest is for records (a choice). */
const PHOTO_SHARE = 0.95

/** Watches the room; outside of a browser nothing is known. */
export class RoomWatch {
  readonly state = new Cell<Room>({ storageKept: null, quotaShare: null, freeBytes: null })
  #asked: boolean = false
  #ended: boolean = false
  #looking: Promise<void> | null = null
  #callOff: () => void = () => undefined

  /** Looks now and every few minutes, until it is ended. */
  watch(timer: Timer, failed: (cause: unknown) => void): void {
    if (this.#ended) return
    this.look().catch(failed)
    this.#callOff = timer.after(LOOK_EVERY_MS, () => this.watch(timer, failed))
  }

  end(): void {
    this.#ended = true
    this.#callOff()
  }

  /** Looks again at how much is used; who comes while one look goes on has that one, as looks are dear. */
  look(): Promise<void> {
    this.#looking ??= this.#lookNow().finally(() => {
      this.#looking = null
    })
    return this.#looking
  }

  async #lookNow(): Promise<void> {
    const manager = storage()
    if (manager === undefined) return
    const [kept, used] = await Promise.all([manager.persisted(), manager.estimate()])
    const { quota, usage = 0 } = used
    const share = quota === undefined || quota === 0 ? null : usage / quota
    const freeBytes = quota === undefined ? null : Math.max(0, quota - usage)
    // Browsers answer the same false before and after they were asked.
    const storageKept = kept || this.#asked ? kept : null
    this.state.set({ storageKept, quotaShare: share, freeBytes })
  }

  /**
   * False when so many bytes more would leave too little for records (P21): photos stop before them. True
   * where the browser does not say how much there is.
   */
  async hasRoomFor(bytes: number): Promise<boolean> {
    const estimate = await storage()?.estimate()
    const { quota, usage = 0 } = estimate ?? {}
    return quota === undefined || usage + bytes <= quota * PHOTO_SHARE
  }

  /** Asks the browser to keep the store, once, with the first work worth keeping; then looks again. */
  async askToKeep(): Promise<void> {
    const manager = storage()
    if (manager === undefined) return
    if (!this.#asked) {
      this.#asked = true
      await manager.persist()
      // A look begun before the answer does not know it.
      await this.#looking
    }
    await this.look()
  }
}

const storage = (): StorageManager | undefined => globalThis.navigator?.storage
