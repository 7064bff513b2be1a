'use client'
import type { BookIndex } from '@/lib/diag/book-index'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { happenedAbout } from '../field/log/happened-about'
import { clockTime } from '../field/times'
import { entryMention } from '../log/entry-words'
import { useDraft } from '../store/use-draft'
import { useJobZone } from '../store/use-job-zone'
import { useStamp } from '../store/use-stamp'
import { DraftSign } from '../ui/draft-sign'
import { Field } from '../ui/field'
import { Key } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { useTimesDone } from './check-steps'
import { FRESH, type HowDone, HowDoneForm, missingOf } from './how-done'
import { NotYours, useMayLog } from './use-may'
import { NotSaved, useSave } from './use-save'

type Props = {
  jobId: Id
  check: CheckItem
  index: BookIndex
  /** Living entries of this check, oldest first. */
  before: readonly LogEntry[]
  onSaved: (entryId: Id) => void
}

/** What was found: one big key per named outcome, "could not", and how and when it was done. */
export function RecordOutcome(props: Props) {
  const mine = useMayLog('check', props.check.guideSafe)
  return mine ? <Recording {...props} /> : <NotYours what="This check" />
}

function Recording({ jobId, check, index, before, onSaved }: Props) {
  const { value: how, set, kept, how: outcome } = useOutcome(jobId, check, onSaved)
  const timeUnread = how.earlier && outcome.happenedAt() === null
  const timeProblem = timeUnread && how.about !== '' ? 'Type the time as 14:05.' : null
  const missing = missingOf(how, !timeUnread)
  const blocked = outcome.saving || missing !== null
  return (
    <section aria-labelledby="found" className="grid gap-4">
      <RuleEdge id="found">What did you find</RuleEdge>
      <Earlier jobId={jobId} before={before} index={index} />
      <p>
        <b>Write down:</b> {check.record}
      </p>
      <HowDoneForm value={how} onChange={set} timeProblem={timeProblem} />
      {missing !== null && <p className="text-second text-ink2">{missing}</p>}
      {check.reading !== null && <p className="font-bold">Without a figure:</p>}
      <div className="grid gap-2">
        {check.outcomes.map((one) => (
          <Key
            key={one.id}
            quiet
            className="w-full"
            disabled={blocked}
            onClick={() => outcome.found(one.id)}
          >
            {one.name}
          </Key>
        ))}
      </div>
      <CouldNot
        how={how}
        set={set}
        missing={timeUnread ? missing : null}
        saving={outcome.saving}
        onSave={outcome.couldNot}
      />
      <DraftSign kept={kept} />
      <NotSaved problem={outcome.problem} />
    </section>
  )
}

function useOutcome(jobId: Id, check: CheckItem, onSaved: (id: Id) => void) {
  const key = `check:${jobId}:${check.id}`
  const { value, set, kept } = useDraft<HowDone>(key, FRESH)
  const times = useTimesDone(check.id)
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const zone = useJobZone(jobId)
  const happenedAt = () => {
    if (!value.earlier) return stamp.now()
    return value.about === '' ? null : happenedAbout(value.about, stamp.now(), zone)
  }
  const keep = async (body: LogBody) => {
    const at = happenedAt()
    if (at === null) return
    const op = stamp.entry(jobId, body, value.earlier ? { happenedAt: at } : {})
    if (!(await save([op], { clearDrafts: [key] }))) return
    if (body.kind === 'check') times.set(times.value + 1)
    onSaved(op.fields.id)
  }
  const found = (outcome: string) =>
    keep({
      kind: 'check',
      checkId: check.id,
      outcome,
      asWritten: value.asWritten,
      differed: value.asWritten ? null : value.differed.trim(),
    })
  const couldNot = () => keep({ kind: 'couldNot', checkId: check.id, reason: value.reason.trim() })
  return { value, set, kept, how: { found, couldNot, saving, problem, happenedAt } }
}

function Earlier({ jobId, before, index }: Pick<Props, 'jobId' | 'before' | 'index'>) {
  const zone = useJobZone(jobId)
  if (before.length === 0) return null
  return (
    <ul className="grid gap-1 border-l-4 border-ink pl-3">
      {before.map((entry) => (
        <li key={entry.id}>
          <span className="figures mr-2 text-ink2">{clockTime(entry.happenedAt, zone)}</span>
          {entryMention(entry.body, index)}
        </li>
      ))}
      <li className="text-second text-ink2">
        The same check again under the same conditions is no new evidence.
      </li>
    </ul>
  )
}

type CouldNotProps = {
  how: HowDone
  set: (next: HowDone) => void
  /** What keeps it from being recorded, besides the reason. */
  missing: string | null
  saving: boolean
  onSave: () => void
}

function CouldNot({ how, set, missing, saving, onSave }: CouldNotProps) {
  const reasonless = how.reason.trim() === ''
  if (!how.couldNot)
    return (
      <Key small onClick={() => set({ ...how, couldNot: true })}>
        Could not do it
      </Key>
    )
  return (
    <div className="grid gap-2 border-2 border-ink p-3">
      <Field
        label="Why not"
        hint="It moves no suspect and is not offered again."
        value={how.reason}
        onChange={(reason) => set({ ...how, reason })}
        maxLength={500}
      />
      {reasonless && <p className="text-second text-ink2">Say why, in a few words.</p>}
      {missing !== null && <p className="text-second text-ink2">{missing}</p>}
      <div className="grid grid-cols-2 gap-2">
        <Key small onClick={() => set({ ...how, couldNot: false })}>
          Back
        </Key>
        <Key
          small
          kind="plate"
          disabled={saving || missing !== null || reasonless}
          onClick={onSave}
        >
          Record it
        </Key>
      </div>
    </div>
  )
}
