/**
 * Bounds of figures that people type or meters show: every sum of the trade first names the field that cannot
 * be, so that no NaN and no impossible figure comes out of it (rule [A1] of docs/spec/diag.md).
 */

import { AppError } from '@/lib/model/result'

/** A figure that cannot be: its field, and the bound it breaks in the field's own unit. */
export type FigureProblem =
  | { kind: 'notANumber'; field: string }
  | { kind: 'below'; field: string; limit: number }
  | { kind: 'above'; field: string; limit: number }

/** A field's value with the least and the most it can be; both ends belong to the range. */
export type Bounded = readonly [value: number, least: number, most: number]

/** The first figure outside its bounds, in the order of the fields; null when all fit. Infinite is no number. */
export function unfit(fields: Readonly<Record<string, Bounded>>): FigureProblem | null {
  for (const [field, [value, least, most]] of Object.entries(fields)) {
    if (!Number.isFinite(value)) return { kind: 'notANumber', field }
    if (value < least) return { kind: 'below', field, limit: least }
    if (value > most) return { kind: 'above', field, limit: most }
  }
  return null
}

/** The same bounds for each figure of a list, as fields `name.1`, `name.2` and so on. */
export const eachWithin = (
  name: string,
  values: readonly number[],
  least: number,
  most: number,
): Record<string, Bounded> =>
  Object.fromEntries(values.map((value, i) => [`${name}.${i + 1}`, [value, least, most]]))

/** Breaks off (AppError) at a figure outside its bounds: for sums whose callers have parsed their figures first. */
export function mustFit(fields: Readonly<Record<string, Bounded>>): void {
  const problem = unfit(fields)
  if (problem !== null) throw new AppError('figureOutOfRange', { context: problem })
}
