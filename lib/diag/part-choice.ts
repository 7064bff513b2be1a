/** Figures of the choice between a genuine and an aftermarket part: money in minor units, chances 0 to 1. */
export type PartFigures = {
  genuineMinor: number
  aftermarketMinor: number
  /** What a second recovery costs when the fitted part fails. */
  recoveryMinor: number
  genuineFails: number
}

/** The advice with its arithmetic; `noFigure` when the shop has no failure figure for the aftermarket part. */
export type PartAdvice = {
  breakEven: number
  advised: 'genuine' | 'aftermarket' | 'equal' | 'noFigure'
  expectedGenuineMinor: number
  expectedAftermarketMinor: number | null
}

/**
 * The failure chance (0 to 1) at which the aftermarket part costs as much as the genuine one:
 * genuine fails + price difference / second recovery, by expected cost. Held within 0 to 1: 1 means that
 * no failure chance makes it the dearer one, 0 that none makes it the cheaper one. With a free second
 * recovery only the prices count.
 */
export function breakEven(figures: PartFigures): number {
  const saved = figures.genuineMinor - figures.aftermarketMinor
  if (figures.recoveryMinor <= 0) return saved > 0 ? 1 : saved < 0 ? 0 : figures.genuineFails
  return Math.min(1, Math.max(0, figures.genuineFails + saved / figures.recoveryMinor))
}

/** Which part to fit by expected cost = price + chance of failing x second recovery; equal within half a minor unit. */
export function advisePart(figures: PartFigures & { aftermarketFails: number | null }): PartAdvice {
  const expectedGenuineMinor = figures.genuineMinor + figures.genuineFails * figures.recoveryMinor
  const shared = { breakEven: breakEven(figures), expectedGenuineMinor }
  if (figures.aftermarketFails === null)
    return { ...shared, advised: 'noFigure', expectedAftermarketMinor: null }
  const expectedAftermarketMinor =
    figures.aftermarketMinor + figures.aftermarketFails * figures.recoveryMinor
  const difference = expectedGenuineMinor - expectedAftermarketMinor
  const advised = Math.abs(difference) < 0.5 ? 'equal' : difference > 0 ? 'aftermarket' : 'genuine'
  return { ...shared, advised, expectedAftermarketMinor }
}
