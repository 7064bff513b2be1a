'use client'

import { useState } from 'react'
import { Key } from '@/components/ui/key'
import { LogIcon } from '@/components/ui/log-icon'
import { Photo } from '@/components/ui/photo'
import { VoicePlayer } from '@/components/ui/voice-player'
import type { BookIndex } from '@/lib/diag/book-index'
import type { Quarantined } from '@/lib/model/phones'
import { whenWords } from '../../field/when-words'
import { useDesk } from '../desk-context'
import { useNow } from '../use-now'
import type { Decided } from './phone-actions'
import { itemWords, leftWords } from './phone-words'
import { RefuseForm } from './refuse-form'

type Props = {
  item: Quarantined
  book: BookIndex | null
  /** What became of the last press, when it is still here. */
  left: Decided | null
  busy: boolean
  onAccept: () => Promise<void>
  onRefuse: (reason: string) => Promise<void>
}

/** One thing in quarantine: what it is, when it was recorded, its picture, and the two keys. */
export function QuarantineItem({ item, book, left, busy, onAccept, onRefuse }: Props) {
  const [refusing, setRefusing] = useState(false)
  const { shop } = useDesk()
  const now = useNow()
  const { shape, title, lines } = itemWords(item, book)
  const recorded = item.recordedAt ?? item.receivedAt
  return (
    <li className="grid gap-2 border-b-[1.5px] border-rule py-3">
      <div className="flex items-start gap-3">
        <LogIcon shape={shape} />
        <div className="min-w-0 flex-1">
          <p className="text-row font-bold break-words">{title}</p>
          {lines.map((line) => (
            <p key={line} className="text-second break-words">
              {line}
            </p>
          ))}
          <p className="text-second text-ink2">
            {item.jobWords ??
              (item.jobId === null ? 'Of no job' : 'Of a job the shop does not have')}
          </p>
          <p className="text-second text-ink2">
            Recorded <span className="figures">{whenWords(recorded, shop.zone, now)}</span>, came{' '}
            <span className="figures">{whenWords(item.receivedAt, shop.zone, now)}</span>
          </p>
          <FileWords item={item} />
        </div>
        {item.decision === null ? null : <span className="caps text-section">{item.decision}</span>}
      </div>
      {item.reason === null ? null : <p className="text-second">Refused: {item.reason}</p>}
      <Left left={left} />
      {item.decision !== null ? null : refusing ? (
        <RefuseForm
          what="this one"
          busy={busy}
          onRefuse={onRefuse}
          onLeave={() => setRefusing(false)}
        />
      ) : (
        <div className="flex flex-wrap gap-2">
          <Key small className="desk-key" disabled={busy} onClick={() => void onAccept()}>
            Accept
          </Key>
          <Key small className="desk-key" disabled={busy} onClick={() => setRefusing(true)}>
            Refuse
          </Key>
        </div>
      )}
    </li>
  )
}

function Left({ left }: { left: Decided | null }) {
  if (left === null) return null
  const words =
    left.is === 'left'
      ? `Not taken in: ${leftWords(left)}`
      : 'The entry is in; its photo or voice note is not what the entry says and stayed out.'
  return <p className="font-bold text-nogo">{words}</p>
}

/** The picture or voice note it names: here to be looked at, or still on the phone. */
function FileWords({ item }: { item: Quarantined }) {
  const { file, entry } = item
  if (file === null) return null
  if (!file.here) return <p className="text-second text-ink2">Its file is still on the phone.</p>
  const url = `/api/desk/phones/files/${file.hash}`
  if (entry?.body.kind === 'voice') {
    return <VoicePlayer url={url} seconds={entry.body.voice.seconds} small={true} />
  }
  return (
    <Photo url={url} alt="In quarantine, not in the log" className="mt-2 max-h-80 max-w-full" />
  )
}
