/** What the plan's next step leads to: each of its outcomes, how likely it is, and what would be done after it. */
import { SWAP_OUTCOMES } from './action-table'
import type { Case } from './case'
import type { Kind } from './plan-means'
import type { LeadsTo } from './troubleshoot'

/** An outcome by the book's id and name, its chance (0 to 1), and the step after it; null when the job is over. */
export type PlanOutcome = {
  outcome: string
  name: string
  chance: number
  next: { type: Kind; id: string; name: string } | null
}

/** The outcomes of a step in the words of the book, in its order; empty for a way out. */
export function planOutcomes(
  c: Case,
  step: { type: Kind; id: string },
  leads: readonly LeadsTo[],
): PlanOutcome[] {
  const names = namesOf(c, step)
  return leads.map(({ outcome, chance, next }) => {
    const after = next && kindOf(c, next)
    return {
      outcome,
      name: names.find((o) => o.id === outcome)?.name ?? outcome,
      chance,
      next: after && { ...after, name: stepName(c, after) },
    }
  })
}

const REPAIR_OUTCOMES = [
  { id: 'cured', name: 'Cured, and the test run is clean' },
  { id: 'passedWrongly', name: 'Not cured, though the test run is clean' },
  { id: 'failed', name: 'Not cured, and the test run shows it' },
]

function namesOf(
  c: Case,
  { type, id }: { type: Kind; id: string },
): readonly { id: string; name: string }[] {
  if (type === 'swap') return SWAP_OUTCOMES
  return type === 'repair' ? REPAIR_OUTCOMES : (c.index.checks.get(id)?.outcomes ?? [])
}

/** Checks and swaps share one list in the model; the book tells them apart. */
export const kindOf = (
  c: Case,
  { type, id }: { type: 'check' | 'repair' | 'stop'; id: string },
): { type: Kind; id: string } => ({
  type: type === 'check' && c.index.swaps.has(id) ? 'swap' : type,
  id,
})

const STOP_NAMES: Record<string, string> = {
  tow: 'Tow it out',
  returnLater: 'Return later',
}

/** A step as it is called on the screen. */
export function stepName({ index }: Case, { type, id }: { type: Kind; id: string }): string {
  if (type === 'check') return index.checks.get(id)?.name ?? id
  if (type === 'swap') return index.swaps.get(id)?.name ?? id
  if (type === 'stop') return STOP_NAMES[id] ?? id
  return `Repair: ${index.faults.get(id)?.name ?? id}`
}
