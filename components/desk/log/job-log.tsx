'use client'

import { useMemo } from 'react'
import { type EntryWords, entryWords } from '@/components/log/entry-words'
import { ReadingLine } from '@/components/log/reading-line'
import { LogIcon } from '@/components/ui/log-icon'
import type { BookIndex } from '@/lib/diag/book-index'
import { strikes } from '@/lib/diag/case'
import type { DeskJob } from '@/lib/model/desk'
import type { LogRow } from '@/lib/model/log-entry'
import { clockTime, span } from '../../field/times'
import { whenWords } from '../../field/when-words'
import { useDesk } from '../desk-context'
import { dayName } from '../desk-time'
import { FileOf } from './file-of'

/** Gaps over 20 min show as a broken wire with the time (design 5c). */
const GAP_MS = 20 * 60_000

type Props = { found: DeskJob; index: BookIndex | null }

/** The job log, oldest first, in the shop's order: an ordered list strung on a wire. */
export function JobLog({ found, index }: Props) {
  const struck = useMemo(() => strikes(found.entries), [found.entries])
  const who = useMemo(
    () => new Map(found.people.map(({ id, name }) => [id, name ?? 'name erased'])),
    [found.people],
  )
  const here = new Set(found.photos.map(({ hash }) => hash))
  const phones = new Map(found.phones.map((phone) => [phone.id, phone]))
  if (found.entries.length === 0)
    return <p className="text-second text-ink2">Nothing written yet.</p>
  return (
    <ol className="desk-log">
      {found.entries.map((entry, at) => (
        <LogItem
          key={entry.id}
          entry={entry}
          line={lineOf(entry, found.entries, index)}
          before={found.entries[at - 1] ?? null}
          struck={struck.has(entry.id)}
          author={who.get(entry.authorId) ?? 'somebody who left'}
          isHere={(hash) => here.has(hash)}
          phone={phones.get(entry.deviceId) ?? null}
        />
      ))}
    </ol>
  )
}

/** A correction repeats the shape of the entry it points back to. */
function lineOf(
  entry: LogRow,
  all: readonly LogRow[],
  index: BookIndex | null,
): EntryWords & { bar: boolean } {
  const line = entryWords(entry.body, index)
  if (entry.supersedes === null) return { ...line, bar: false }
  const earlier = all.find(({ id }) => id === entry.supersedes)
  const shape =
    entry.body.kind === 'correction' && earlier ? entryWords(earlier.body, index).shape : line.shape
  return { ...line, shape, bar: true }
}

type ItemProps = {
  entry: LogRow
  line: EntryWords & { bar: boolean }
  before: LogRow | null
  struck: boolean
  author: string
  isHere: (hash: string) => boolean
  phone: DeskJob['phones'][number] | null
}

function LogItem({ entry, line, before, struck, author, isHere, phone }: ItemProps) {
  const { shop } = useDesk()
  const gap = before ? Date.parse(entry.happenedAt) - Date.parse(before.happenedAt) : 0
  const newDay =
    !before || dayName(before.happenedAt, shop.zone) !== dayName(entry.happenedAt, shop.zone)
  return (
    <li className={gap > GAP_MS ? 'desk-log-gap' : undefined}>
      {newDay ? (
        <p className="desk-log-day figures">{dayName(entry.happenedAt, shop.zone)}</p>
      ) : null}
      {gap > GAP_MS ? <p className="desk-log-gap-words figures">{span(gap)} later</p> : null}
      <div className="desk-log-line">
        <time dateTime={entry.happenedAt} className="figures text-second">
          {clockTime(entry.happenedAt, shop.zone)}
        </time>
        <span className="desk-log-node">
          <LogIcon shape={line.shape} bar={line.bar} className="size-8" />
        </span>
        <div className="min-w-0">
          <h3 className={struck ? 'text-row font-bold line-through' : 'text-row font-bold'}>
            <span className="visually-hidden">
              {line.bar ? `${line.kind}, correction: ` : `${line.kind}: `}
            </span>
            {line.title}
          </h3>
          {entry.body.kind === 'reading' ? <ReadingLine body={entry.body} struck={struck} /> : null}
          {line.lines.map((text) => (
            <p key={text} className="whitespace-pre-line text-second text-ink2">
              {text}
            </p>
          ))}
          <FileOf body={entry.body} isHere={isHere} on={{ phone, author, at: entry.writtenAt }} />
          <Provenance entry={entry} before={before} author={author} kind={line.kind} />
          {struck ? <p className="text-second">Taken out of evidence below.</p> : null}
        </div>
      </div>
    </li>
  )
}

type ProvenanceProps = { entry: LogRow; before: LogRow | null; author: string; kind: string }

/** What kind, by whom, and when it reached the shop where that is another minute than the entry before. */
function Provenance({ entry, before, author, kind }: ProvenanceProps) {
  const { shop } = useDesk()
  // Under the day of the entry: an arrival on another one names its day.
  const at = whenWords(entry.receivedAt, shop.zone, Date.parse(entry.happenedAt))
  const lateMs = Date.parse(entry.receivedAt) - Date.parse(entry.happenedAt)
  const minuteOf = ({ receivedAt }: LogRow) => whenWords(receivedAt, shop.zone, null)
  const alike = before !== null && minuteOf(before) === minuteOf(entry)
  return (
    <p className="text-second text-ink2">
      {kind}, {author}
      {lateMs > 60_000 && !alike ? `, in at ${at}` : ''}
    </p>
  )
}
