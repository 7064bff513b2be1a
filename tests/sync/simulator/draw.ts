import { uniformInt } from 'pure-rand/distribution/uniformInt'
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus'

/**
 * Everything the simulator leaves to chance. Each step has a stream of its own, worked out from the seed
 * and the step's number: a run that is cut short draws the same as the whole one up to there.
 */
export class Draw {
  readonly #generator: ReturnType<typeof xoroshiro128plus>

  constructor(seed: number, step: number) {
    const mixed = Math.imul(seed + 1, 0x9e3779b1) ^ Math.imul(step + 7, 0x85ebca6b)
    this.#generator = xoroshiro128plus(mixed | 0)
  }

  /** A whole number from 0 up to, not including, `end`. */
  below(end: number): number {
    return end <= 1 ? 0 : uniformInt(this.#generator, 0, end - 1)
  }

  /** A whole number from `low` to `high`, both included. */
  between(low: number, high: number): number {
    return low + this.below(high - low + 1)
  }

  /** An even figure from 0 up to, not including, 1. */
  share(): number {
    return this.below(1 << 24) / (1 << 24)
  }

  chance(share: number): boolean {
    return this.share() < share
  }

  /** One of a list; undefined of an empty one. */
  pick<T>(list: readonly T[]): T | undefined {
    return list[this.below(list.length)]
  }

  /** One of a list that is known not to be empty. */
  oneOf<T>(list: readonly T[]): T {
    const found = this.pick(list)
    if (found === undefined) throw new Error('nothing to draw from')
    return found
  }

  /** One of a table, by weight. */
  weighted<T extends { weight: number }>(table: readonly T[]): T {
    const sum = table.reduce((total, row) => total + row.weight, 0)
    let left = this.share() * sum
    for (const row of table) {
      left -= row.weight
      if (left < 0) return row
    }
    return this.oneOf(table)
  }
}
