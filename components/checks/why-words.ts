import type { Suspect } from '@/lib/diag/belief'
import { tellsNothing, weighsNothing } from '@/lib/diag/news'

type Why = Suspect['why'][number]

export type WhyLine = {
  direction: 'towards' | 'against' | 'nothing'
  /** `4.2 times`: by how much the odds of the suspect grew or shrank. */
  factor: string
  strength: string
}

/** Natural-log steps between the words; e.g. under 0.1 the odds change by less than 10 of 100. */
const STRENGTHS: readonly [number, string][] = [
  [0.1, 'hardly'],
  [0.7, 'a little'],
  [1.6, 'clearly'],
  [3, 'strongly'],
]

/** How strongly one piece of evidence speaks, in words and as a factor on the odds. */
export function whyLine(why: Pick<Why, 'logRatio' | 'saysNothing'>): WhyLine {
  if (weighsNothing(why))
    return { direction: 'nothing', factor: '', strength: 'says nothing about it' }
  const size = Math.abs(why.logRatio)
  const word = STRENGTHS.find(([below]) => size < below)?.[1] ?? 'very strongly'
  const direction = why.logRatio > 0 ? 'towards' : 'against'
  return {
    direction,
    factor: factorWords(Math.exp(size)),
    strength: `speaks ${word} ${direction} it`,
  }
}

function factorWords(factor: number): string {
  if (factor >= 1000) return 'over 1,000 times'
  if (factor >= 10) return `${Math.round(factor)} times`
  return `${factor.toFixed(factor < 1.095 ? 2 : 1)} times`
}

/** What the belief did between two answers, for "before and after a reading". */
export type Moved = { fault: string; name: string; before: number; after: number }

/** Suspects by how far they moved, farthest first; `barely` when none moved by 3 of 100. */
export function movedBetween(
  before: readonly Suspect[],
  after: readonly Suspect[],
): { rows: Moved[]; barely: boolean } {
  const was = new Map(before.map((suspect) => [suspect.fault, suspect.chance]))
  const rows = after
    .map(({ fault, name, chance }) => ({
      fault,
      name,
      before: was.get(fault) ?? chance,
      after: chance,
    }))
    .sort(
      (a, b) => Math.abs(b.after - b.before) - Math.abs(a.after - a.before) || b.after - a.after,
    )
  const most = rows[0]
  return { rows, barely: most === undefined || tellsNothing([most.before, most.after]) }
}
