/**
 * What the next step decides, as the plainest true thing about each of its outcomes (F5, rule R23): it is this
 * suspect, the present first is all but cleared, or who is first then and how surely. Outcomes that hardly
 * happen are left out; they stand in the marks of each suspect. The limits are guesses about what a person uses.
 */
import type { Suspect } from './belief'
import { SOMETHING_ELSE } from './book-index'
import type { Outcome } from './outlook'

/** Outcomes less likely than this (0 to 1) are not said, and never more than the three likeliest. */
const RARE = 0.08
const MOST_SAID = 3
/** A suspect at this chance or more after an outcome is called the one; under the other it is all but cleared. */
const IT_IS = 0.9
const CLEARED = 0.1

/** What one outcome would lead to; `chance` (0 to 1) is that of the suspect named, after it. */
export type Effect = {
  kind: 'itIs' | 'allButCleared' | 'first'
  suspect: Suspect
  chance: number
}

/** The outcomes worth saying in their own order, each with its effect; null where there is no suspect. */
export function effectsOf(
  outlook: readonly Outcome[],
  suspects: readonly Suspect[],
): { outcome: Outcome; effect: Effect | null }[] {
  const said = outlook
    .filter((row) => row.probability >= RARE)
    .sort((a, b) => b.probability - a.probability)
    .slice(0, MOST_SAID)
  return outlook
    .filter((row) => said.includes(row))
    .map((outcome) => ({ outcome, effect: effectOf(outcome, suspects) }))
}

function effectOf(row: Outcome, suspects: readonly Suspect[]): Effect | null {
  const after = ({ fault, chance }: Suspect) =>
    (Object.hasOwn(row.chances, fault) ? row.chances[fault] : undefined) ?? chance
  const [first] = [...suspects].sort((a, b) => after(b) - after(a))
  const [now] = suspects
  if (first === undefined || now === undefined) return null
  if (after(first) >= IT_IS && first.fault !== SOMETHING_ELSE)
    return { kind: 'itIs', suspect: first, chance: after(first) }
  if (now.chance >= 2 * CLEARED && after(now) < CLEARED)
    return { kind: 'allButCleared', suspect: now, chance: after(now) }
  return { kind: 'first', suspect: first, chance: after(first) }
}
