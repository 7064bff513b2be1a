/**
 * A likelihood over sets of suspects as a small machine with weights: it starts in a spread over its states, each
 * present suspect moves it, absent ones do not, and each state has a worth in the end. What a set is worth is the
 * sum over all ways through. No weight is below 0, so that sums over sets lose no digits. The machine forgets
 * which suspects it saw: that is what makes exact sums over 2^n sets quick (joint.ts).
 */

/** A move of a present suspect: from one state to another, with a weight of 0 or more. */
export type Move = readonly [from: number, to: number, weight: number]

/** A piece of evidence as a small machine that reads the suspects one by one. */
export type Machine = {
  start: readonly number[]
  end: readonly number[]
  /** Moves by suspect; one that has none here leaves every state as it is. */
  moves: ReadonlyMap<number, readonly Move[]>
}

/** What the machine says of a set of present suspects, in any order. */
export const runMachine = (machine: Machine, present: readonly number[]): number =>
  worthOf(
    machine,
    present.reduce<readonly number[]>((at, f) => moveOne(machine, f, at), machine.start),
  )

/** Where the machine stands after one more present suspect. */
export function moveOne(
  machine: Machine,
  suspect: number,
  at: readonly number[],
): readonly number[] {
  const own = machine.moves.get(suspect)
  return own === undefined ? at : moved(own, at)
}

/** What the machine says where it stands. */
export const worthOf = ({ end }: Machine, at: readonly number[]): number =>
  at.reduce((sum, weight, s) => sum + weight * (end[s] ?? 0), 0)

/** A product over the present suspects: one state. */
export function productMachine(of: ReadonlyMap<number, number>): Machine {
  const moves = new Map([...of].map(([f, weight]) => [f, [[0, 0, weight] as const]]))
  return { start: [1], end: [1], moves }
}

/**
 * A noisy-OR that was seen: 1 - (1 - leak) prod over the present of 1 - sets(f), without a difference. State 0: nothing
 * set it yet; state 1: it is set.
 */
export function seenMachine(leak: number, sets: ReadonlyMap<number, number>): Machine {
  const moves = new Map(
    [...sets].map(([f, set]) => {
      const own: Move[] = [
        [0, 0, 1 - set],
        [0, 1, set],
        [1, 1, 1],
      ]
      return [f, own]
    }),
  )
  return { start: [1 - leak, leak], end: [0, 1], moves }
}

/**
 * The mean of the present suspects' values, `none` with none of them present. One over their number k is the integral
 * of t^(k-1) over 0 to 1, which few points give exactly: at each of them every present suspect but the one that
 * speaks weighs t. Three points are exact up to six present; of more the mean is short by a few of 100 at most. Two
 * states a point: the one that speaks has not been among the present yet, or it has.
 */
export function meanMachine(none: number, values: ReadonlyMap<number, number>): Machine {
  const points = values.size <= 2 ? POINTS[0] : values.size <= 4 ? POINTS[1] : POINTS[2]
  const moves = new Map(
    [...values].map(([f, value]) => {
      const own: Move[] = points.flatMap(([t, weight], i): Move[] => {
        const [waiting, spoken] = [1 + 2 * i, 2 + 2 * i]
        return [
          [0, waiting, weight * t],
          [0, spoken, weight * value],
          [waiting, waiting, t],
          [waiting, spoken, value],
          [spoken, spoken, t],
        ]
      })
      return [f, own]
    }),
  )
  const end = [none, ...points.flatMap(() => [0, 1])]
  return { start: end.map((_, s) => (s === 0 ? 1 : 0)), end, moves }
}

/** Points of 0 to 1 with their weights: 1, 2 and 3 after Gauss (Abramowitz and Stegun 25.4.30). */
const POINTS = [
  [[1 / 2, 1]],
  [
    [1 / 2 - Math.sqrt(1 / 12), 1 / 2],
    [1 / 2 + Math.sqrt(1 / 12), 1 / 2],
  ],
  [
    [1 / 2 - Math.sqrt(3 / 20), 5 / 18],
    [1 / 2, 8 / 18],
    [1 / 2 + Math.sqrt(3 / 20), 5 / 18],
  ],
] as const

function moved(own: readonly Move[], at: readonly number[]): number[] {
  const next = at.map(() => 0)
  for (const [from, to, weight] of own) next[to] = (next[to] ?? 0) + weight * (at[from] ?? 0)
  return next
}
