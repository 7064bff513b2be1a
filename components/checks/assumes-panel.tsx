'use client'
import { useState } from 'react'
import { DARK_FACTOR, GLOVE_FACTOR, GLOVES_BELOW_C } from '@/lib/diag/plan-means'
import type { Id } from '@/lib/model/id'
import type { Shop } from '@/lib/model/shop'
import { moneyWords } from '@/lib/shop/currency'
import type { MeansView } from '../engine/use-means'
import { Choice } from '../ui/choice'
import { Key } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { LeaveBy } from './leave-by-part'

type Props = { jobId: Id; view: MeansView; shop: Shop | undefined; bookVersion: number }

/** What the plan assumes, in the open (rules R6, R25): prices, people, light, and the time to leave by. */
export function AssumesPanel({ jobId, view, shop, bookVersion }: Props) {
  const [open, setOpen] = useState(false)
  const { choice, choose } = view
  if (!open)
    return (
      <Key small aria-expanded={false} onClick={() => setOpen(true)}>
        What this assumes
      </Key>
    )
  return (
    <section aria-labelledby="assumes" className="grid gap-4">
      <RuleEdge id="assumes">What this assumes</RuleEdge>
      {shop !== undefined && <Prices shop={shop} bookVersion={bookVersion} />}
      <Choice
        legend="People who can help"
        columns={2}
        value={choice.people === 2 ? 'two' : 'one'}
        onChange={(next) => choose({ ...choice, people: next === 'two' ? 2 : 1 })}
        options={[
          { value: 'one', label: 'Just me' },
          { value: 'two', label: 'Two of us' },
        ]}
      />
      <Choice
        legend="Light"
        value={choice.dark}
        onChange={(next) => choose({ ...choice, dark: next })}
        hint={`In the dark every minute counts ${DARK_FACTOR}, below −${-GLOVES_BELOW_C} °C ${GLOVE_FACTOR} for gloves (common practice, no source).`}
        options={[
          { value: 'bySun', label: `By the sun: ${view.darkBySun ? 'dark' : 'light'} now` },
          { value: 'no', label: 'Light enough' },
          { value: 'yes', label: 'Dark' },
        ]}
      />
      <LeaveBy jobId={jobId} view={view} />
      <Key small aria-expanded onClick={() => setOpen(false)}>
        Close
      </Key>
    </section>
  )
}

function Prices({ shop, bookVersion }: { shop: Shop; bookVersion: number }) {
  const rows = [
    ['A mechanic’s hour', shop.perMinuteMinor * 60],
    ['A tow', shop.towMinor],
    ['A second recovery', shop.recoveryMinor],
  ] as const
  return (
    <div>
      <dl className="grid gap-1">
        {rows.map(([label, minor]) => (
          <div key={label} className="flex items-baseline justify-between gap-3">
            <dt>{label}</dt>
            <dd className="figures text-right">{moneyWords(minor, shop.currency)}</dd>
          </div>
        ))}
      </dl>
      <p className="mt-1 text-second text-ink2">
        Set by {shop.name}. Shares and outcome tables come from code book version{' '}
        <span className="figures">{bookVersion}</span>, each with its source.
      </p>
    </div>
  )
}
