'use client'

import { entryWords, kindWord } from '@/components/log/entry-words'
import { ReadingLine } from '@/components/log/reading-line'
import type { StoredEntry } from '@/components/store/use-log'
import { usePhoto } from '@/components/store/use-photo'
import { classes } from '@/components/ui/class-names'
import { LogIcon } from '@/components/ui/log-icon'
import { Photo } from '@/components/ui/photo'
import type { BookIndex } from '@/lib/diag/book-index'
import type { LogEntry } from '@/lib/model/log-entry'
import { jobHref } from '../route'
import { clockTime, span } from '../times'
import { whenWords } from '../when-words'

type Props = {
  line: StoredEntry
  log: readonly StoredEntry[]
  /** Entries out of evidence, each with the one that took it out. */
  struck: ReadonlyMap<string, LogEntry>
  index: BookIndex | null
  /** Time since the entry before, when it was long. */
  gapMs: number | null
  /** The day, when it is not the day of the entry before. */
  day: string | null
  /** In which times are shown: the job's. */
  zone: string
}

/** One entry on the wire: time, node, what it says. It opens the whole entry. */
export function LogItem({ line, log, struck, index, gapMs, day, zone }: Props) {
  const { entry, sent } = line
  const target = log.find((other) => other.entry.id === entry.supersedes)?.entry ?? null
  const later = struck.get(entry.id) ?? null
  const words = entryWords(entry.body, index)
  const time = clockTime(entry.happenedAt, zone)
  const bar = entry.body.kind === 'correction'
  return (
    <li className={classes('log-item', !sent && 'log-item-here')}>
      <p className="log-time figures text-second">{time}</p>
      <div className="log-node">
        <span className={classes('log-wire', gapMs !== null && 'log-gap')} aria-hidden="true" />
        <LogIcon shape={entryWords((bar && target ? target : entry).body, index).shape} bar={bar} />
      </div>
      <div className="log-text">
        {day === null ? null : <p className="caps text-section">{day}</p>}
        {gapMs === null ? null : <p className="text-second text-ink2">{span(gapMs)} later</p>}
        <a
          href={jobHref(entry.jobId, `log/${entry.id}`)}
          className="block min-h-14 text-ink no-underline"
        >
          <span className="visually-hidden">{words.kind}: </span>
          <Title entry={entry} title={words.title} struck={later !== null} />
          {entry.body.kind === 'reading' ? (
            <ReadingLine body={entry.body} struck={later !== null} />
          ) : null}
          {words.lines.map((text) => (
            <span key={text} className="line-clamp-3 block text-second text-ink2">
              {text}
            </span>
          ))}
          {target === null ? null : (
            <span className="block text-second text-ink2">
              Points back to {whenWords(target.happenedAt, zone, Date.parse(entry.happenedAt))},{' '}
              {kindWord(target.body).toLowerCase()}.
            </span>
          )}
          {later === null ? null : (
            <span className="block text-second font-bold">
              {later.body.kind === 'correction' ? 'Corrected' : 'Replaced'} at{' '}
              {whenWords(later.happenedAt, zone, Date.parse(entry.happenedAt))}.
            </span>
          )}
          {entry.body.kind === 'photo' ? (
            <Thumb hash={entry.body.photo.hash} words={words.title} />
          ) : null}
        </a>
      </div>
    </li>
  )
}

/** Decisions and fixes stand in the display face; a note is a sentence and does not. */
function Title({ entry, title, struck }: { entry: LogEntry; title: string; struck: boolean }) {
  const decided = entry.body.kind === 'wayOut'
  return (
    <span
      className={classes(
        'block',
        decided ? 'caps text-key' : 'line-clamp-4 text-row font-bold',
        struck && 'line-through',
      )}
    >
      {title}
    </span>
  )
}

function Thumb({ hash, words }: { hash: string; words: string }) {
  const { thumb: url } = usePhoto(hash)
  return url === null ? (
    <span className="block text-second text-ink2">The picture is on the phone that took it.</span>
  ) : (
    <Photo url={url} alt={words} className="mt-1 max-h-40" />
  )
}

/** Where unsent work begins: the wire is cut and the lower end is set off. */
export function CutWire() {
  return (
    <li className="log-cut">
      <svg viewBox="0 0 50 30" className="h-7.5 w-12.5 overflow-visible" aria-hidden="true">
        <g fill="var(--paint)" stroke="var(--paint-ink)" strokeWidth="2.4">
          <rect x="2" y="2" width="26" height="9" />
          <rect x="14" y="19" width="26" height="9" />
        </g>
      </svg>
      <p className="caps text-section">Below: this phone only</p>
    </li>
  )
}
