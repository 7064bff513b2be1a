import type { AdvisedPart, PartAdvice } from '@/lib/diag/part-choice'
import { moneyWords } from '@/lib/shop/currency'
import { aftermarketWords, breakEvenWords } from '@/lib/shop/part-words'

/** The advice in plain sentences: what to fit and the two expected costs it follows from. */
export function adviceSentences({ figures, advice }: AdvisedPart, currency: string): string[] {
  const even = breakEvenWords(advice.breakEven)
  if (figures.aftermarketFails === null)
    return [even, `${aftermarketWords(null)} ${VERDICTS.noFigure}`]
  const of = (minor: number | null) =>
    minor === null ? '' : moneyWords(Math.round(minor), currency)
  const costs = `Expected cost with one recovery in it: genuine ${of(advice.expectedGenuineMinor)}, aftermarket ${of(advice.expectedAftermarketMinor)}.`
  return [even, costs, VERDICTS[advice.advised]]
}

const VERDICTS: Record<PartAdvice['advised'], string> = {
  genuine: 'By expected cost: fit the genuine part.',
  aftermarket: 'By expected cost: fit the aftermarket part.',
  equal: 'By expected cost they come out equal.',
  noFigure: 'So there is no advice.',
}
