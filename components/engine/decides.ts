import type { Suspect } from '@/lib/diag/belief'
import { SOMETHING_ELSE } from '@/lib/diag/book-index'
import type { Outcome } from '@/lib/diag/outlook'
import type { Plan } from '@/lib/diag/plan'
import { shortName } from '../suspects/outlook-words'
import { outlookKey } from './outlook-key'
import type { Answer } from './work'

/** Outcomes rarer than this are left out of the sentence; they stand in the marks of each suspect. */
const RARE = 0.08
const IT_IS = 0.9
const CLEARED = 0.1
const MOST_SAID = 3

/** Where the outcomes of the plan's own next step would put each suspect; empty for repairs and ways out. */
export function nextOutlook(answer: Answer | null): readonly Outcome[] {
  const next = answer?.plan?.next
  if (answer === null || (next?.type !== 'check' && next?.type !== 'swap')) return []
  return answer.outlooks[outlookKey({ kind: next.type, id: next.id })] ?? []
}

/** What the next step decides, short enough for the plate: `Good: stator all but cleared. Bad: stator it is.` */
export function decidesWords(answer: Answer, plan: Plan): string {
  const outlook = nextOutlook(answer)
  if (outlook.length === 0) return plan.decides
  const said = outlook
    .filter((row) => row.probability >= RARE)
    .sort((a, b) => b.probability - a.probability)
    .slice(0, MOST_SAID)
  const suspects = answer.belief.suspects
  return outlook
    .filter((row) => said.includes(row))
    .map((row) => `${outcomeName(row, outlook.length)}: ${effectOf(row, suspects)}.`)
    .join(' ')
}

const outcomeName = (row: Outcome, count: number): string =>
  count === 2 ? (row.good ? 'Good' : 'Bad') : shortName(row)

/** The plainest true thing about one outcome: who it is, who is out, or who is first and how surely. */
function effectOf(row: Outcome, suspects: readonly Suspect[]): string {
  const after = (suspect: Suspect) => row.chances[suspect.fault] ?? suspect.chance
  const ranked = [...suspects].sort((a, b) => after(b) - after(a))
  const first = ranked[0]
  if (first === undefined) return 'nothing changes'
  const name = lowerFirst(first.name)
  if (after(first) >= IT_IS && first.fault !== SOMETHING_ELSE) return `${name} it is`
  const now = suspects[0]
  if (now !== undefined && now.chance >= 2 * CLEARED && after(now) < CLEARED)
    return `${lowerFirst(now.name)} all but cleared`
  return `${name} first, ${Math.round(100 * after(first))} of 100`
}

const lowerFirst = (words: string): string =>
  /^[A-Z][a-z]/.test(words) ? `${words.slice(0, 1).toLowerCase()}${words.slice(1)}` : words
