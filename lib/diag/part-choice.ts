import type { SpecSheet } from '@/lib/model/machine-model'
import type { PartRequest } from '@/lib/model/part-request'
import { type Bounded, mustFit, unfit } from './figure-bounds'

/**
 * Figures of the choice between a genuine and an aftermarket part: money in minor units from 0, chances 0 to 1. What
 * is outside breaks an assumption here (AppError); `adviceFor` parses the sheet's own figures.
 */
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
  mustFit(boundsOf(figures))
  const saved = figures.genuineMinor - figures.aftermarketMinor
  if (figures.recoveryMinor === 0) return saved > 0 ? 1 : saved < 0 ? 0 : figures.genuineFails
  return Math.min(1, Math.max(0, figures.genuineFails + saved / figures.recoveryMinor))
}

/** Which part to fit by expected cost = price + chance of failing x second recovery; equal within half a minor unit. */
export function advisePart(figures: PartFigures & { aftermarketFails: number | null }): PartAdvice {
  mustFit(boundsOf(figures))
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

/** A part as the spec sheet prices it: money in minor units, failures of 100. */
export type SheetPart = SpecSheet['parts'][number]

/** An advice with the figures it follows from. */
export type AdvisedPart = {
  figures: PartFigures & { aftermarketFails: number | null }
  advice: PartAdvice
}

/**
 * Genuine against aftermarket for a part of the spec sheet (F8). `recoveryMinor`: what a second recovery costs
 * the shop. Null when there is no choice to advise on: no such part, no aftermarket one, no recovery cost, or
 * figures that cannot be, as more failures than parts.
 */
export function adviceFor(
  part: SheetPart | null,
  recoveryMinor: number | null,
): AdvisedPart | null {
  if (part === null || part.aftermarketMinor === null || recoveryMinor === null) return null
  const { genuineMinor, aftermarketMinor, genuineFailsOf100, aftermarketFailsOf100 } = part
  const figures = {
    genuineMinor,
    aftermarketMinor,
    recoveryMinor,
    genuineFails: genuineFailsOf100 / 100,
    aftermarketFails: aftermarketFailsOf100 === null ? null : aftermarketFailsOf100 / 100,
  }
  return unfit(boundsOf(figures)) === null ? { figures, advice: advisePart(figures) } : null
}

const MONEY = [0, Number.MAX_SAFE_INTEGER] as const

const boundsOf = (
  figures: PartFigures & { aftermarketFails?: number | null },
): Record<string, Bounded> => ({
  genuineMinor: [figures.genuineMinor, ...MONEY],
  aftermarketMinor: [figures.aftermarketMinor, ...MONEY],
  recoveryMinor: [figures.recoveryMinor, ...MONEY],
  genuineFails: [figures.genuineFails, 0, 1],
  aftermarketFails: [figures.aftermarketFails ?? 0, 0, 1],
})

/** The sum as it goes with the part request, so that the desk sees what was shown in the field (F8). */
export function adviceRecord(advised: AdvisedPart | null): PartRequest['advice'] {
  if (advised === null) return null
  const { figures, advice } = advised
  return { ...figures, breakEven: advice.breakEven, advised: advice.advised }
}
