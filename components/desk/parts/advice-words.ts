import type { PartRequest } from '@/lib/model/part-request'
import { moneyWords } from '../../checks/words'

type Advice = NonNullable<PartRequest['advice']>

const ADVISED: Record<Advice['advised'], string> = {
  genuine: 'Genuine advised',
  aftermarket: 'Aftermarket advised',
  equal: 'Equal by expected cost',
  noFigure: 'No advice: no failure figure for the aftermarket part',
}

const of100 = (share: number) => (share * 100).toFixed(1).replace(/\.0$/, '')

/** The advice as it was shown in the field when the part was asked for: first what, then from what. */
export function adviceWords(advice: Advice, currency: string): { first: string; from: string } {
  const money = (minor: number) => moneyWords(minor, currency)
  const fails =
    advice.aftermarketFails === null
      ? ''
      : ` Aftermarket fails ${of100(advice.aftermarketFails)} of 100.`
  return {
    first: `${ADVISED[advice.advised]}. Break-even ${of100(advice.breakEven)} of 100.`,
    from: `Genuine ${money(advice.genuineMinor)}, fails ${of100(advice.genuineFails)} of 100. Aftermarket ${money(advice.aftermarketMinor)}.${fails} Second recovery ${money(advice.recoveryMinor)}.`,
  }
}
