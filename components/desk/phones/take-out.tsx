'use client'

import { useState } from 'react'
import { Caution } from '@/components/ui/caution'
import { Field } from '@/components/ui/field'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import type { DeskPhone } from '@/lib/model/phones'
import type { RevokeAction } from './phone-actions'
import { ownerOf } from './phone-words'
import { usePhoneActing } from './use-phones'

type Props = { phone: DeskPhone; takeOut: RevokeAction }

/** Takes a phone out, for a reason, by holding the key or by two presses. */
export function TakeOut({ phone, takeOut }: Props) {
  const name = ownerOf(phone)
  const [open, setOpen] = useState(false)
  const [reason, setReason] = useState('')
  const [error, setError] = useState<string | null>(null)
  const { busy, refusal, act } = usePhoneActing()
  const confirm = () => {
    if (reason.trim() === '') {
      setError('Say why: it stands on record.')
      return
    }
    setError(null)
    void act(
      () => takeOut({ phoneId: phone.id, reason }),
      () => `The phone of ${name} is taken out.`,
    )
  }
  if (!open) {
    return (
      <div>
        <Key small quiet className="desk-key" onClick={() => setOpen(true)}>
          Take this phone out
        </Key>
      </div>
    )
  }
  return (
    <div className="grid max-w-160 gap-3 border-2 border-nogo p-3">
      <Caution signal="NOTICE">
        From this moment the phone is shown nothing, and every session of {name} ends, as one may
        have been copied. What the phone still sends waits here for your word; then it empties
        itself. It cannot be taken back in: {name} signs in anew on an emptied or another phone.
      </Caution>
      <Field
        label="Why"
        value={reason}
        onChange={setReason}
        maxLength={500}
        error={error}
        required
      />
      {refusal ? (
        <p role="alert" className="font-bold text-nogo">
          {refusal}
        </p>
      ) : null}
      <Key small quiet onClick={() => setOpen(false)}>
        Leave it in
      </Key>
      <Hold
        label="Take it out"
        question={`Take this phone of ${name} out for good?`}
        confirmLabel="Take it out"
        disabled={busy}
        onConfirm={confirm}
      />
    </div>
  )
}
