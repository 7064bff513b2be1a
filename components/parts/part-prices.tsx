import type { AdvisedPart, SheetPart } from '@/lib/diag/part-choice'
import type { Shop } from '@/lib/model/shop'
import { moneyWords } from '@/lib/shop/currency'
import { fixed } from '../reading-strip/figures'
import { RuleEdge } from '../ui/rule-edge'
import { adviceSentences } from './part-advice'

type PricesProps = { sheet: SheetPart | null; shop: Shop | null; advised: AdvisedPart | null }

/** Prices, failure figures, the second recovery, the break-even and what follows. */
export function Prices({ sheet, shop, advised }: PricesProps) {
  if (sheet === null || shop === null)
    return <p>The spec sheet has no price for this part. The parts desk finds it out.</p>
  const money = (minor: number) => moneyWords(minor, shop.currency)
  const rows: [string, string, string][] = [
    ['Genuine', money(sheet.genuineMinor), failWords(sheet.genuineFailsOf100)],
  ]
  if (sheet.aftermarketMinor !== null)
    rows.push([
      'Aftermarket',
      money(sheet.aftermarketMinor),
      sheet.aftermarketFailsOf100 === null ? 'no figure' : failWords(sheet.aftermarketFailsOf100),
    ])
  rows.push(['Second recovery', money(shop.recoveryMinor), 'when it fails out there'])
  return (
    <section aria-labelledby="prices" className="grid gap-2">
      <RuleEdge id="prices">Genuine or aftermarket</RuleEdge>
      <table className="w-full border-collapse text-left">
        <caption className="visually-hidden">Prices and how many of 100 fail</caption>
        <tbody>
          {rows.map(([label, price, fails]) => (
            <tr key={label} className="border-b-[1.5px] border-rule align-baseline">
              <th scope="row" className="py-2 pr-2 font-bold">
                {label}
                <span className="block text-second font-normal text-ink2">{fails}</span>
              </th>
              <td className="figures py-2 text-right">{price}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {advised !== null && (
        <div className="grid gap-1 border-l-4 border-ink pl-3">
          {adviceSentences(advised, shop.currency).map((words, i, all) => (
            <p key={words} className={i === all.length - 1 ? 'text-row font-bold' : ''}>
              {words}
            </p>
          ))}
        </div>
      )}
      <p className="text-second text-ink2">Prices and failure figures: {sheet.source}.</p>
    </section>
  )
}

const failWords = (of100: number): string =>
  `${fixed(of100, Number.isInteger(of100) ? 0 : 1)} of 100 fail`
