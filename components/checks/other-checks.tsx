'use client'
import { useState } from 'react'
import type { BookIndex } from '@/lib/diag/book-index'
import type { Plan, PlannedAction } from '@/lib/diag/plan'
import type { Id } from '@/lib/model/id'
import { WAYS_OUT, type WayOut } from '@/lib/model/job'
import { moneyWords } from '@/lib/shop/currency'
import { WAY_OUT_WORDS } from '../field/words'
import { Key } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { takesWords } from './next-plate'
import { type AdviceState, PickInstead } from './pick-instead'
import type { ActOn } from './use-act-on'

type Props = {
  jobId: Id
  plan: Plan
  currency: string
  index: BookIndex
  actOn: ActOn
  advice: AdviceState
}

/** Everything else that can be done, and what was left out with the reason; all of it can be picked. */
export function OtherChecks({ jobId, plan, currency, index, actOn, advice }: Props) {
  const [open, setOpen] = useState(false)
  const rest = plan.others.filter((one) => one.id !== plan.next.id && one.id !== plan.runnerUp?.id)
  if (rest.length + plan.leftOut.length === 0) return null
  if (!open)
    return (
      <Key small aria-expanded={false} onClick={() => setOpen(true)}>
        Pick another check
      </Key>
    )
  return (
    <section aria-labelledby="others" className="grid gap-4">
      <div>
        <RuleEdge id="others" end={String(rest.length)}>
          Other steps
        </RuleEdge>
        <p className="text-second text-ink2">
          The figure is what the rest of the job is expected to cost more, in {currency}.
        </p>
        <ul>
          {rest.map((one) => (
            <li key={`${one.type} ${one.id}`}>
              <PickInstead
                jobId={jobId}
                action={one}
                insteadOf={plan.next}
                actOn={actOn}
                advice={advice}
                second={takesWords(one, index)}
                end={dearer(one, plan, currency)}
              />
            </li>
          ))}
        </ul>
      </div>
      <LeftOut jobId={jobId} plan={plan} index={index} actOn={actOn} advice={advice} />
      <Key small aria-expanded onClick={() => setOpen(false)}>
        Close the list
      </Key>
    </section>
  )
}

function LeftOut({ jobId, plan, index, actOn, advice }: Omit<Props, 'currency'>) {
  if (plan.leftOut.length === 0) return null
  return (
    <div>
      <RuleEdge level={3} end={String(plan.leftOut.length)}>
        Left out of the plan
      </RuleEdge>
      <ul>
        {plan.leftOut.map((one) => (
          <li key={`${one.kind} ${one.id}`}>
            <PickInstead
              jobId={jobId}
              action={{ type: kindOf(one.kind), id: one.id, name: nameOf(one, index) }}
              insteadOf={plan.next}
              actOn={actOn}
              advice={advice}
              second={one.reason}
            />
          </li>
        ))}
      </ul>
    </div>
  )
}

/** `+52.91`, by the plan's own figures. */
function dearer(one: PlannedAction, plan: Plan, currency: string): string {
  const minor = Math.max(0, Math.round(one.expectedCostMinor - plan.next.expectedCostMinor))
  return `+${moneyWords(minor, currency).replace(` ${currency}`, '')}`
}

type Left = Plan['leftOut'][number]

const kindOf = (kind: Left['kind']): 'check' | 'swap' | 'repair' | 'stop' =>
  kind === 'swap' || kind === 'repair' || kind === 'stop' ? kind : 'check'

const nameOf = (one: Left, index: BookIndex): string =>
  index.checks.get(one.id)?.name ??
  index.swaps.get(one.id)?.name ??
  index.faults.get(one.id)?.repair?.words ??
  stopName(one.id)

const stopName = (id: string): string =>
  WAYS_OUT.includes(id as WayOut) ? WAY_OUT_WORDS[id as WayOut] : id
