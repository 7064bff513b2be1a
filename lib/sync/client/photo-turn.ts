import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { Pace } from './photo-pace'
import type { PhotoRun, PhotoStore } from './photo-run'
import type { RunEnd } from './run-end'

/** A line nothing is known of yet. */
export const newPace = (): Pace => ({ chunkBytes: null })

/** The photos' part of a run. What sends them is fetched, from what the phone holds, when the first one waits. */
export class PhotoTurn {
  readonly #store: PhotoStore
  readonly #ports: SyncPorts
  readonly #pace: Pace
  #run: PhotoRun | null = null
  #isMissing: boolean = false

  constructor(store: PhotoStore, ports: SyncPorts, pace: Pace) {
    this.#store = store
    this.#ports = ports
    this.#pace = pace
  }

  /** True when a photo is left for another run. */
  get waits(): boolean {
    return this.#isMissing || this.#run?.waits === true
  }

  /** How many photos wait. */
  async count(): Promise<number> {
    const { db, openPhoto } = this.#store
    return openPhoto === null ? 0 : await db.photo.where('state').equals('waiting').count()
  }

  /** One request for the photo that has waited longest, as PhotoRun has it; null when none is left. */
  async next(): Promise<RunEnd | 'moved' | 'over' | null> {
    if (this.#run === null && (await this.count()) === 0) return null
    const run = await this.#fetched()
    return run === null ? null : await run.next()
  }

  /** What this run has done with is tried once more, as it was offered anew. */
  again(): void {
    this.#run = null
  }

  async #fetched(): Promise<PhotoRun | null> {
    if (this.#run !== null) return this.#run
    try {
      const file = await import('./photo-run')
      this.#run = new file.PhotoRun(this.#store, this.#ports, this.#pace)
    } catch {
      // A newer build took this one's files away: the photos wait for the app to be loaded anew.
      this.#isMissing = true
    }
    return this.#run
  }
}
