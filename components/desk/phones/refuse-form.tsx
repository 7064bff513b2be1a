'use client'

import { useState } from 'react'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'

type Props = {
  what: string
  busy: boolean
  onRefuse: (reason: string) => Promise<void>
  onLeave: () => void
}

/** Refusing asks for a reason, which is kept with what was refused. */
export function RefuseForm({ what, busy, onRefuse, onLeave }: Props) {
  const [reason, setReason] = useState('')
  const [error, setError] = useState<string | null>(null)
  return (
    <form
      noValidate
      className="grid gap-2 border-2 border-nogo p-3"
      onSubmit={(event) => {
        event.preventDefault()
        if (reason.trim() === '') setError('Say why: it is kept with what was refused.')
        else void onRefuse(reason)
      }}
    >
      <Field
        label={`Why refuse ${what}`}
        value={reason}
        onChange={setReason}
        maxLength={500}
        error={error}
        required
      />
      <div className="grid gap-2 min-[760px]:grid-cols-2">
        <Key small quiet onClick={onLeave}>
          Leave it waiting
        </Key>
        <Key small type="submit" disabled={busy}>
          Refuse {what}
        </Key>
      </div>
    </form>
  )
}
