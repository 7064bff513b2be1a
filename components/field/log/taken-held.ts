import type { TakenPhoto } from '@/lib/ports/camera'
import type { TakenVoice } from '@/lib/ports/voice'

/**
 * What was taken and not saved yet, by person and job: held in memory, so that a press on Back loses nothing.
 * Drafts hold words alone; these bytes are on the phone for good only once they are saved (R8).
 */
export class TakenHeld<T> {
  readonly #held = new Map<string, T>()

  /** What is held under this key; null when nothing is. */
  get(key: string): T | null {
    return this.#held.get(key) ?? null
  }

  /** Holds it in place of what was held under the key; null lets go of that. */
  set(key: string, taken: T | null): void {
    if (taken === null) this.#held.delete(key)
    else this.#held.set(key, taken)
  }
}

export const heldPhotos = new TakenHeld<TakenPhoto>()
export const heldVoices = new TakenHeld<TakenVoice>()
