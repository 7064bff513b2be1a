import type { AdvisedPart, PartAdvice } from '@/lib/diag/part-choice'
import { moneyWords } from '../checks/words'
import { fixed } from '../reading-strip/figures'

/** The advice in plain sentences: what to fit and the two expected costs it follows from. */
export function adviceSentences({ figures, advice }: AdvisedPart, currency: string): string[] {
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
