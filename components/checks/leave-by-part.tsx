'use client'
import { LEAVE_BY_MARGIN_MINUTES } from '@/lib/diag/daylight'
import type { Id } from '@/lib/model/id'
import { leaveByWords, nextTime } from '../engine/leave-by'
import type { MeansView } from '../engine/use-means'
import { clockTime } from '../field/times'
import { useDraft } from '../store/use-draft'
import { useJob } from '../store/use-rows'
import { useStamp } from '../store/use-stamp'
import { DraftSign } from '../ui/draft-sign'
import { Field } from '../ui/field'
import { Figure } from '../ui/figure'
import { Key } from '../ui/key'
import { useMayLog } from './use-may'
import { NotSaved, useSave } from './use-save'

/** What is typed for another time to leave by, kept to the keystroke (rule R8). */
type LeaveByDraft = { time: string; reason: string }
const FIRST: LeaveByDraft = { time: '', reason: '' }

/** Leave-by is the person's: suggested from civil dusk less 30 minutes (practice), changed with a reason (R6). */
export function LeaveBy({ jobId, view }: { jobId: Id; view: MeansView }) {
  const { choice, choose, nowMs } = view
  const zone = useJob(jobId)?.zone ?? 'UTC'
  const key = `leaveBy:${jobId}`
  const { value: draft, set, ready, kept } = useDraft<LeaveByDraft>(key, FIRST)
  const { save, saving, problem } = useSave()
  const stamp = useStamp()
  const keep = async (leaveBy: string | null) => {
    const words =
      leaveBy === null
        ? 'No time to leave by.'
        : `Leave by ${leaveByWords(leaveBy, zone, Date.parse(stamp.now()))}.`
    const note = stamp.entry(jobId, { kind: 'note', words: `${words} ${draft.reason.trim()}` })
    if (await save([note], { clearDrafts: [key] })) choose({ ...choice, leaveBy })
  }
  const mine = useMayLog('note')
  const locked = !ready || saving || draft.reason.trim() === ''
  return (
    <div className="grid gap-2">
      <p>
        {choice.leaveBy === null ? (
          'No time to leave by is set, so nothing is left out for time.'
        ) : (
          <>
            Leave by <Figure value={leaveByWords(choice.leaveBy, zone, nowMs)} />. What does not fit
            is listed with the minutes it is over.
          </>
        )}
      </p>
      <Dusk duskMs={view.duskMs} zone={zone} />
      {mine && (
        <>
          <Field
            label="Leave by"
            hint="A time that is past today is tomorrow’s."
            type="time"
            figures
            value={draft.time}
            onChange={(time) => set({ ...draft, time })}
          />
          <Field
            label="Reason, kept in the log"
            hint="For example: lights and a second machine. Without one it stays as it is."
            value={draft.reason}
            onChange={(reason) => set({ ...draft, reason })}
            maxLength={300}
          />
          <DraftSign kept={kept} />
          <NotSaved problem={problem} />
          <div className="grid grid-cols-2 gap-2">
            <Key
              small
              disabled={locked || !/^\d\d:\d\d$/.test(draft.time)}
              onClick={() => keep(nextTime(draft.time, zone, Date.parse(stamp.now())))}
            >
              Set the time
            </Key>
            <Key small disabled={locked || choice.leaveBy === null} onClick={() => keep(null)}>
              No limit
            </Key>
          </div>
        </>
      )}
    </div>
  )
}

function Dusk({ duskMs, zone }: { duskMs: number | null; zone: string }) {
  if (duskMs === null) return null
  const bySun = duskMs - LEAVE_BY_MARGIN_MINUTES * 60_000
  return (
    <p className="text-second text-ink2">
      Civil dusk here is {clockTime(isoOf(duskMs), zone)}; {LEAVE_BY_MARGIN_MINUTES} minutes before
      is {clockTime(isoOf(bySun), zone)} (common practice, no source). Take the ride out off as
      well.
    </p>
  )
}

const isoOf = (ms: number): string => new Date(ms).toISOString()
