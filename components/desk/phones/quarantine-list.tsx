'use client'

import { useState } from 'react'
import { Key } from '@/components/ui/key'
import type { DeskPhone } from '@/lib/model/phones'
import { counted } from '../../field/words'
import { useDeskBook } from '../use-desk-book'
import type { DecideAction, Decided } from './phone-actions'
import { QuarantineItem } from './quarantine-item'
import { RefuseForm } from './refuse-form'
import { usePhoneActing } from './use-phones'

type Props = { phone: DeskPhone; decideOn: DecideAction }

/** What a phone left in quarantine, in the order it was made, and the owner's word on each or on all. */
export function QuarantineList({ phone, decideOn }: Props) {
  const [left, setLeft] = useState<ReadonlyMap<string, Decided>>(new Map())
  const [refusing, setRefusing] = useState(false)
  const { busy, refusal, act } = usePhoneActing()
  const { index } = useDeskBook(true)
  const waiting = phone.items.filter((item) => item.decision === null)
  const decide = async (form: Parameters<DecideAction>[0]) => {
    const done = await act(() => decideOn(form), summaryOf)
    if (done === null) return
    const stays = done.filter((one) => one.is === 'left' || one.file === 'refused')
    setLeft(new Map(stays.map((one) => [one.opId, one])))
  }
  const { id: phoneId } = phone
  return (
    <div className="grid gap-3 border-2 border-ink p-3">
      <h2 className="text-row font-bold">
        {waiting.length === 0
          ? 'In quarantine, all decided'
          : `In quarantine, ${waiting.length} waiting`}
      </h2>
      {refusal ? (
        <p role="alert" className="font-bold text-nogo">
          {refusal}
        </p>
      ) : null}
      <ol>
        {phone.items.map((item) => (
          <QuarantineItem
            key={item.opId}
            item={item}
            book={index}
            left={left.get(item.opId) ?? null}
            busy={busy}
            onAccept={() => decide({ decision: 'accept', phoneId, opId: item.opId })}
            onRefuse={(reason) => decide({ decision: 'refuse', phoneId, opId: item.opId, reason })}
          />
        ))}
      </ol>
      {waiting.length > 1 ? (
        <div className="grid gap-2 min-[760px]:grid-cols-2">
          <Key
            kind="plate"
            disabled={busy}
            onClick={() => void decide({ decision: 'accept', phoneId, opId: null })}
          >
            Accept all {waiting.length}
          </Key>
          <Key disabled={busy} onClick={() => setRefusing(!refusing)}>
            Refuse all {waiting.length}
          </Key>
        </div>
      ) : null}
      {refusing && waiting.length > 1 ? (
        <RefuseForm
          what={`all ${waiting.length}`}
          busy={busy}
          onRefuse={async (reason) => {
            await decide({ decision: 'refuse', phoneId, opId: null, reason })
            setRefusing(false)
          }}
          onLeave={() => setRefusing(false)}
        />
      ) : null}
    </div>
  )
}

/** "6 accepted, 1 left." */
function summaryOf(done: readonly Decided[]): string {
  const count = (is: Decided['is']) => done.filter((one) => one.is === is).length
  const parts = [
    [count('accepted'), 'accepted'],
    [count('refused'), 'refused'],
    [count('left'), 'left as it is'],
  ] as const
  const said = parts.filter(([many]) => many > 0).map(([many, words]) => `${many} ${words}`)
  return said.length === 0 ? counted(0, 'item') : `${said.join(', ')}.`
}
