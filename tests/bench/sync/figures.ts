// Medians and spreads. Absolute times of a busy machine say little: bars are ratios of what was measured
// turn by turn in one run.

/** The middle of the figures; of two middle ones their mean. */
export function median(figures: readonly number[]): number {
  return quantile(figures, 0.5)
}

/** The figure below which that share of them lies (linear between neighbours). */
export function quantile(figures: readonly number[], share: number): number {
  const sorted = [...figures].sort((a, b) => a - b)
  const at = share * (sorted.length - 1)
  const low = sorted[Math.floor(at)] ?? Number.NaN
  const high = sorted[Math.ceil(at)] ?? Number.NaN
  return low + (high - low) * (at - Math.floor(at))
}

/** What is told of a series: median, quartiles, 95th percentile and how many. */
export type Summary = { median: number; low: number; high: number; p95: number; n: number }

export const summary = (figures: readonly number[]): Summary => ({
  median: median(figures),
  low: quantile(figures, 0.25),
  high: quantile(figures, 0.75),
  p95: quantile(figures, 0.95),
  n: figures.length,
})

/** The ratios of two series measured in turns, one for each turn. */
export const ratios = (ours: readonly number[], floor: readonly number[]): number[] =>
  ours.map((figure, index) => figure / (floor[index] ?? Number.NaN))

/** A figure in as many digits as it deserves. */
export function digits(figure: number): string {
  if (!Number.isFinite(figure)) return '-'
  if (figure >= 100) return Math.round(figure).toLocaleString('en-GB').replaceAll(',', ' ')
  return figure >= 10 ? figure.toFixed(1) : figure.toFixed(2)
}

/** `12.3 (11.8 to 13.0)`: the median and the quartiles. */
export const spread = ({ median: middle, low, high }: Summary, unit = ''): string =>
  `${digits(middle)}${unit} (${digits(low)} to ${digits(high)})`

/** The arms of a turn, begun at another arm each time, so that none always runs first. */
export function turnOrder<T>(arms: readonly T[], turn: number): T[] {
  const start = turn % arms.length
  return [...arms.slice(start), ...arms.slice(0, start)]
}
