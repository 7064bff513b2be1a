'use client'

import { useState } from 'react'
import { Caution } from '@/components/ui/caution'
import { Choice } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import type { BookVersionRow } from '@/lib/model/book-desk'
import { type WithdrawForm as Form, WITHDRAWN, type Withdrawn } from '@/lib/model/book-withdrawal'
import type { BookActions } from './book-actions'
import { useBookActing } from './use-books'
import { WhichWithdrawn } from './which-withdrawn'

const WORDS: Record<Withdrawn, string> = {
  check: 'A check',
  swap: 'A swap',
  fault: 'A fault',
  limit: 'A limit of a check',
  version: 'A whole version',
}
const OPTIONS = WITHDRAWN.map((value) => ({ value, label: WORDS[value] }))

type Props = Pick<BookActions, 'withdraw'> & { versions: readonly BookVersionRow[] }

/** Withdraws something from the code book for safety: what, why, and what to do instead. */
export function WithdrawForm({ withdraw, versions }: Props) {
  const [open, setOpen] = useState(false)
  const [what, setWhat] = useState<Withdrawn>('check')
  const [which, setWhich] = useState('')
  const [reason, setReason] = useState('')
  const [instead, setInstead] = useState('')
  const { busy, refusal, act } = useBookActing()
  const form = formOf({ what, which, reason, instead })
  const confirm = async () => {
    if (form === null) return
    const done = await act(
      () => withdraw(form),
      ({ published }) =>
        published === null
          ? 'Withdrawn. Phones are told at their next contact.'
          : `Withdrawn. The version before is published again as version ${published.version}.`,
    )
    if (done === null) return
    setOpen(false)
    setWhich('')
    setReason('')
    setInstead('')
  }
  if (!open) {
    return (
      <div>
        <Key small quiet className="desk-key" onClick={() => setOpen(true)}>
          Withdraw something for safety
        </Key>
      </div>
    )
  }
  return (
    <div className="grid max-w-160 gap-3 border-2 border-nogo p-3">
      <Caution signal="NOTICE">
        It is offered no more, on no job, from each phone’s next contact on, and everybody in the
        field has to acknowledge it. What was found with it counts no more. It cannot be taken back;
        what is put right comes with a new version.
      </Caution>
      <Choice
        legend="What"
        options={OPTIONS}
        columns={2}
        value={what}
        onChange={(next) => {
          setWhat(next)
          setWhich('')
        }}
      />
      <WhichWithdrawn key={what} what={what} versions={versions} which={which} onPick={setWhich} />
      <Field
        label="Why, in one sentence"
        value={reason}
        onChange={setReason}
        maxLength={500}
        required
      />
      <Field label="What to do instead" value={instead} onChange={setInstead} maxLength={500} />
      {refusal ? (
        <p role="alert" className="font-bold text-nogo">
          {refusal}
        </p>
      ) : null}
      <Key small quiet onClick={() => setOpen(false)}>
        Leave it in
      </Key>
      <Hold
        label="Withdraw it"
        question="Withdraw it from every phone?"
        confirmLabel="Withdraw it"
        disabled={busy || form === null}
        onConfirm={() => void confirm()}
      />
    </div>
  )
}

type Typed = { what: Withdrawn; which: string; reason: string; instead: string }

/** The form as it is sent; null while something is missing. */
function formOf({ what, which, reason, instead }: Typed): Form | null {
  const said = { reason: reason.trim(), instead: instead.trim() === '' ? null : instead.trim() }
  if (said.reason.length < 3 || which === '') return null
  if (what !== 'version') return { what, itemId: which, ...said }
  return { what, version: Number(which), ...said }
}
