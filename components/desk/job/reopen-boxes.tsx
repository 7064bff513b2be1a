'use client'

import { useState } from 'react'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'

type Props = { busy: boolean; onSend: (reason: string) => void }

/** Why a closed job is opened again. */
export function ReopenBoxes({ busy, onSend }: Props) {
  const [reason, setReason] = useState('')
  const [error, setError] = useState<string | null>(null)
  return (
    <form
      className="mt-3 grid gap-3"
      onSubmit={(event) => {
        event.preventDefault()
        const typed = reason.trim()
        setError(typed === '' ? 'Say why in a few words.' : null)
        if (typed !== '') onSend(typed)
      }}
    >
      <p className="text-second">The closing stays in the log.</p>
      <Field
        label="Why it is opened again"
        lines={2}
        maxLength={500}
        value={reason}
        onChange={setReason}
        error={error}
      />
      <Key type="submit" kind="plate" disabled={busy}>
        Reopen the job
      </Key>
    </form>
  )
}
