'use client'
import { useState } from 'react'
import type { PlannedAction } from '@/lib/diag/plan'
import type { Id } from '@/lib/model/id'
import { useDraft } from '../store/use-draft'
import { DraftSign } from '../ui/draft-sign'
import { Field } from '../ui/field'
import { Key } from '../ui/key'
import { Row } from '../ui/row'
import type { Act, ActOn } from './use-act-on'

type Props = {
  jobId: Id
  action: Pick<PlannedAction, 'type' | 'id' | 'name'>
  insteadOf: Act & { name: string }
  second: string
  end?: string
  actOn: ActOn
  /** How the advice stands: nothing is started on one that is being worked out anew. */
  advice: AdviceState
}

export type AdviceState = 'ready' | 'working' | 'failed'

/** A step that is not the advised one: pick it, with a reason if there is one to give. */
export function PickInstead({ jobId, action, insteadOf, second, end, actOn, advice }: Props) {
  const key = `job.${jobId}.instead.${action.type}.${action.id}`
  const { value: reason, set, ready, kept } = useDraft<string>(key, '')
  const [wanted, setWanted] = useState<boolean | null>(null)
  // A reason half written shows that this one was being picked.
  const open = wanted ?? reason !== ''
  return (
    <div>
      <Row title={action.name} second={second} end={end} onPress={() => setWanted(!open)} />
      {open && (
        <div className="grid gap-2 border-b-2 border-ink py-3">
          <Field
            label="Why this one? May stay empty."
            hint={
              advice === 'failed'
                ? 'The advice could not be worked out anew, so none is kept beside your choice.'
                : `The advice was: ${insteadOf.name}. It is kept beside your choice.`
            }
            value={reason}
            onChange={set}
            maxLength={500}
          />
          <DraftSign kept={kept} />
          <Key
            kind="plate"
            disabled={!ready || advice === 'working'}
            onClick={() => actOn(action, reason.trim() || null, [key])}
          >
            {advice === 'working' ? 'Working it out' : 'Start it'}
          </Key>
        </div>
      )}
    </div>
  )
}
