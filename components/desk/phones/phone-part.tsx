'use client'

import { RuleEdge } from '@/components/ui/rule-edge'
import type { DeskPhone } from '@/lib/model/phones'
import { whenWords } from '../../field/when-words'
import { counted } from '../../field/words'
import { useDesk } from '../desk-context'
import { givenName } from '../phone-name'
import { useNow } from '../use-now'
import type { DecideAction, RevokeAction } from './phone-actions'
import { clockWords, goneWords, heldWords, reachedWords } from './phone-words'
import { QuarantineList } from './quarantine-list'
import { TakeOut } from './take-out'

type Props = { phone: DeskPhone; title: string; takeOut: RevokeAction; decideOn: DecideAction }

/** One phone: whose it is, how it stands, what of it waits, and the way to take it out. */
export function PhonePart({ phone, title, takeOut, decideOn }: Props) {
  const waiting = phone.items.filter((item) => item.decision === null).length
  return (
    <section aria-label={`Phone of ${title}`} className="grid gap-3 pb-4">
      <RuleEdge end={waiting > 0 ? `${waiting} waiting` : standOf(phone)}>{title}</RuleEdge>
      <Facts phone={phone} />
      {phone.items.length > 0 ? <QuarantineList phone={phone} decideOn={decideOn} /> : null}
      {phone.revoked === null && phone.gone === null ? (
        <TakeOut phone={phone} takeOut={takeOut} />
      ) : null}
    </section>
  )
}

function standOf(phone: DeskPhone): string {
  if (phone.gone !== null) return 'gone'
  if (phone.revoked !== null) return phone.wipeToldAt === null ? 'taken out' : 'emptied'
  return phone.person.isMember ? 'in use' : 'person left'
}

function Facts({ phone }: { phone: DeskPhone }) {
  const { shop } = useDesk()
  const now = useNow()
  const times = { zone: shop.zone, now }
  const at = (instant: string) => whenWords(instant, shop.zone, now)
  const name = givenName(phone.words)
  const lines: [string, string[]][] = [
    ...(name === null ? [] : [['Calls itself', [name]] as [string, string[]]]),
    ['In use since', [at(phone.enrolledAt)]],
    ['Last reached', [reachedWords(phone.lastSeenAt, times)]],
    ['Its clock', [clockWords(phone.clockOffsetMs)]],
    ['Unsent, as it told', heldWords(phone, times)],
    ['Code book', [phone.bookVersion === null ? 'Not told yet' : `Version ${phone.bookVersion}`]],
  ]
  if (phone.missing > 0) {
    lines.push(['Never came', [`${counted(phone.missing, 'record')} in between`]])
  }
  if (phone.revoked !== null) {
    const { reason } = phone.revoked
    lines.push(['Taken out', [at(phone.revoked.at), ...(reason === null ? [] : [reason])]])
  }
  if (phone.wipeToldAt !== null) {
    lines.push(['Told to empty itself', [at(phone.wipeToldAt)]])
  }
  if (phone.gone !== null)
    lines.push(['Its store is gone', [at(phone.gone.at), goneWords(phone.gone)]])
  return (
    <dl className="grid gap-x-6 gap-y-2 min-[760px]:grid-cols-[minmax(11rem,auto)_1fr]">
      {lines.map(([name, words]) => (
        <div key={name} className="min-[760px]:contents">
          <dt className="text-ink2">{name}</dt>
          <dd className="min-w-0 font-bold break-words">
            {words.map((line) => (
              <span key={line} className="block">
                {line}
              </span>
            ))}
          </dd>
        </div>
      ))}
    </dl>
  )
}
