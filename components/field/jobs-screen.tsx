'use client'

import { useMemo } from 'react'
import { useMay } from '@/components/checks/use-may'
import { useBook } from '@/components/store/use-book'
import { useDraft } from '@/components/store/use-draft'
import { useJobs, useMachines, useModels, useShop } from '@/components/store/use-rows'
import { useSession } from '@/components/store/use-session'
import { useUnsent } from '@/components/store/use-unsent'
import { JobTag } from '@/components/ui/job-tag'
import { KeyLink } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Screen } from '@/components/ui/screen'
import type { Job } from '@/lib/model/job'
import { isOwn } from '@/lib/shop/scope'
import { FirstOpen } from './first-open'
import { EMPTY_INTAKE, INTAKE_KEY } from './intake/intake-draft'
import { jobHref } from './route'
import { JOB_STATE_WORDS, MACHINE_WORDS, machineName, PEOPLE_WORDS } from './words'

/** The jobs this phone holds, strung on a wire: one's own and the open ones. */
export function JobsScreen() {
  const session = useSession()
  const jobs = useJobs()
  const shop = useShop()
  const me = session.kind === 'ready' ? session.actor : null
  const lists = useMemo(() => split(jobs ?? [], me?.personId ?? null), [jobs, me?.personId])
  const draft = useDraft(INTAKE_KEY, EMPTY_INTAKE)
  const opens = useMay('job.open')
  return (
    <Screen
      title="Jobs"
      second={shop?.name}
      foot={
        opens ? (
          <KeyLink kind="main" href="/field/new">
            {draft.value === EMPTY_INTAKE ? 'New job' : 'Go on with new job'}
          </KeyLink>
        ) : null
      }
    >
      <FirstOpen />
      {jobs?.length === 0 ? <NoJobs opens={opens} /> : null}
      <Wire title="Yours" jobs={lists.own} />
      <Wire title="Open" jobs={lists.open} />
      <Wire title="Closed" jobs={lists.closed} />
      <BookLine />
    </Screen>
  )
}

/** Own means opened by or assigned to the person, also through a merged job; closed ones last, newest first in each. */
function split(jobs: readonly Job[], personId: string | null) {
  const own = (job: Job) => personId !== null && isOwn(personId, job)
  const live = jobs.filter((job) => job.state !== 'closed')
  return {
    own: live.filter(own),
    open: live.filter((job) => !own(job)),
    closed: jobs.filter((job) => job.state === 'closed'),
  }
}

function Wire({ title, jobs }: { title: string; jobs: readonly Job[] }) {
  const machines = useMachines()
  const models = useModels()
  if (jobs.length === 0) {
    return null
  }
  return (
    <section className="grid gap-2">
      <RuleEdge end={String(jobs.length)}>{title}</RuleEdge>
      <ul className="job-wire grid gap-4 pt-1">
        {jobs.map((job) => (
          <li key={job.id}>
            <JobTag
              complaint={job.complaint.words}
              number={job.number}
              machine={machineName(
                machines?.find((m) => m.id === job.machineId),
                models,
              )}
              href={jobHref(job.id)}
            />
            <p className="pt-1 pl-5 text-second text-ink2">
              <b className="text-ink">{JOB_STATE_WORDS[job.state]}</b>. People:{' '}
              {PEOPLE_WORDS[job.peopleState].toLowerCase()}. Machine:{' '}
              {MACHINE_WORDS[job.machineState].toLowerCase()}.
            </p>
          </li>
        ))}
      </ul>
    </section>
  )
}

function NoJobs({ opens }: { opens: boolean }) {
  return (
    <div className="grid gap-2 border-2 border-dashed border-rule p-4">
      <p className="text-row font-bold">No job on this phone.</p>
      <p>
        {opens
          ? 'Press NEW JOB when a machine is stranded. It works without signal and goes to the shop by itself later.'
          : 'Open jobs of the shop show here after the next contact.'}
      </p>
    </div>
  )
}

function unsentWords({ counted, count }: { counted: boolean; count: number }): string {
  if (!counted) {
    return 'Counting what is not sent.'
  }
  return count === 0 ? 'Nothing unsent.' : `${count} not sent.`
}

function BookLine() {
  const book = useBook()
  const unsent = useUnsent()
  return (
    <section className="grid gap-2">
      <RuleEdge>This phone</RuleEdge>
      <p className="text-second text-ink2">
        {book.version === null ? 'No code book yet.' : `Code book version ${book.version}.`}{' '}
        {unsentWords(unsent)}
      </p>
      <KeyLink small quiet href="/field/about">
        What this phone holds
      </KeyLink>
    </section>
  )
}
