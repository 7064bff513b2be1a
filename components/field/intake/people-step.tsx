'use client'

import { Minus, Plus } from 'lucide-react'
import { useShop } from '@/components/store/use-rows'
import { Caution } from '@/components/ui/caution'
import { Choice, ChoiceMany } from '@/components/ui/choice'
import { Figure } from '@/components/ui/figure'
import { Key, KeyLink } from '@/components/ui/key'
import type { HelpAnswer, StepProps } from './intake-draft'
import { needsHelp } from './intake-rules'

/** First of all: how many people, and is anybody hurt, missing or exposed. */
export function PeopleStep({ draft, change }: StepProps) {
  const count = (by: number) => change({ count: Math.min(99, Math.max(1, draft.count + by)) })
  return (
    <>
      <fieldset>
        <legend className="mb-1.5 font-bold">How many people are there?</legend>
        <div className="flex flex-wrap items-center gap-4">
          <Key aria-label="One fewer" onClick={() => count(-1)} disabled={draft.count <= 1}>
            <Minus aria-hidden="true" strokeWidth={3} />
          </Key>
          <output aria-live="polite" className="min-w-24 text-center">
            <Figure value={draft.count} size="figure" />
          </output>
          <Key aria-label="One more" onClick={() => count(1)} disabled={draft.count >= 99}>
            <Plus aria-hidden="true" strokeWidth={3} />
          </Key>
        </div>
      </fieldset>
      <ChoiceMany
        legend="Is anybody …"
        hint="Leave all three open when everybody is well and under cover."
        value={draft.dangers}
        onChange={(dangers) =>
          change({ dangers, ...(needsHelp({ dangers }) ? {} : { help: null }) })
        }
        options={[
          { value: 'hurt', label: 'hurt' },
          { value: 'missing', label: 'missing' },
          {
            value: 'exposed',
            label: 'exposed',
            hint: 'Cold, wet, in the sun, without shelter or water, a child.',
          },
        ]}
      />
      {needsHelp(draft) ? (
        <HelpFirst value={draft.help} onChange={(help) => change({ help })} />
      ) : null}
    </>
  )
}

/** Emergency services first; the answer goes into the job log as the person's own. */
function HelpFirst({
  value,
  onChange,
}: {
  value: HelpAnswer | null
  onChange: (next: HelpAnswer) => void
}) {
  const shop = useShop()
  const number = shop?.emergencyNumber
  return (
    <section className="grid gap-3">
      <Caution signal="DANGER">
        Emergency services first. The machine waits. Farbench does not call anybody and is not
        watched.
      </Caution>
      {number ? (
        <KeyLink kind="plate" href={`tel:${number}`}>
          Call {number}
        </KeyLink>
      ) : (
        <p className="font-bold">Call the local emergency number.</p>
      )}
      {shop?.phone ? (
        <KeyLink quiet href={`tel:${shop.phone}`}>
          Then the shop: {shop.phone}
        </KeyLink>
      ) : null}
      <Choice
        legend="What was done about it?"
        hint="Goes into the job log with your name and the time."
        value={value}
        onChange={onChange}
        options={[
          { value: 'called', label: 'Emergency services called' },
          {
            value: 'cannotCall',
            label: 'Cannot call from here',
            hint: 'Send somebody to signal, or use a radio or satellite messenger.',
          },
          { value: 'notNeeded', label: 'Not needed, seen and judged here' },
        ]}
      />
    </section>
  )
}
