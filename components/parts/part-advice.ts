import { advisePart, type PartAdvice, type PartFigures } from '@/lib/diag/part-choice'
import type { SpecSheet } from '@/lib/model/code-book'
import type { PartRequest } from '@/lib/model/part-request'
import { moneyWords } from '../checks/words'
import { fixed } from '../reading-strip/figures'

export type SheetPart = SpecSheet['parts'][number]
export type Advised = {
  figures: PartFigures & { aftermarketFails: number | null }
  advice: PartAdvice
}

/** Genuine against aftermarket by expected cost; null when the sheet knows only one of them. */
export function adviceFor(part: SheetPart | null, recoveryMinor: number | null): Advised | null {
  if (part === null || part.aftermarketMinor === null || recoveryMinor === null) return null
  const figures = {
    genuineMinor: part.genuineMinor,
    aftermarketMinor: part.aftermarketMinor,
    recoveryMinor,
    genuineFails: part.genuineFailsOf100 / 100,
    aftermarketFails: part.aftermarketFailsOf100 === null ? null : part.aftermarketFailsOf100 / 100,
  }
  return { figures, advice: advisePart(figures) }
}

/** The advice in plain sentences: what to fit and the two expected costs it follows from. */
export function adviceSentences({ figures, advice }: Advised, currency: string): string[] {
  const even = `Break-even: the aftermarket part pays until ${fixed(advice.breakEven * 100, 1)} of 100 fail.`
  if (figures.aftermarketFails === null)
    return [even, 'The shop has no failure figure for the aftermarket part, so there is no advice.']
  const of = (minor: number | null) =>
    minor === null ? '' : moneyWords(Math.round(minor), currency)
  const costs = `Expected cost with one recovery in it: genuine ${of(advice.expectedGenuineMinor)}, aftermarket ${of(advice.expectedAftermarketMinor)}.`
  return [even, costs, VERDICTS[advice.advised]]
}

const VERDICTS: Record<PartAdvice['advised'], string> = {
  genuine: 'By expected cost: fit the genuine part.',
  aftermarket: 'By expected cost: fit the aftermarket part.',
  equal: 'By expected cost they come out equal.',
  noFigure: 'No failure figure, no advice.',
}

/** The sum as it goes with the request, so that the desk sees what was shown. */
export function adviceRecord(advised: Advised | null): PartRequest['advice'] {
  if (advised === null) return null
  const { figures, advice } = advised
  return { ...figures, breakEven: advice.breakEven, advised: advice.advised }
}
