import { type Effect, effectsOf } from '@/lib/diag/decides'
import type { Outcome } from '@/lib/diag/outlook'
import type { Plan } from '@/lib/diag/plan'
import { shortName } from '../suspects/outlook-words'
import { outlookKey } from './outlook-key'
import type { Answer } from './work'

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
  return effectsOf(outlook, answer.belief.suspects)
    .map(
      ({ outcome, effect }) => `${outcomeName(outcome, outlook.length)}: ${effectWords(effect)}.`,
    )
    .join(' ')
}

const outcomeName = (row: Outcome, count: number): string =>
  count === 2 ? (row.good ? 'Good' : 'Bad') : shortName(row)

function effectWords(effect: Effect | null): string {
  if (effect === null) return 'nothing changes'
  const name = lowerFirst(effect.suspect.name)
  switch (effect.kind) {
    case 'itIs':
      return `${name} it is`
    case 'allButCleared':
      return `${name} all but cleared`
    case 'first':
      return `${name} first, ${Math.round(100 * effect.chance)} of 100`
  }
}

const lowerFirst = (words: string): string =>
  /^[A-Z][a-z]/.test(words) ? `${words.slice(0, 1).toLowerCase()}${words.slice(1)}` : words
