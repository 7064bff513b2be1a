import type { PartRequest } from '@/lib/model/part-request'
import { moneyWords } from '@/lib/shop/currency'
import { aftermarketWords, breakEvenWords, shareOf100 } from '@/lib/shop/part-words'

type Advice = NonNullable<PartRequest['advice']>

const ADVISED: Record<Advice['advised'], string> = {
  genuine: 'Genuine advised',
  aftermarket: 'Aftermarket advised',
  equal: 'Equal by expected cost',
  noFigure: 'No failure figure, no advice',
}

/** The advice as it was shown in the field when the part was asked for: first what, then from what. */
export function adviceWords(advice: Advice, currency: string): { first: string; from: string } {
  const money = (minor: number) => moneyWords(minor, currency)
  return {
    first: `${ADVISED[advice.advised]}. ${breakEvenWords(advice.breakEven)}`,
    from: `Genuine ${money(advice.genuineMinor)}, fails ${shareOf100(advice.genuineFails)} of 100. Aftermarket ${money(advice.aftermarketMinor)}. ${aftermarketWords(advice.aftermarketFails)} Second recovery ${money(advice.recoveryMinor)}.`,
  }
}
