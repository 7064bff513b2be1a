'use client'

import { useId, useState } from 'react'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { distanceMetres } from '@/lib/diag/distance'
import type { BoardJob, DeskJob } from '@/lib/model/desk'
import type { Job } from '@/lib/model/job'
import { may } from '@/lib/shop/permissions'
import type { MergeActions } from '../desk-actions'
import { useDesk } from '../desk-context'
import { useActing } from '../use-acting'
import { nearest } from './nearest'

type Props = { found: DeskJob; open: readonly BoardJob[]; actions: MergeActions }

/** One stranding reported twice (R13): merges this job into another open one, and undoes such a merge. */
export function MergePanel({ found, open, actions }: Props) {
  const { actor } = useDesk()
  const { busy, refusal, act } = useActing()
  const { job, merged } = found
  if (!may(actor.roles, 'job.merge')) return <MergedList merged={merged} onUnmerge={null} />
  const others = nearest(job, open)
  const unmerge = (one: DeskJob['merged'][number]) =>
    act(() => actions.unmerge({ jobId: one.id }), `${one.number} stands for itself again.`)
  return (
    <>
      <MergedList merged={merged} busy={busy} onUnmerge={unmerge} />
      {job.state === 'closed' || others.length === 0 ? null : (
        <MergeForm
          job={job}
          others={others}
          busy={busy}
          onMerge={(into) =>
            act(
              () => actions.merge({ jobId: job.id, intoId: into.job.id }),
              `${job.number} is merged into ${into.job.number}.`,
            )
          }
        />
      )}
      {refusal ? <p className="mt-2 font-bold text-nogo">{refusal}</p> : null}
    </>
  )
}

type ListProps = {
  merged: DeskJob['merged']
  busy?: boolean
  onUnmerge: ((one: DeskJob['merged'][number]) => Promise<boolean>) | null
}

function MergedList({ merged, busy = false, onUnmerge }: ListProps) {
  if (merged.length === 0) return null
  return (
    <section className="mt-7">
      <RuleEdge end={merged.length}>Merged into this job</RuleEdge>
      <ul>
        {merged.map((one) => (
          <li key={one.id} className="desk-row">
            <span className="min-w-0 flex-1 text-body">
              <b className="figures">{one.number}</b> {one.words}
            </span>
            {onUnmerge ? (
              <Key
                small={true}
                quiet={true}
                className="desk-key"
                disabled={busy}
                aria-label={`Unmerge ${one.number}`}
                onClick={() => void onUnmerge(one)}
              >
                Unmerge
              </Key>
            ) : null}
          </li>
        ))}
      </ul>
    </section>
  )
}

type FormProps = {
  job: Job
  others: readonly BoardJob[]
  busy: boolean
  onMerge: (into: BoardJob) => Promise<boolean>
}

function MergeForm({ job, others, busy, onMerge }: FormProps) {
  const id = useId()
  const [open, setOpen] = useState(false)
  const [intoId, setIntoId] = useState('')
  const into = others.find((other) => other.job.id === intoId) ?? others[0]
  if (into === undefined) return null
  return (
    <section className="mt-7">
      <RuleEdge>Reported twice?</RuleEdge>
      {open ? (
        <form
          className="mt-3 grid gap-2"
          onSubmit={(event) => {
            event.preventDefault()
            void onMerge(into)
          }}
        >
          <label htmlFor={id} className="text-second font-bold">
            Merge {job.number} into
          </label>
          <select
            id={id}
            className="field-box"
            value={into.job.id}
            onChange={(event) => setIntoId(event.target.value)}
          >
            {others.map((other) => (
              <option key={other.job.id} value={other.job.id}>
                {optionWords(job, other)}
              </option>
            ))}
          </select>
          <p className="text-second text-ink2">
            {into.job.number} goes on and shows what both have. Nothing is written over, and it can
            be undone.
          </p>
          <Key type="submit" kind="plate" disabled={busy}>
            Merge
          </Key>
          <Key small={true} quiet={true} onClick={() => setOpen(false)}>
            Leave it
          </Key>
        </form>
      ) : (
        <Key small={true} className="mt-3" onClick={() => setOpen(true)}>
          Merge into …
        </Key>
      )}
    </section>
  )
}

function optionWords(job: Job, { job: other, machineWords }: BoardJob): string {
  const km = job.place && other.place ? distanceMetres(job.place, other.place) / 1000 : null
  const far =
    km === null ? '' : km < 1 ? `, ${Math.round(km * 1000)} m away` : `, ${km.toFixed(1)} km away`
  return `${other.number ?? ''} ${other.complaint.words}, ${machineWords}${far}`
}
