'use client'
import { useState } from 'react'
import type { CheckItem } from '@/lib/model/code-book'
import { useDraft } from '../store/use-draft'
import { Caution } from '../ui/caution'
import { Key } from '../ui/key'
import { Steps } from '../ui/steps'

/** Done this often, a check opens in its one-line form (rule R8). */
const KNOWN_AFTER = 3

/** How often this person has recorded this check on this phone. */
export function useTimesDone(checkId: string) {
  return useDraft<number>(`times:${checkId}`, 0)
}

/** The steps one at a time in large type, all at once, or in one line for those who know them. */
export function CheckSteps({ check }: { check: CheckItem }) {
  const { value: times } = useTimesDone(check.id)
  const [picked, setPicked] = useState<'one' | 'all' | 'line' | null>(null)
  const form = picked ?? (times >= KNOWN_AFTER ? 'line' : 'one')
  return (
    <div className="grid gap-3">
      {form === 'one' && <OneAtATime steps={check.steps} />}
      {form === 'all' && <Steps steps={check.steps} />}
      {form === 'line' && <OneLine check={check} />}
      <div className="grid grid-cols-2 gap-2">
        <Key small onClick={() => setPicked(form === 'one' ? 'all' : 'one')}>
          {form === 'one' ? 'All steps' : 'One by one'}
        </Key>
        <Key small disabled={form === 'line'} onClick={() => setPicked('line')}>
          In one line
        </Key>
      </div>
    </div>
  )
}

function OneAtATime({ steps }: { steps: CheckItem['steps'] }) {
  const [at, setAt] = useState(0)
  const step = steps[at]
  if (step === undefined) return null
  return (
    <div className="grid gap-3 border-2 border-ink p-4">
      <p className="text-second text-ink2">
        Step <span className="figures text-ink">{at + 1}</span> of{' '}
        <span className="figures text-ink">{steps.length}</span>
      </p>
      {step.caution !== null && <Caution signal={step.caution.signal}>{step.caution.text}</Caution>}
      <p aria-live="polite" className="min-h-24 text-key font-bold leading-tight">
        {step.text}
      </p>
      <div className="grid grid-cols-2 gap-2">
        <Key disabled={at === 0} onClick={() => setAt(at - 1)}>
          Previous
        </Key>
        <Key kind="plate" disabled={at === steps.length - 1} onClick={() => setAt(at + 1)}>
          Next
        </Key>
      </div>
    </div>
  )
}

/** Short, but each caution still stands before its step. */
function OneLine({ check }: { check: CheckItem }) {
  return (
    <p>
      {check.steps.map((step, i) => (
        <span key={step.text}>
          {step.caution !== null && (
            <b>
              {step.caution.signal}: {step.caution.text}{' '}
            </b>
          )}
          <span className="figures">{i + 1}</span> {step.text}{' '}
        </span>
      ))}
    </p>
  )
}
