import type { SymptomItem } from '@/lib/model/code-book'

/** What is asked of a complaint, in its order; last, without a question, what stands for itself. */
export const questions = ({ conditions }: Pick<SymptomItem, 'conditions'>) =>
  [...new Set(conditions.map((c) => c.answers))].sort(
    (a, b) => Number(a === undefined) - Number(b === undefined),
  )

/** What is said after a tap: of the answers to one question the one picked last stays. */
export function oneEach(
  { conditions }: Pick<SymptomItem, 'conditions'>,
  before: readonly string[],
  now: readonly string[],
): string[] {
  const added = conditions.find((c) => now.includes(c.id) && !before.includes(c.id))
  const kept = (id: string) =>
    id === added?.id || conditions.find((c) => c.id === id)?.answers !== added?.answers
  return added?.answers === undefined ? [...now] : now.filter(kept)
}
