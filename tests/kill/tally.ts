/** What a loop of kills counted, for its last line. */
export class Tally {
  readonly #sums = new Map<string, number>()
  readonly #began = performance.now()

  add(name: string, by = 1): void {
    this.#sums.set(name, (this.#sums.get(name) ?? 0) + by)
  }

  of(name: string): number {
    return this.#sums.get(name) ?? 0
  }

  /** `rounds 10, kills 13, ..., 24.1 s` */
  line(): string {
    const sums = [...this.#sums].map(([name, count]) => `${name} ${count}`)
    return [...sums, `${((performance.now() - this.#began) / 1000).toFixed(1)} s`].join(', ')
  }
}

/** What one loop is told. The seed draws everything that is left to chance but what the machine's own pace decides. */
export type Loop = { rounds: number; seed: number; say(words: string): void }

/** Ends the loop with what was promised and not kept. */
export function broken(rule: string, words: string): never {
  throw new Error(`${rule}: ${words}`)
}

export const pause = (ms: number) => new Promise<void>((done) => setTimeout(done, ms))
