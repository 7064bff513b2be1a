'use client'

import { useState } from 'react'
import { useMay } from '@/components/checks/use-may'
import { classes } from '@/components/ui/class-names'
import { Key } from '@/components/ui/key'
import type { Job } from '@/lib/model/job'
import { counted, JOB_STATE_WORDS, MACHINE_WORDS, PEOPLE_WORDS } from '../words'
import { StateMover } from './state-mover'
import type { Which } from './state-moves'

/** People and machine side by side (rule R2), the job's own state under them; each can be changed. */
export function StatesPart({ job }: { job: Job }) {
  const [open, setOpen] = useState<Which | null>(null)
  const works = useMay('job.work')
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
        <StateMover key={open} which={open} job={job} onDone={() => setOpen(null)} />
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
