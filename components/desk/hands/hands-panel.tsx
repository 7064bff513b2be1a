'use client'

import { useId, useState } from 'react'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { DeskJob } from '@/lib/model/desk'
import type { Person } from '@/lib/model/person'
import { canTakeJobs } from '@/lib/shop/desk-moves'
import { may } from '@/lib/shop/permissions'
import { rolesInWords } from '@/lib/shop/role-words'
import { JOB_STATE_WORDS } from '../../field/words'
import type { AssignAction } from '../desk-actions'
import { useDesk } from '../desk-context'
import { useActing } from '../use-acting'

type Props = { found: DeskJob; assign: AssignAction }

const nameOf = (person: Person | undefined) => person?.name ?? 'Name erased'

/** In whose hands the job is, and the keys to change it for those who may. */
export function HandsPanel({ found, assign }: Props) {
  const { actor } = useDesk()
  const { job, people } = found
  const { busy, refusal, act } = useActing()
  const mayAssign = may(actor.roles, 'job.assign') && job.state !== 'closed'
  const press = (personId: string, assigned: boolean) => {
    const who = nameOf(people.find(({ id }) => id === personId))
    return act(
      () => assign({ jobId: job.id, personId, assigned }),
      assigned ? `${who} has the job.` : `${who} has the job no more.`,
    )
  }
  const free = people
    .filter((person) => canTakeJobs(person) && !job.assignedTo.includes(person.id))
    .sort((a, b) => Number(b.roles.includes('mechanic')) - Number(a.roles.includes('mechanic')))
  return (
    <section className="mt-7">
      <RuleEdge end={JOB_STATE_WORDS[job.state]}>In whose hands</RuleEdge>
      <ul>
        {job.assignedTo.length === 0 ? (
          <li className="desk-row text-body">Nobody’s yet: every mechanic sees it.</li>
        ) : null}
        {job.assignedTo.map((personId) => (
          <li key={personId} className="desk-row">
            <span className="min-w-0 flex-1 text-body font-bold">
              {nameOf(people.find(({ id }) => id === personId))}
            </span>
            {mayAssign ? (
              <Key
                small={true}
                quiet={true}
                className="desk-key"
                disabled={busy}
                onClick={() => void press(personId, false)}
              >
                Take off
              </Key>
            ) : null}
          </li>
        ))}
      </ul>
      {mayAssign ? (
        <AssignForm free={free} busy={busy} onAssign={(personId) => press(personId, true)} />
      ) : null}
      {refusal ? <p className="mt-2 font-bold text-nogo">{refusal}</p> : null}
    </section>
  )
}

type FormProps = { free: Person[]; busy: boolean; onAssign: (personId: string) => Promise<boolean> }

function AssignForm({ free, busy, onAssign }: FormProps) {
  const id = useId()
  const [personId, setPersonId] = useState('')
  const chosen = free.some((person) => person.id === personId) ? personId : (free[0]?.id ?? '')
  if (free.length === 0) return <p className="mt-2 text-second text-ink2">Everybody has it.</p>
  return (
    <form
      className="mt-3 grid gap-2"
      onSubmit={(event) => {
        event.preventDefault()
        void onAssign(chosen)
      }}
    >
      <label htmlFor={id} className="text-second font-bold">
        Give it to
      </label>
      <select
        id={id}
        className="field-box"
        value={chosen}
        onChange={(event) => setPersonId(event.target.value)}
      >
        {free.map((person) => (
          <option key={person.id} value={person.id}>
            {nameOf(person)}, {rolesInWords(person.roles)}
          </option>
        ))}
      </select>
      <Key type="submit" kind="plate" disabled={busy}>
        Assign
      </Key>
    </form>
  )
}
