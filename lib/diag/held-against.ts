import type { Verdict } from './reading'

/**
 * A figure held against limits with its expanded uncertainty (ISO 14253-1): `in` or `out` only when the whole of
 * figure +-U lies inside or outside, else `tooClose`. Limits belong to the inside; null is no limit on that side.
 */
export function heldAgainst(
  figure: number,
  expandedU: number,
  { low, high }: { low: number | null; high: number | null },
): Verdict {
  const [least, most] = [low ?? Number.NEGATIVE_INFINITY, high ?? Number.POSITIVE_INFINITY]
  if (figure + expandedU < least) return 'outLow'
  if (figure - expandedU > most) return 'outHigh'
  return figure - expandedU >= least && figure + expandedU <= most ? 'in' : 'tooClose'
}
