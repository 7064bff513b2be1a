/**
 * Set-ups of the plan: what has to be opened or waited for before a check or a repair, paid once while it stays open.
 */
import type { LogBody } from '@/lib/model/log-entry'
import type { BookIndex } from './book-index'
import type { Case } from './case'
import { type Means, minutesHere } from './plan-means'
import type { SingleModel } from './troubleshoot-model'

/** The set-ups that these actions use, with all that they require in turn, in the order of the book. */
export function setupsFor(
  { index }: Pick<Case, 'index'>,
  { used, means }: { used: readonly string[]; means: Means },
): NonNullable<SingleModel['setups']> {
  const wanted = new Set<string>()
  const want = (id: string): void => {
    if (wanted.has(id)) return
    wanted.add(id)
    index.setups.get(id)?.requires.forEach(want)
  }
  used.forEach(want)
  return [...index.setups.values()]
    .filter(({ id }) => wanted.has(id))
    .map(({ id, minutes, requires, closedByTest }) => ({
      id,
      minutes: minutesHere(minutes, means),
      requires,
      closedByTest,
    }))
}

/** Set-ups opened by what was done since the last test run, where a test run closes them, else for good. */
export function openSetups({ entries, index }: Case): string[] {
  const closed = closedByTest(index)
  let open: string[] = []
  for (const { body } of entries) {
    if (body.kind === 'proofRun' && body.starts + body.minutes > 0)
      open = open.filter((id) => !closed.has(id))
    open.push(...setupsTaken(index, body).filter((id) => index.setups.has(id)))
  }
  return [...new Set(open)]
}

function setupsTaken(index: BookIndex, body: LogBody): readonly string[] {
  switch (body.kind) {
    case 'check':
    case 'reading':
      return index.checks.get(body.checkId)?.setups ?? []
    case 'swap':
      return index.swaps.get(body.swapId)?.setups ?? []
    case 'fix':
      return index.faults.get(body.fault)?.repair?.setups ?? []
    default:
      return []
  }
}

/** Set-ups that a test run closes: those that say so and all that require them. */
function closedByTest({ setups }: BookIndex): ReadonlySet<string> {
  const all = [...setups.values()]
  const closed = new Set(all.flatMap((s) => (s.closedByTest ? [s.id] : [])))
  for (let before = -1; before < closed.size; ) {
    before = closed.size
    for (const { id, requires } of all) if (requires.some((r) => closed.has(r))) closed.add(id)
  }
  return closed
}
