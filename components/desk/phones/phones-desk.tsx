'use client'

import { useState } from 'react'
import { ChoiceMany } from '@/components/ui/choice'
import type { DeskPhone } from '@/lib/model/phones'
import { readSentence } from '../desk-sentences'
import { useNow } from '../use-now'
import type { DecideAction, RevokeAction } from './phone-actions'
import { PhonePart } from './phone-part'
import { phoneTitles } from './phone-words'
import { usePhones } from './use-phones'

type Props = { takeOut: RevokeAction; decideOn: DecideAction }

/** The shop's phones: which there are, what waits for the owner's word, and the way to take one out. */
export function PhonesDesk({ takeOut, decideOn }: Props) {
  const read = usePhones()
  const [showOld, setShowOld] = useState(false)
  const all = read.data?.phones ?? []
  const titles = phoneTitles(all)
  const now = useNow()
  const live = all.filter((phone) => isOfUse(phone, now))
  const phones = showOld ? all : live
  const old = all.length - live.length
  return (
    <main id="desk-main" tabIndex={-1} className="desk-page grid max-w-280 gap-4">
      <div className="flex flex-wrap items-end justify-between gap-4">
        <h1 className="caps text-figure">Phones</h1>
        <span className="figures text-figure">{read.data ? live.length : ''}</span>
      </div>
      <p>
        A phone that is lost, stolen or leaves the shop is taken out here. What it still sends then
        waits below for your word, and nothing of it touches a job before.
      </p>
      {read.error ? <p className="font-bold text-nogo">{readSentence(read.error)}</p> : null}
      {read.isPending ? <p>Reading the phones.</p> : null}
      {old > 0 ? (
        <div className="max-w-96">
          <ChoiceMany
            legend="Show"
            legendHidden={true}
            options={[{ value: 'old', label: `Phones that are done with too, ${old}` }]}
            value={showOld ? ['old'] : []}
            onChange={(next) => setShowOld(next.length > 0)}
          />
        </div>
      ) : null}
      {read.data && phones.length === 0 ? <p>No phone of this shop is in use.</p> : null}
      {phones.map((phone) => (
        <PhonePart
          key={phone.id}
          phone={phone}
          title={titles.get(phone.id) ?? ''}
          takeOut={takeOut}
          decideOn={decideOn}
        />
      ))}
    </main>
  )
}

/** What was decided stays in sight for a day (a choice). */
const LATELY_MS = 24 * 3_600_000

/** In use, or with something to decide on, decided lately, or lost. */
function isOfUse(phone: DeskPhone, now: number | null): boolean {
  const isFresh = ({ decidedAt }: DeskPhone['items'][number]) =>
    decidedAt === null || (now !== null && now - Date.parse(decidedAt) < LATELY_MS)
  if (phone.items.some(isFresh)) return true
  if (phone.gone !== null) return phone.gone.lostOps > 0
  return phone.wipeToldAt === null
}
