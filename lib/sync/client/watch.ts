/** A value that tells when it changes; `get` answers the same object until it does. */
export type Watch<T> = { get(): T; subscribe(listener: () => void): () => void }

/** A watch that is set by hand. */
export class Cell<T> implements Watch<T> {
  #value: T
  readonly #listeners = new Set<() => void>()

  constructor(value: T) {
    this.#value = value
  }

  get = (): T => this.#value

  set(value: T): void {
    if (Object.is(value, this.#value)) return
    this.#value = value
    for (const listener of [...this.#listeners]) listener()
  }

  subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener)
    return () => this.#listeners.delete(listener)
  }
}

/** What a live source calls: `emit` with each new value. Answers the function that ends it. */
export type Source<T> = (emit: (value: T) => void) => () => void

/**
 * A watch that runs its source only while somebody listens. The last value stays for the next listener,
 * unless it is one that ends with its source (`lasts` false).
 */
export class LiveCell<T> implements Watch<T> {
  readonly #cell: Cell<T>
  readonly #source: Source<T>
  readonly #initial: T
  readonly #lasts: boolean
  #listening = 0
  #end: (() => void) | null = null

  constructor(initial: T, source: Source<T>, lasts = true) {
    this.#cell = new Cell(initial)
    this.#initial = initial
    this.#lasts = lasts
    this.#source = source
  }

  get = (): T => this.#cell.get()

  subscribe = (listener: () => void): (() => void) => {
    const leave = this.#cell.subscribe(listener)
    this.#listening += 1
    if (this.#listening === 1) this.#end = this.#source((value) => this.#cell.set(value))
    let left = false
    return () => {
      if (left) return
      left = true
      leave()
      this.#listening -= 1
      if (this.#listening > 0) return
      this.#end?.()
      this.#end = null
      if (!this.#lasts) this.#cell.set(this.#initial)
    }
  }
}
