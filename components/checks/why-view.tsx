import type { Suspect } from '@/lib/diag/belief'
import type { BookIndex } from '@/lib/diag/book-index'
import type { LogEntry } from '@/lib/model/log-entry'
import { clockTime } from '../field/times'
import { entryMention } from '../log/entry-words'
import { of100 } from '../reading-strip/figures'
import { whyLine } from './why-words'

type Props = {
  suspect: Suspect
  entries: readonly LogEntry[]
  index: BookIndex
  /** In which times are shown. */
  zone: string
}

/** Why a suspect stands where it stands: each piece of evidence, its direction, how strongly, and when. */
export function WhyView({ suspect, entries, index, zone }: Props) {
  const repair = index.faults.get(suspect.fault)
  return (
    <div className="mt-2 grid gap-2 border-l-4 border-ink pl-3">
      <p className="text-second">
        Before anything was looked at: <b className="figures">{of100(suspect.prior)}</b> of 100. Now{' '}
        <b className="figures">{of100(suspect.chance)}</b>.
      </p>
      <ul className="grid gap-2">
        {suspect.why.filter(speaks).map((why) => (
          <WhyRow
            key={`${why.entryId} ${why.about} ${why.label}`}
            why={why}
            entry={entries.find((entry) => entry.id === why.entryId) ?? null}
            index={index}
            zone={zone}
          />
        ))}
      </ul>
      <Silent suspect={suspect} entries={entries} index={index} />
      {repair !== undefined && <p className="text-second">Proved by: {repair.provedBy}</p>}
      <p className="text-second text-ink2">
        The chances are the model&apos;s own, from the code book and this job&apos;s log.
      </p>
    </div>
  )
}

const speaks = (why: Suspect['why'][number]): boolean =>
  why.about === 'share' || whyLine(why).direction !== 'nothing'

/** What was looked at and says nothing about this suspect, in one line. */
function Silent({ suspect, entries, index }: Omit<Props, 'zone'>) {
  const words = suspect.why
    .filter((why) => !speaks(why))
    .map((why) => entries.find((entry) => entry.id === why.entryId))
    .filter((entry) => entry !== undefined)
    .map((entry) => entryMention(entry.body, index))
  if (words.length === 0) return null
  return <p className="text-second text-ink2">Says nothing about it: {words.join('; ')}.</p>
}

type RowProps = Pick<Props, 'index' | 'zone'> & {
  why: Suspect['why'][number]
  entry: LogEntry | null
}

function WhyRow({ why, entry, index, zone }: RowProps) {
  const line = whyLine(why)
  return (
    <li className="text-second">
      {entry !== null && (
        <span className="figures mr-2 text-ink2">{clockTime(entry.happenedAt, zone)}</span>
      )}
      <b>{entry === null ? why.label : capital(entryMention(entry.body, index))}</b>
      {why.about !== 'share' && (
        <>
          {' '}
          {line.strength}
          {line.factor !== '' && (
            <span className="text-ink2">
              {' '}
              (odds {line.factor} {line.direction === 'towards' ? 'up' : 'down'})
            </span>
          )}
          .
        </>
      )}
    </li>
  )
}

const capital = (words: string): string => `${words.slice(0, 1).toUpperCase()}${words.slice(1)}`
