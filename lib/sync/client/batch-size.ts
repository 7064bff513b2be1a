/**
 * How many ops go in one request (P15). It begins with all that waits, up to 500. A request that was cut
 * under way goes in halves of what it held, not under 25; one that arrived lets the next be twice as
 * big. Kept between runs. 413 goes lower still, down to the one op that is too much.
 */
export class BatchSize {
  #limit = FULL

  /** Most ops of the next request. */
  get limit(): number {
    return this.#limit
  }

  /** The shop took it. */
  arrived(): void {
    this.#limit = Math.min(FULL, this.#limit * 2)
  }

  /** A request of so many ops was cut after so long; one that failed at once met no line, which no size helps. */
  cut(ops: number, tookMs: number): void {
    if (tookMs < UNDER_WAY_MS) return
    this.#limit = Math.max(LEAST, Math.min(this.#limit, ops) >> 1)
  }

  /** The shop says that so many ops are too much. */
  tooMuch(ops: number): void {
    this.#limit = Math.max(1, ops >> 1)
  }

  /** The one op that was too much is out of the way. */
  reset(): void {
    this.#limit = FULL
  }
}

const FULL = 500
const LEAST = 25
/** A try that failed sooner met no line at all (a choice). */
const UNDER_WAY_MS = 2_000
