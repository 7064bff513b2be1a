'use client'

import { useEffect, useMemo, useRef } from 'react'
import { useBook } from '@/components/store/use-book'
import { type StoredEntry, useLog } from '@/components/store/use-log'
import { useSession } from '@/components/store/use-session'
import { KeyLink } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Screen } from '@/components/ui/screen'
import { strikes } from '@/lib/diag/case'
import { mayLogInField } from '@/lib/shop/may-record'
import { OfJob } from '../of-job'
import { jobHref } from '../route'
import { dayOf } from '../times'
import { CutWire, LogItem } from './log-item'

/** Longer than this between two entries and the wire is drawn broken, with the time that passed. */
const GAP_MS = 20 * 60_000

/** The LOG tab: dated, append-only, newest at the thumb. */
export function LogScreen({ jobId }: { jobId: string }) {
  const session = useSession()
  const roles = session.kind === 'ready' ? session.actor.roles : []
  return (
    <OfJob jobId={jobId}>
      {({ job }) => (
        <Screen
          title="Log"
          titleHidden
          foot={
            <div className="grid grid-cols-1 gap-2 slim:grid-cols-2">
              {mayLogInField(roles, 'note') ? (
                <KeyLink href={jobHref(job.id, 'note')}>Note</KeyLink>
              ) : null}
              {mayLogInField(roles, 'photo') ? (
                <KeyLink href={jobHref(job.id, 'photo')}>Photo</KeyLink>
              ) : null}
              {mayLogInField(roles, 'voice') ? (
                <KeyLink href={jobHref(job.id, 'voice')}>Voice note</KeyLink>
              ) : null}
              <KeyLink kind="plate" href={jobHref(job.id, 'checks')}>
                Reading
              </KeyLink>
            </div>
          }
        >
          <Lines jobId={job.id} openedAt={job.openedAt} zone={job.zone} />
        </Screen>
      )}
    </OfJob>
  )
}

function Lines({ jobId, openedAt, zone }: { jobId: string; openedAt: string; zone: string }) {
  const log = useLog(jobId)
  const { index } = useBook()
  const end = useRef<HTMLDivElement>(null)
  const shown = useRef<boolean>(false)
  const struck = useMemo(() => strikes((log ?? []).map((line) => line.entry)), [log])
  // Newest at the thumb: the first look at a log is at its end.
  useEffect(() => {
    if (log !== undefined && !shown.current) {
      shown.current = true
      if (log.length > 6) {
        end.current?.scrollIntoView({ block: 'end' })
      }
    }
  }, [log])
  if (log === undefined) {
    return <p className="text-ink2">Opening the log.</p>
  }
  const firstHere = log.findIndex((line) => !line.sent)
  return (
    <section className="grid gap-3">
      <RuleEdge end={String(log.length)}>
        Log, {dayOf(log[0]?.entry.happenedAt ?? openedAt, zone)}
      </RuleEdge>
      {log.length === 0 ? (
        <p>
          Nothing yet. Codes, checks, readings, notes and photos stand here as they are recorded.
        </p>
      ) : null}
      <ol>
        {log.map((line, i) => (
          <LineWithCut
            key={line.entry.id}
            cut={i === firstHere}
            line={line}
            before={log[i - 1] ?? null}
            log={log}
            struck={struck}
            index={index}
            zone={zone}
          />
        ))}
      </ol>
      <div ref={end} />
    </section>
  )
}

function LineWithCut(props: {
  cut: boolean
  line: StoredEntry
  before: StoredEntry | null
  log: readonly StoredEntry[]
  struck: Parameters<typeof LogItem>[0]['struck']
  index: Parameters<typeof LogItem>[0]['index']
  zone: string
}) {
  const { entry } = props.line
  const { zone } = props
  const before = props.before?.entry ?? null
  const gapMs = before === null ? 0 : Date.parse(entry.happenedAt) - Date.parse(before.happenedAt)
  const newDay = before !== null && dayOf(before.happenedAt, zone) !== dayOf(entry.happenedAt, zone)
  return (
    <>
      {props.cut ? <CutWire /> : null}
      <LogItem
        line={props.line}
        log={props.log}
        struck={props.struck}
        index={props.index}
        gapMs={gapMs > GAP_MS ? gapMs : null}
        day={newDay ? dayOf(entry.happenedAt, zone) : null}
        zone={zone}
      />
    </>
  )
}
