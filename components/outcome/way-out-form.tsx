'use client'
import type { ReactNode } from 'react'
import { living } from '@/lib/diag/case'
import type { Id } from '@/lib/model/id'
import type { Job, JobMachineState, PeopleState, WayOut } from '@/lib/model/job'
import { movesFrom } from '@/lib/shop/job-states'
import { LEFT_BEHIND_LINES, leftBehindLacks, statesAfter } from '@/lib/shop/way-out-states'
import { NotSaved, useSave } from '../checks/use-save'
import type { JobCase } from '../engine/use-case'
import { MACHINE_WORDS, PEOPLE_WORDS } from '../field/words'
import { useStamp } from '../store/use-stamp'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { Key, KeyLink } from '../ui/key'
import { type WayOutDraft, wayOutDraftKey } from './way-out-draft'
import { movesOf } from './way-out-moves'
import { LACKS_WORDS, LEFT_WORDS, SAID_SHORT } from './way-out-words'

type Props = {
  jobId: Id
  found: JobCase
  way: WayOut | null
  draft: WayOutDraft
  set: (next: WayOutDraft) => void
  onSaved: (entryId: Id) => void
}

/** Machine, people and reasons, and the key that records them; nothing before a way is picked. */
export function useWayOutForm({ jobId, found, way, draft, set, onSaved }: Props): {
  fields: ReactNode
  foot: ReactNode
} {
  const { job } = found
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  if (way === null) return { fields: null, foot: null }
  const after = statesAfter(way, job)
  const machine = draft.machine ?? after.machine
  const people = draft.people ?? after.people
  const missing = whatIsMissing(draft, machine, found)
  const keep = async () => {
    const entry = stamp.entry(jobId, {
      kind: 'wayOut',
      wayOut: way,
      reasons: reasonsOf(draft, machine),
      machineState: machine,
      peopleState: people,
    })
    const ops = [entry, ...movesOf(job, { machine, people })]
    if (await save(ops, { clearDrafts: [wayOutDraftKey(jobId)] })) onSaved(entry.fields.id)
  }
  return {
    fields: (
      <>
        <After job={job} machine={machine} people={people} draft={draft} set={set} />
        {machine === 'leftBehind' && (
          <LeftBehind jobId={jobId} draft={draft} set={set} found={found} />
        )}
        <Field
          label="Reasons"
          hint="Why this way and not another"
          value={draft.reasons}
          onChange={(reasons) => set({ ...draft, reasons })}
          lines={3}
          maxLength={1200}
        />
        <NotSaved problem={problem} />
      </>
    ),
    foot: (
      <>
        {missing !== null && <p className="text-second text-ink2">{missing}</p>}
        <Key kind="main" disabled={saving || missing !== null} onClick={keep}>
          Record the way out
        </Key>
      </>
    ),
  }
}

const reasonsOf = (draft: WayOutDraft, machine: JobMachineState): string =>
  [draft.reasons.trim(), ...saidLines(draft), ...leftLines(draft, machine)]
    .filter((line) => line !== '')
    .join('\n')

type AfterProps = Pick<Props, 'draft' | 'set'> & {
  job: Job
  machine: JobMachineState
  people: PeopleState
}

/** Where machine and people are afterwards: as now, or where they may move to (rule R2). */
function After({ job, machine, people, draft, set }: AfterProps) {
  return (
    <>
      <Choice
        legend="The machine is then"
        value={machine}
        onChange={(next) => set({ ...draft, machine: next })}
        columns={2}
        options={[job.machineState, ...movesFrom('machine', job.machineState)].map((value) => ({
          value,
          label: MACHINE_WORDS[value],
        }))}
      />
      <Choice
        legend="The people are then"
        value={people}
        onChange={(next) => set({ ...draft, people: next })}
        columns={2}
        options={[job.peopleState, ...movesFrom('people', job.peopleState)].map((value) => ({
          value,
          label: PEOPLE_WORDS[value],
        }))}
      />
    </>
  )
}

function whatIsMissing(
  draft: WayOutDraft,
  machine: JobMachineState,
  found: JobCase,
): string | null {
  if (draft.reasons.trim() === '') return 'Say in a few words why.'
  if (machine !== 'leftBehind') return null
  const lacks = leftBehindLacks({
    hasPlace: found.job.place !== null,
    hasPhoto: living(found.entries).some(({ body }) => body.kind === 'photo'),
    lines: draft.left,
  })
  return lacks === null ? null : LACKS_WORDS[lacks]
}

const saidLines = ({ said }: WayOutDraft): string[] =>
  said.length === 0
    ? []
    : [`Against riding it out: ${said.map((one) => SAID_SHORT[one]).join(', ')}.`]

const leftLines = ({ left }: WayOutDraft, machine: JobMachineState): string[] =>
  machine === 'leftBehind'
    ? LEFT_BEHIND_LINES.map((key) => `${LEFT_WORDS[key]}: ${left[key].trim()}`)
    : []

function LeftBehind({
  jobId,
  draft,
  set,
  found,
}: Pick<Props, 'jobId' | 'draft' | 'set' | 'found'>) {
  const photo = living(found.entries).some(({ body }) => body.kind === 'photo')
  return (
    <div className="grid gap-3 border-2 border-ink p-3">
      <p className="font-bold">Left behind: whoever fetches it has only this.</p>
      <p>
        Position: {found.job.place === null ? 'missing on the job' : 'on the job'}. Photo:{' '}
        {photo ? 'in the log' : 'missing'}.
      </p>
      {found.job.place === null && (
        <KeyLink href={`/field/jobs/${jobId}/place`}>Take or type the position</KeyLink>
      )}
      {!photo && <KeyLink href={`/field/jobs/${jobId}/photo`}>Take a photo</KeyLink>}
      {LEFT_BEHIND_LINES.map((key) => (
        <Field
          key={key}
          label={LEFT_WORDS[key]}
          value={draft.left[key]}
          onChange={(words) => set({ ...draft, left: { ...draft.left, [key]: words } })}
          maxLength={120}
        />
      ))}
    </div>
  )
}
