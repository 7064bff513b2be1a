'use client'

import { useState } from 'react'
import { Key } from '@/components/ui/key'
import type { DeskBook } from '@/lib/model/book-desk'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import { changeWords, withdrawnHead } from '../../field/phone/withdrawal-words'
import { whenWords } from '../../field/when-words'
import { useDesk } from '../desk-context'
import { deskPaths } from '../desk-path'
import { useNow } from '../use-now'
import { useChangedJobsOf } from './use-books'

type Props = { one: BookWithdrawal; people: DeskBook['people'] }

/** A withdrawal: what and why, who has acknowledged it, and on asking the jobs whose verdict it changes. */
export function WithdrawalPart({ one, people }: Props) {
  const { shop } = useDesk()
  const now = useNow()
  const names = new Map(people.map(({ id, name }) => [id, name ?? 'Name erased']))
  const heard = one.heard.map(
    ({ personId, at }) => `${names.get(personId) ?? 'Somebody'} ${whenWords(at, shop.zone, now)}`,
  )
  return (
    <li className="grid gap-1 border-b-[1.5px] border-rule py-3">
      <p className="text-row font-bold">{withdrawnHead(one)}</p>
      <p>
        {one.reason}
        {one.instead === null ? '' : ` Instead: ${one.instead}`}
      </p>
      <p className="text-second text-ink2">
        Withdrawn {whenWords(one.at, shop.zone, now)}
        {one.versions.length === 0 ? '' : `; holds in version ${one.versions.join(', ')}`}.
      </p>
      <p className="text-second">
        {heard.length === 0
          ? 'Nobody has acknowledged it yet.'
          : `Acknowledged by: ${heard.join('; ')}.`}
      </p>
      <Jobs one={one} />
    </li>
  )
}

function Jobs({ one }: { one: BookWithdrawal }) {
  const [open, setOpen] = useState(false)
  const { data, isPending, isError } = useChangedJobsOf(one.id, open)
  if (!open) {
    return (
      <div>
        <Key small quiet className="desk-key" onClick={() => setOpen(true)}>
          Jobs it changes
        </Key>
      </div>
    )
  }
  if (isError) return <p className="font-bold text-nogo">The jobs could not be worked out.</p>
  if (isPending) return <p role="status">Working out the jobs.</p>
  if (data.jobs.length === 0) return <p>No job is worked out otherwise by it.</p>
  return (
    <ul aria-label="Jobs it changes" className="grid gap-1 border-l-4 border-ink pl-3">
      {data.jobs.map(({ jobId, number, words, ...change }) => (
        <li key={jobId}>
          <a href={deskPaths.job(jobId)} className="font-bold underline">
            {number ?? ''} {words}
          </a>
          <span className="block">{changeWords(change)}</span>
        </li>
      ))}
    </ul>
  )
}
