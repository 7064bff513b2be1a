'use client'
import { useState } from 'react'
import type { PlannedAction } from '@/lib/diag/plan'
import { Field } from '../ui/field'
import { Key } from '../ui/key'
import { Row } from '../ui/row'
import type { Act, ActOn } from './use-act-on'

type Props = {
  action: Pick<PlannedAction, 'type' | 'id' | 'name'>
  insteadOf: Act & { name: string }
  second: string
  end?: string
  actOn: ActOn
}

/** A step that is not the advised one: pick it, with a reason if there is one to give. */
export function PickInstead({ action, insteadOf, second, end, actOn }: Props) {
  const [open, setOpen] = useState(false)
  const [reason, setReason] = useState('')
  return (
    <div>
      <Row title={action.name} second={second} end={end} onPress={() => setOpen(!open)} />
      {open && (
        <div className="grid gap-2 border-b-2 border-ink py-3">
          <Field
            label="Why this one? May stay empty."
            hint={`The advice was: ${insteadOf.name}. It is kept beside your choice.`}
            value={reason}
            onChange={setReason}
            maxLength={500}
          />
          <Key kind="plate" onClick={() => actOn(action, reason.trim() || null)}>
            Start it
          </Key>
        </div>
      )}
    </div>
  )
}
