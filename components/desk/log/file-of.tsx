'use client'

import { size, span } from '@/components/field/times'
import { LogIcon } from '@/components/ui/log-icon'
import { VoicePlayer } from '@/components/ui/voice-player'
import type { DeskJob } from '@/lib/model/desk'
import type { LogBody } from '@/lib/model/log-entry'
import type { Instant } from '@/lib/model/time'
import { whenWords } from '../../field/when-words'
import { useDesk } from '../desk-context'
import { givenName } from '../phone-name'
import { useNow } from '../use-now'
import { PhotoFrame } from './photo-frame'

/** Whose phone an entry was written on, and when. */
export type Holder = { phone: DeskJob['phones'][number] | null; author: string; at: Instant }

type Props = { body: LogBody; isHere: (hash: string) => boolean; on: Holder }

/** The photo or voice note of an entry, as soon as its bytes are here; until then where they are (PH5). */
export function FileOf({ body, isHere, on }: Props) {
  if (body.kind === 'photo') {
    return isHere(body.photo.hash) ? (
      <PhotoFrame photo={body.photo} caption={body.caption} />
    ) : (
      <StillThere what="Photo" bytes={body.photo.bytes} on={on} />
    )
  }
  if (body.kind !== 'voice') return null
  return isHere(body.voice.hash) ? (
    <div className="py-2">
      <VoicePlayer
        url={`/api/photos/${body.voice.hash}`}
        seconds={body.voice.seconds}
        small={true}
      />
    </div>
  ) : (
    <StillThere what="Voice note" bytes={body.voice.bytes} on={on} />
  )
}

function StillThere({ what, bytes, on }: { what: string; bytes: number; on: Holder }) {
  const { shop } = useDesk()
  const now = useNow()
  const { phone, author, at } = on
  const name = phone === null ? null : givenName(phone.name)
  const age = now === null ? '' : `, ${span(now - Date.parse(at))} old`
  const reached =
    phone?.reachedAt && now !== null
      ? ` It last reached us ${whenWords(phone.reachedAt, shop.zone, now)}.`
      : ''
  return (
    <p className="desk-photo-missing">
      <LogIcon shape="frame" className="size-8 shrink-0" />
      <span>
        <strong>{what} still on the phone</strong> of {author}
        {name === null ? '' : ` (${name})`}, {size(bytes)}
        {age}. It comes after the words.{reached}
      </span>
    </p>
  )
}
