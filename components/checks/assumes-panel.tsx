'use client'
import { useState } from 'react'
import { LEAVE_BY_MARGIN_MINUTES } from '@/lib/diag/daylight'
import type { Id } from '@/lib/model/id'
import type { Shop } from '@/lib/model/shop'
import type { MeansView } from '../engine/use-means'
import { clockTime } from '../field/times'
import { useJob } from '../store/use-rows'
import { useStamp } from '../store/use-stamp'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { Figure } from '../ui/figure'
import { Key } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { NotSaved, useSave } from './use-save'
import { moneyWords } from './words'

type Props = { jobId: Id; view: MeansView; shop: Shop | undefined; bookVersion: number }

/** What the plan assumes, in the open (rules R6, R25): prices, people, light, and the time to leave by. */
export function AssumesPanel({ jobId, view, shop, bookVersion }: Props) {
  const [open, setOpen] = useState(false)
  const { choice, choose } = view
  if (!open)
    return (
      <Key small aria-expanded={false} onClick={() => setOpen(true)}>
        What this assumes
      </Key>
    )
  return (
    <section aria-labelledby="assumes" className="grid gap-4">
      <RuleEdge id="assumes">What this assumes</RuleEdge>
      {shop !== undefined && <Prices shop={shop} bookVersion={bookVersion} />}
      <Choice
        legend="People who can help"
        columns={2}
        value={choice.people === 2 ? 'two' : 'one'}
        onChange={(next) => choose({ ...choice, people: next === 'two' ? 2 : 1 })}
        options={[
          { value: 'one', label: 'Just me' },
          { value: 'two', label: 'Two of us' },
        ]}
      />
      <Choice
        legend="Light"
        value={choice.dark}
        onChange={(next) => choose({ ...choice, dark: next })}
        hint="In the dark every minute counts 1.3 (shop setting, common practice)."
        options={[
          { value: 'bySun', label: `By the sun: ${view.darkBySun ? 'dark' : 'light'} now` },
          { value: 'no', label: 'Light enough' },
          { value: 'yes', label: 'Dark' },
        ]}
      />
      <LeaveBy jobId={jobId} view={view} />
      <Key small aria-expanded onClick={() => setOpen(false)}>
        Close
      </Key>
    </section>
  )
}

function Prices({ shop, bookVersion }: { shop: Shop; bookVersion: number }) {
  const rows = [
    ['A mechanic’s hour', shop.perMinuteMinor * 60],
    ['A tow', shop.towMinor],
    ['A second recovery', shop.recoveryMinor],
  ] as const
  return (
    <div>
      <dl className="grid gap-1">
        {rows.map(([label, minor]) => (
          <div key={label} className="flex items-baseline justify-between gap-3">
            <dt>{label}</dt>
            <dd className="figures text-right">{moneyWords(minor, shop.currency)}</dd>
          </div>
        ))}
      </dl>
      <p className="mt-1 text-second text-ink2">
        Set by {shop.name}. Shares and outcome tables come from code book version{' '}
        <span className="figures">{bookVersion}</span>, each with its source.
      </p>
    </div>
  )
}

/** Leave-by is the person's: suggested from civil dusk less 30 minutes (practice), changed with a reason. */
function LeaveBy({ jobId, view }: { jobId: Id; view: MeansView }) {
  const { choice, choose, duskMs } = view
  const job = useJob(jobId)
  const zone = job?.zone ?? 'UTC'
  const [time, setTime] = useState(choice.leaveBy ?? '')
  const [reason, setReason] = useState('')
  const { save, problem } = useSave()
  const stamp = useStamp()
  const bySun =
    duskMs === null ? null : clockTime(isoOf(duskMs - LEAVE_BY_MARGIN_MINUTES * 60_000), zone)
  const keep = async (leaveBy: string | null) => {
    const why = reason.trim() === '' ? '' : ` ${reason.trim()}`
    const words = leaveBy === null ? `No time to leave by.${why}` : `Leave by ${leaveBy}.${why}`
    if (!(await save([stamp.entry(jobId, { kind: 'note', words })]))) return
    choose({ ...choice, leaveBy })
    setReason('')
  }
  return (
    <div className="grid gap-2">
      <p>
        {choice.leaveBy === null ? (
          'No time to leave by is set, so nothing is left out for time.'
        ) : (
          <>
            Leave by <Figure value={choice.leaveBy} />. What does not fit is listed with the minutes
            it is over.
          </>
        )}
      </p>
      {duskMs !== null && bySun !== null && (
        <p className="text-second text-ink2">
          Civil dusk here is {clockTime(isoOf(duskMs), zone)}; {LEAVE_BY_MARGIN_MINUTES} minutes
          before is {bySun} (common practice). Take the ride out off as well.
        </p>
      )}
      <Field label="Leave by" type="time" figures value={time} onChange={setTime} />
      <Field
        label="Reason, kept in the log"
        hint="For example: lights and a second machine"
        value={reason}
        onChange={setReason}
        maxLength={300}
      />
      <NotSaved problem={problem} />
      <div className="grid grid-cols-2 gap-2">
        <Key small disabled={!/^\d\d:\d\d$/.test(time)} onClick={() => keep(time)}>
          Set the time
        </Key>
        <Key small disabled={choice.leaveBy === null} onClick={() => keep(null)}>
          No limit
        </Key>
      </div>
    </div>
  )
}

const isoOf = (ms: number): string => new Date(ms).toISOString()
