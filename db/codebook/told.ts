import type { SymptomItem } from '@/lib/model/code-book'

type Condition = SymptomItem['conditions'][number]

/** A condition, and of 100 such calls with each fault behind them, in how many the rider would say so. */
export const told = (
  id: string,
  name: string,
  otherwise: number,
  of100: Readonly<Record<string, number>>,
): Condition => ({ id, name, tells: { of100, otherwise } })

/** Conditions of which a rider names one at most: the answers to one question. */
export const asked = (answers: string, conditions: readonly Condition[]): Condition[] =>
  conditions.map((one) => ({ ...one, answers }))
