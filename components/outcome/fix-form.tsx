'use client'
import { type ReactNode, useState } from 'react'
import type { Suspect } from '@/lib/diag/belief'
import { SOMETHING_ELSE } from '@/lib/diag/book-index'
import type { Id } from '@/lib/model/id'
import { NotSaved, useSave } from '../checks/use-save'
import { useBelief } from '../engine/use-belief'
import { useRoute } from '../field/router'
import { of100 } from '../reading-strip/figures'
import { useBook } from '../store/use-book'
import { useDraft } from '../store/use-draft'
import { useStamp } from '../store/use-stamp'
import { Caution } from '../ui/caution'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { Key } from '../ui/key'
import { Screen } from '../ui/screen'

type FixDraft = {
  fault: string | null
  words: string
  temporary: 'no' | 'yes'
  limit: string
  undo: string
}
const FIRST: FixDraft = { fault: null, words: '', temporary: 'no', limit: '', undo: '' }

type FormProps = {
  jobId: Id
  onSaved: (entryId: Id) => void
  /** What is already on record. */
  children: ReactNode
}

/** Which fault, what was done, and whether it is only a temporary measure (rule R3). */
export function FixForm({ jobId, onSaved, children }: FormProps) {
  const { search } = useRoute()
  const key = `fix:${jobId}`
  const { value, set, kept } = useDraft<FixDraft>(key, FIRST)
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const fault = value.fault ?? search.get('fault')
  const missing = whatIsMissing({ ...value, fault })
  const keep = async () => {
    if (fault === null) return
    const temporary =
      value.temporary === 'yes' ? { limit: value.limit.trim(), undo: value.undo.trim() } : null
    const op = stamp.entry(jobId, { kind: 'fix', fault, words: value.words.trim(), temporary })
    if (await save([op], { clearDrafts: [key] })) onSaved(op.fields.id)
  }
  return (
    <Screen
      title="Fix"
      second="What you did, in words the next mechanic can use."
      kept={kept}
      foot={
        <>
          {missing !== null && <p className="text-second text-ink2">{missing}</p>}
          <Key kind="main" disabled={saving || missing !== null} onClick={keep}>
            Record the fix
          </Key>
        </>
      }
    >
      {children}
      <WhichFault jobId={jobId} fault={fault} onPick={(next) => set({ ...value, fault: next })} />
      <Suggested fault={fault} words={value.words} onUse={(words) => set({ ...value, words })} />
      <Field
        label="What you did"
        value={value.words}
        onChange={(words) => set({ ...value, words })}
        lines={3}
        maxLength={2000}
      />
      <Choice
        legend="For good or for now"
        columns={2}
        value={value.temporary}
        onChange={(temporary) => set({ ...value, temporary })}
        options={[
          { value: 'no', label: 'For good' },
          { value: 'yes', label: 'Temporary' },
        ]}
      />
      {value.temporary === 'yes' && <Temporary value={value} set={set} />}
      <NotSaved problem={problem} />
    </Screen>
  )
}

function whatIsMissing(value: FixDraft): string | null {
  if (value.fault === null) return 'Pick the fault first.'
  if (value.words.trim() === '') return 'Say in a few words what you did.'
  if (value.temporary === 'yes' && (value.limit.trim() === '' || value.undo.trim() === ''))
    return 'A temporary measure needs its limit and how to undo it.'
  return null
}

type WhichProps = { jobId: Id; fault: string | null; onPick: (fault: string) => void }

/** The likely ones as keys, the rest behind one more. */
function WhichFault({ jobId, fault, onPick }: WhichProps) {
  const { answer, working, failed } = useBelief(jobId)
  const { status } = useBook()
  const [all, setAll] = useState(false)
  const suspects = answer?.belief.suspects ?? []
  const shown = all ? suspects : likely(suspects, fault)
  if (answer === null && (status === 'missing' || failed))
    return <OnlyElse why={WHY_ELSE[failed ? 'failed' : 'noBook']} fault={fault} onPick={onPick} />
  if (answer === null)
    return <p role="status">{working ? 'Working out the suspects.' : 'Opening.'}</p>
  return (
    <div className="grid gap-2">
      {failed && <p>The newest entry is not counted in these chances.</p>}
      <Choice
        legend="Fault"
        value={fault}
        onChange={onPick}
        options={shown.map((one) => ({
          value: one.fault,
          label: one.name,
          hint: `${of100(one.chance)} of 100`,
        }))}
      />
      {!all && shown.length < suspects.length && (
        <Key small onClick={() => setAll(true)}>
          All suspects
        </Key>
      )}
    </div>
  )
}

const WHY_ELSE = {
  noBook: 'This phone has no code book yet, so it cannot name the suspects.',
  failed: 'The suspects could not be worked out for this job.',
}

/** Without suspects to pick from the fix is put down as something else, in the person's own words. */
function OnlyElse(props: { why: string } & Omit<WhichProps, 'jobId'>) {
  return (
    <div className="grid gap-2">
      <p>{props.why} Pick “Something else”, and name the fault in what you did.</p>
      <Choice
        legend="Fault"
        value={props.fault}
        onChange={props.onPick}
        options={[{ value: SOMETHING_ELSE, label: 'Something else' }]}
      />
    </div>
  )
}

const likely = (suspects: readonly Suspect[], picked: string | null): Suspect[] =>
  suspects.filter((one, i) => i < 4 || one.fault === picked || one.fault === SOMETHING_ELSE)

function Suggested(props: { fault: string | null; words: string; onUse: (words: string) => void }) {
  const { index } = useBook()
  const repair = props.fault === null ? null : index?.faults.get(props.fault)?.repair
  if (repair == null || props.words === repair.words) return null
  return (
    <div className="grid gap-2 border-l-4 border-ink pl-3">
      <p className="text-second">
        The code book says: {repair.words}
        {repair.doesNotFix === null ? '' : ` ${repair.doesNotFix}`}
      </p>
      <Key small onClick={() => props.onUse(repair.words)}>
        Use these words
      </Key>
    </div>
  )
}

function Temporary({ value, set }: { value: FixDraft; set: (next: FixDraft) => void }) {
  return (
    <div className="grid gap-3">
      <Field
        label="Limit of use"
        hint="Speed, distance or date. For example: 20 km/h, to the road only"
        value={value.limit}
        onChange={(limit) => set({ ...value, limit })}
        maxLength={500}
      />
      <Field
        label="How to undo it"
        value={value.undo}
        onChange={(undo) => set({ ...value, undo })}
        maxLength={500}
      />
      <Caution signal="NOTICE">
        With a temporary measure open the machine is not for hire or for its customer until a
        mechanic signs it off.
      </Caution>
    </div>
  )
}
