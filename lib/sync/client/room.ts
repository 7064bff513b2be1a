import { Cell } from './watch'

/** What the browser says about keeping our store (P21). */
export type Room = { storageKept: boolean | null; quotaShare: number | null }

/** Watches the room; outside of a browser nothing is known. */
export class RoomWatch {
  readonly state = new Cell<Room>({ storageKept: null, quotaShare: null })
  #asked: boolean = false

  /** Looks again at how much is used. */
  async look(): Promise<void> {
    const manager = storage()
    if (manager === undefined) return
    const [kept, used] = await Promise.all([manager.persisted(), manager.estimate()])
    const share = used.quota === undefined ? null : (used.usage ?? 0) / used.quota
    // Browsers answer the same false before and after they were asked.
    const storageKept = kept || this.#asked ? kept : null
    this.state.set({ storageKept, quotaShare: share })
  }

  /** Asks the browser to keep the store; once, with the first work worth keeping. */
  async askToKeep(): Promise<void> {
    const manager = storage()
    if (manager === undefined || this.#asked) return
    this.#asked = true
    await manager.persist()
    await this.look()
  }
}

const storage = (): StorageManager | undefined => globalThis.navigator?.storage
