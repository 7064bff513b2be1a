/**
 * The heaviest sets of suspects under evidence that is too wide for the exact sum (joint.ts): grown suspect by
 * suspect from the heaviest of one fewer, until what a further size adds is nothing. Each sum is short by the sets
 * it does not find, by a little where few suspects explain what was seen, and the caller says that it is not exact.
 */
import { type Machine, moveOne, worthOf } from './machine'
import type { Sums } from './sweep'

/** Sets of each size that are grown further; sizes looked at; where a size's share is nothing. */
const KEPT = 200
const MOST_PRESENT = 12
const NOTHING = 1e-12

/** A set with where each machine stands after it, and what each says of it. */
type Found = {
  members: readonly number[]
  odds: number
  states: readonly (readonly number[])[]
  worths: readonly number[]
  weight: number
}

/** The sums of sweep.ts over the heaviest sets found; `shares` in the order of `suspects`. */
export function heaviestSets(
  machines: readonly Machine[],
  { suspects, odds }: { suspects: readonly number[]; odds: readonly number[] },
): Sums {
  const empty = emptySet(machines)
  const place = new Map(suspects.map((f, i) => [f, i]))
  const present = suspects.map(() => 0)
  let some = 0
  let heaviest: readonly Found[] = [empty]
  for (let size = 1; size <= Math.min(MOST_PRESENT, suspects.length); size++) {
    const grown = grow(machines, heaviest, { suspects, odds })
    let added = 0
    for (const { members, weight } of grown) {
      added += weight
      for (const f of members) {
        const at = place.get(f) ?? 0
        present[at] = (present[at] ?? 0) + weight
      }
    }
    some += added
    if (size > 1 && added < NOTHING * some) break
    heaviest = grown.sort((a, b) => b.weight - a.weight).slice(0, KEPT)
  }
  const shares = present.map((weight) => (some > 0 ? weight / some : 0))
  return { none: empty.weight, some, log: 0, shares }
}

function emptySet(machines: readonly Machine[]): Found {
  const states = machines.map((m) => m.start)
  const worths = machines.map((m) => worthOf(m, m.start))
  return { members: [], odds: 1, states, worths, weight: product(worths) }
}

function grow(
  machines: readonly Machine[],
  from: readonly Found[],
  { suspects, odds }: { suspects: readonly number[]; odds: readonly number[] },
): Found[] {
  const grown = new Map<string, Found>()
  for (const set of from)
    for (const f of suspects) {
      if (set.members.includes(f)) continue
      const members = [...set.members, f].sort((a, b) => a - b)
      const key = members.join()
      if (grown.has(key)) continue
      const states = machines.map((m, i) => moveOne(m, f, set.states[i] ?? m.start))
      const worths = machines.map((m, i) =>
        m.moves.has(f) ? worthOf(m, states[i] ?? m.start) : (set.worths[i] ?? 0),
      )
      const all = set.odds * (odds[f] ?? 0)
      grown.set(key, { members, odds: all, states, worths, weight: all * product(worths) })
    }
  return [...grown.values()]
}

const product = (of: readonly number[]): number => of.reduce((all, x) => all * x, 1)
