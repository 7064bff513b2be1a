import type { CheckItem } from '@/lib/model/code-book'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Belief } from './belief'
import type { BookIndex } from './book-index'
import { holdsIn, type Taken } from './withdrawn-in'

/**
 * The book without what was withdrawn from it, whichever version it is: no such check or swap is offered, no such
 * fault suspected, and a check whose limit was withdrawn has no limit of the book's any more. What was read
 * against that limit says nothing. The very index it was given when nothing of it is withdrawn.
 */
export function withoutWithdrawn(index: BookIndex, taken: readonly Taken[]): BookIndex {
  const holding = taken.filter(
    (one) => one.what !== 'version' && one.itemId !== null && holdsIn(one, index.version),
  )
  if (holding.length === 0) return index
  const gone = (what: Taken['what']) =>
    new Set(holding.flatMap((one) => (one.what === what ? (one.itemId ?? []) : [])))
  const [checks, swaps, faults, limits] = [
    gone('check'),
    gone('swap'),
    gone('fault'),
    gone('limit'),
  ]
  const left = <T>(of: ReadonlyMap<string, T>, keep: (id: string, item: T) => boolean) =>
    new Map([...of].filter(([id, item]) => keep(id, item)))
  const known = left(index.checks, (id) => !checks.has(id))
  const withdrawnLimits = new Map<string, Limit>()
  for (const id of limits) {
    const check = known.get(id)
    if (check?.reading?.fallback == null) continue
    withdrawnLimits.set(id, check.reading.fallback)
    known.set(id, { ...check, reading: { ...check.reading, fallback: null } })
  }
  return {
    ...index,
    checks: known,
    swaps: left(index.swaps, (id, swap) => !swaps.has(id) && !faults.has(swap.fault)),
    faults: left(index.faults, (id) => !faults.has(id)),
    withdrawn: holding.map(({ id }) => id).sort(),
    withdrawnLimits,
  }
}

type Limit = NonNullable<NonNullable<CheckItem['reading']>['fallback']>

/** True for an entry that is about what was withdrawn. `index` is the book with it still in. */
export function restsOn(
  { body }: Pick<LogEntry, 'body'>,
  { what, itemId }: Pick<Taken, 'what' | 'itemId'>,
): boolean {
  switch (what) {
    case 'check':
      return (body.kind === 'check' || body.kind === 'reading') && body.checkId === itemId
    case 'limit':
      return body.kind === 'reading' && body.checkId === itemId
    case 'swap':
      return body.kind === 'swap' && body.swapId === itemId
    case 'fault':
      return body.kind === 'fix' && body.fault === itemId
    case 'version':
      return false
  }
}

/** A suspect and its chance of 100, as a screen shows it. */
export type Leading = { name: string; of100: number }
/** How a verdict reads before and after; null in it: there is no suspect. */
export type VerdictChange = { before: Leading | null; after: Leading | null }

/**
 * What becomes of a job's verdict: the likeliest suspect before and after. Null when no chance that is shown,
 * in whole numbers of 100, is another one.
 */
export function verdictChange(before: Belief, after: Belief): VerdictChange | null {
  const was = shown(before)
  const is = shown(after)
  const same = was.size === is.size && [...was].every(([fault, of100]) => is.get(fault) === of100)
  return same ? null : { before: leading(before), after: leading(after) }
}

const of100 = (chance: number): number => Math.round(chance * 100)
const shown = ({ suspects }: Belief) =>
  new Map(suspects.map(({ fault, chance }) => [fault, of100(chance)]))
const leading = ({ suspects: [first] }: Belief): Leading | null =>
  first === undefined ? null : { name: first.name, of100: of100(first.chance) }
