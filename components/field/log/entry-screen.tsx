'use client'

import { useState } from 'react'
import { useMayCorrect } from '@/components/checks/use-may'
import { entryWords } from '@/components/log/entry-words'
import { ReadingLine } from '@/components/log/reading-line'
import { useBook } from '@/components/store/use-book'
import { useJobZone } from '@/components/store/use-job-zone'
import { useLog } from '@/components/store/use-log'
import { usePhoto } from '@/components/store/use-photo'
import { usePeople } from '@/components/store/use-rows'
import { classes } from '@/components/ui/class-names'
import { KeyLink } from '@/components/ui/key'
import { LogIcon } from '@/components/ui/log-icon'
import { Photo } from '@/components/ui/photo'
import { Screen } from '@/components/ui/screen'
import { VoicePlayer } from '@/components/ui/voice-player'
import { strikes } from '@/lib/diag/case'
import type { LogEntry } from '@/lib/model/log-entry'
import type { VoiceRef } from '@/lib/model/photo'
import { jobHref } from '../route'
import { clockTime, dayOf } from '../times'
import { whenWords } from '../when-words'

/** One entry of the log, whole, with who wrote it and when; and the way to correct it. */
export function EntryScreen({ jobId, entryId }: { jobId: string; entryId: string }) {
  const log = useLog(jobId)
  const { index } = useBook()
  const line = log?.find((l) => l.entry.id === entryId)
  const mine = useMayCorrect(line?.entry)
  const zone = useJobZone(jobId)
  if (line === undefined) {
    return (
      <Screen title="Entry">
        <p>{log === undefined ? 'Opening the entry.' : 'This entry is not on this phone.'}</p>
      </Screen>
    )
  }
  const { entry } = line
  const words = entryWords(entry.body, index)
  const later = strikes((log ?? []).map((l) => l.entry)).get(entry.id)
  const madeMs = Date.parse(entry.happenedAt)
  const corrects = later === undefined && entry.body.kind !== 'correction' && mine
  return (
    <Screen
      title={
        <span className="flex items-center gap-3">
          <LogIcon shape={words.shape} className="size-8 shrink-0" />
          {words.kind}
        </span>
      }
      foot={
        corrects ? (
          <KeyLink href={jobHref(jobId, `log/${entryId}/correct`)}>Correct this</KeyLink>
        ) : null
      }
    >
      <p className={classes('text-row font-bold whitespace-pre-line', later && 'line-through')}>
        {words.title}
      </p>
      {words.lines.map((text) => (
        <p key={text} className="whitespace-pre-line">
          {text}
        </p>
      ))}
      {entry.body.kind === 'reading' ? <ReadingLine body={entry.body} large /> : null}
      {entry.body.kind === 'photo' ? (
        <Picture hash={entry.body.photo.hash} words={words.title} />
      ) : null}
      {entry.body.kind === 'voice' ? <Voice voice={entry.body.voice} /> : null}
      {later === undefined ? null : (
        <p className="font-bold">
          {later.body.kind === 'correction'
            ? `Corrected at ${whenWords(later.happenedAt, zone, madeMs)}: ${later.body.reason}`
            : `Replaced at ${whenWords(later.happenedAt, zone, madeMs)}.`}
        </p>
      )}
      <Written entry={entry} sent={line.sent} order={line.order} zone={zone} />
    </Screen>
  )
}

/** A voice note, from the bytes held here or the shop's. */
function Voice({ voice }: { voice: VoiceRef }) {
  const { url } = usePhoto(voice.hash)
  return url === null ? (
    <p>The voice note is on the phone that recorded it and not at the shop yet.</p>
  ) : (
    <VoicePlayer url={url} seconds={voice.seconds} />
  )
}

/** At night a photo is dimmed until it is pressed. Without signal its small copy stands in for the shop's. */
function Picture({ hash, words }: { hash: string; words: string }) {
  const { url, thumb } = usePhoto(hash)
  const [bright, setBright] = useState<boolean>(false)
  const [broken, setBroken] = useState<string | null>(null)
  if (url === null) {
    return <p>The picture is on the phone that took it and not at the shop yet.</p>
  }
  return (
    <button
      type="button"
      aria-pressed={bright}
      aria-label={`${words}. Press for full brightness.`}
      onClick={() => setBright(!bright)}
    >
      <Photo
        url={url === broken && thumb !== null ? thumb : url}
        alt=""
        bright={bright}
        className="w-full"
        onError={() => setBroken(url)}
      />
    </button>
  )
}

type WrittenProps = { entry: LogEntry; sent: boolean; order: number | null; zone: string }

function Written({ entry, sent, order, zone }: WrittenProps) {
  const author = usePeople()?.find((person) => person.id === entry.authorId)
  const at = (instant: string) => `${dayOf(instant, zone)}, ${clockTime(instant, zone)}`
  const lines = [
    ['Happened', at(entry.happenedAt)],
    ['Written', at(entry.writtenAt)],
    ['By', author?.name ?? 'Name not on this phone'],
    ['Where it is', sent ? `At the shop, line ${order ?? ''} of the log` : 'On this phone only'],
    ['Code book', entry.bookVersion === null ? 'None at the time' : `Version ${entry.bookVersion}`],
  ] as const
  return (
    <dl className="grid gap-2 border-t-2 border-ink pt-3">
      {lines.map(([name, value]) => (
        <div key={name} className="grid gap-x-3 slim:grid-cols-[7rem_minmax(0,1fr)]">
          <dt className="text-second text-ink2">{name}</dt>
          <dd>{value}</dd>
        </div>
      ))}
    </dl>
  )
}
