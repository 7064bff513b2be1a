import { type ActionTable, checkTable, swapTable } from './action-table'
import { type Reckoning, reckon } from './belief'
import type { Case } from './case'
import { type Sight, sightOf } from './evidence-table'
import { MOST_STATES, summarise } from './joint'
import { SAYS_NOTHING_BELOW } from './news'

/** What one outcome would lead to: how likely it is now, and every suspect's chance after it (0 to 1). */
export type Outcome = {
  outcome: string
  name: string
  good: boolean
  probability: number
  chances: Record<string, number>
}

/**
 * The outlook of a check or swap: every outcome with its chance and the belief it would lead to. A reading is
 * looked at with the case's meter. Empty for an unknown id and for a swap whose steps have told all they can.
 */
export function outlook(c: Case, action: { kind: 'check' | 'swap'; id: string }): Outcome[] {
  const reckoning = reckon(c)
  const table = tableFor(sightOf(c, reckoning.suspects), action)
  return table === null ? [] : outlookOf(reckoning, table).outcomes
}

/** The table of an action by its id; null when there is none or it has nothing more to tell. */
export function tableFor(
  sight: Sight,
  { kind, id }: { kind: 'check' | 'swap'; id: string },
): ActionTable | null {
  const check = kind === 'check' ? sight.c.index.checks.get(id) : undefined
  if (check !== undefined) return checkTable(sight, check)
  const swap = kind === 'swap' ? sight.c.index.swaps.get(id) : undefined
  return swap === undefined ? null : swapTable(sight, swap)
}

/** Combinations of states of an outlook: four times those of the belief it is an outlook on. */
const MOST_OUTLOOK_STATES = 4 * MOST_STATES

/**
 * The outlook on a reckoned belief, and whether no outcome moves any suspect by 3 of 100 or more. Without outcomes
 * where one of them cannot be summed with the evidence (joint.ts).
 */
export function outlookOf(
  { suspects, last, factors }: Reckoning,
  table: ActionTable,
): { outcomes: Outcome[]; saysNothing: boolean } {
  const odds = suspects.map((s) => s.odds)
  const others = [...factors].flatMap(([slot, f]) => (table.replaces.includes(slot) ? [] : [f]))
  const summaries = table.factors.map((factor) =>
    summarise(odds, [...others, factor], MOST_OUTLOOK_STATES),
  )
  const all = summaries.filter((s) => s !== null)
  if (all.length < summaries.length) return { outcomes: [], saysNothing: false }
  const most = Math.max(...all.map((s) => s.logEvidence))
  const weights = all.map((s) => Math.exp(s.logEvidence - most))
  const total = weights.reduce((sum, w) => sum + w, 0)
  const outcomes = table.outcomes.map(({ id, name, good }, k) => {
    const probability = (weights[k] ?? 0) / total
    const chances = suspects.map((s, f) => [s.fault, all[k]?.marginals[f] ?? 0] as const)
    return { outcome: id, name, good, probability, chances: Object.fromEntries(chances) }
  })
  const moved = all.some((s) =>
    s.marginals.some((p, f) => Math.abs(p - (last.marginals[f] ?? 0)) >= SAYS_NOTHING_BELOW),
  )
  return { outcomes, saysNothing: !moved }
}
