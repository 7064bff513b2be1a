'use client'

import { useState } from 'react'
import { useRecord } from '@/components/store/use-record'
import { useSession } from '@/components/store/use-session'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Choice } from '@/components/ui/choice'
import { classes } from '@/components/ui/class-names'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import type { Job, JobMachineState, JobState, PeopleState } from '@/lib/model/job'
import type { LogBody } from '@/lib/model/log-entry'
import { actionToMoveJob, movesFrom } from '@/lib/shop/job-states'
import { may } from '@/lib/shop/permissions'
import type { OpInput } from '@/lib/sync/protocol/op'
import { counted, JOB_STATE_WORDS, MACHINE_WORDS, PEOPLE_WORDS } from '../words'

type Which = 'people' | 'machine' | 'job'

/** People and machine side by side (rule R2), the job's own state under them; each can be changed. */
export function StatesPart({ job }: { job: Job }) {
  const session = useSession()
  const [open, setOpen] = useState<Which | null>(null)
  const works = session.kind === 'ready' && may(session.actor.roles, 'job.work')
  const state = (which: Which, title: string, word: string, second: string) => (
    <State
      title={title}
      wide={which === 'job'}
      word={word}
      second={second}
      open={open === which}
      onChange={works ? () => setOpen(open === which ? null : which) : null}
    />
  )
  return (
    <section className="grid gap-2" aria-label="People, machine and job">
      <div className="grid grid-cols-1 gap-x-2 gap-y-2 roomy:grid-cols-2">
        {state('people', 'People', PEOPLE_WORDS[job.peopleState], peopleLine(job))}
        {state('machine', 'Machine', MACHINE_WORDS[job.machineState], '')}
      </div>
      {state('job', 'Job', JOB_STATE_WORDS[job.state], '')}
      {open === null ? null : (
        <Mover key={open} which={open} job={job} onDone={() => setOpen(null)} />
      )}
    </section>
  )
}

function peopleLine({ people }: Job): string {
  const dangers = [
    people.hurt ? 'hurt' : '',
    people.missing ? 'missing' : '',
    people.exposed ? 'exposed' : '',
  ].filter(Boolean)
  const count = counted(people.count, 'person', 'people')
  return dangers.length === 0 ? count : `${count}, ${dangers.join(', ')}`
}

function State(props: {
  title: string
  word: string
  second: string
  open: boolean
  wide?: boolean
  onChange: (() => void) | null
}) {
  return (
    <div
      className={classes(
        'flex gap-2 border-2 border-ink p-3',
        props.wide ? 'flex-wrap items-center' : 'flex-col',
      )}
    >
      <div className="flex-1">
        <p className="text-second text-ink2">{props.title}</p>
        <p className="caps text-section">{props.word}</p>
        {props.second ? <p className="text-second">{props.second}</p> : null}
      </div>
      {props.onChange === null ? null : (
        <Key
          small
          quiet
          aria-expanded={props.open}
          aria-label={`${props.open ? 'Leave it' : 'Change'}: ${props.title.toLowerCase()}`}
          onClick={props.onChange}
        >
          {props.open ? 'Leave it' : 'Change'}
        </Key>
      )}
    </div>
  )
}

/** The states that may follow; the chosen one is recorded with a word on why. */
function Mover({ which, job, onDone }: { which: Which; job: Job; onDone: () => void }) {
  const record = useRecord()
  const stamp = useStamp()
  const session = useSession()
  const [to, setTo] = useState<string | null>(null)
  const [why, setWhy] = useState('')
  const [problem, setProblem] = useState<string | null>(null)
  const roles = session.kind === 'ready' ? session.actor.roles : []
  const options = optionsOf(which, job).filter(
    (o) => which !== 'job' || may(roles, actionToMoveJob(o.value as JobState)),
  )
  const save = () => {
    if (to === null) {
      setProblem('Pick the new state first.')
      return
    }
    const words = why.trim() === '' ? null : why.trim()
    const line = lineOf(which, to, words)
    const ops = opsOf(which, job, to, words)
    record(line === null ? ops : [...ops, stamp.entry(job.id, line)])
      .then(() => {
        announce('Saved on this phone.')
        onDone()
      })
      .catch(() => setProblem('Could not be saved. Try again.'))
  }
  return (
    <div className="grid gap-3 border-b-2 border-ink pb-4">
      <Choice
        legend={
          {
            people: 'Where are the people now?',
            machine: 'What about the machine now?',
            job: 'The job is now',
          }[which]
        }
        value={to}
        onChange={setTo}
        options={options}
        error={problem}
      />
      <Field
        label="Why, in a few words"
        value={why}
        onChange={setWhy}
        maxLength={500}
        autoCapitalize="sentences"
      />
      <Key kind="plate" onClick={save}>
        Save
      </Key>
    </div>
  )
}

function optionsOf(which: Which, job: Job): { value: string; label: string }[] {
  switch (which) {
    case 'people':
      return movesFrom('people', job.peopleState).map((s) => ({ value: s, label: PEOPLE_WORDS[s] }))
    case 'machine':
      return movesFrom('machine', job.machineState).map((s) => ({
        value: s,
        label: MACHINE_WORDS[s],
      }))
    case 'job':
      // Closing asks for cause and grade and is the desk's work.
      return movesFrom('job', job.state)
        .filter((s) => s !== 'closed')
        .map((s) => ({ value: s, label: JOB_STATE_WORDS[s] }))
  }
}

function opsOf(which: Which, job: Job, to: string, reason: string | null): OpInput[] {
  const jobId = job.id
  switch (which) {
    case 'people':
      return [
        { kind: 'job.people', jobId, fields: { from: job.peopleState, to: to as PeopleState } },
      ]
    case 'machine':
      return [
        {
          kind: 'job.machine',
          jobId,
          fields: { from: job.machineState, to: to as JobMachineState },
        },
      ]
    case 'job':
      return [{ kind: 'job.move', jobId, fields: { from: job.state, to: to as JobState, reason } }]
  }
}

/** What the job log says of the move; the job's own moves carry their reason themselves. */
function lineOf(which: Which, to: string, words: string | null): LogBody | null {
  switch (which) {
    case 'people':
      return { kind: 'people', to: to as PeopleState, words }
    case 'machine': {
      const state = MACHINE_WORDS[to as JobMachineState].toLowerCase()
      return { kind: 'note', words: `Machine: ${state}.${words === null ? '' : ` ${words}`}` }
    }
    case 'job':
      return null
  }
}
