'use client'

import { useMay } from '@/components/checks/use-may'
import { useBook } from '@/components/store/use-book'
import { useLog } from '@/components/store/use-log'
import { useSession } from '@/components/store/use-session'
import { Caution } from '@/components/ui/caution'
import { KeyLink } from '@/components/ui/key'
import { Row } from '@/components/ui/row'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Screen } from '@/components/ui/screen'
import { hasSymptom, living, symptomsOf } from '@/lib/diag/case'
import type { Job } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import { CodeLines } from '../codes/code-lines'
import { OfJob } from '../of-job'
import { PlaceShown } from '../place-shown'
import { jobHref } from '../route'
import { AlsoEnteredOfJob, AlsoEnteredOfMachine } from '../settings/also-entered'
import { clockTime, dayOf } from '../times'
import type { JobFacts } from '../use-job-facts'
import { askedWords, counted } from '../words'
import { BookPart } from './book-part'
import { DaylightLine } from './daylight-line'
import { NextRows } from './next-rows'
import { ReopenedNotice } from './reopened-notice'
import { StatesPart } from './states-part'

/** The JOB tab: what is wrong, who and what is where, and what comes next. */
export function JobScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{(facts) => <Open facts={facts} />}</OfJob>
}

function Open({ facts }: { facts: JobFacts }) {
  const { job, model, machine } = facts
  const mayWork = useMay('job.work')
  const mayChange = useMay('machine.add')
  const session = useSession()
  const log = useLog(job.id)
  const entries = living((log ?? []).map((line) => line.entry))
  return (
    <Screen
      title="Job"
      second={`Opened ${dayOf(job.openedAt, job.zone)} at ${clockTime(job.openedAt, job.zone)}.`}
    >
      <ReopenedNotice jobId={job.id} />
      <Complaint job={job} entries={entries} />
      <AlsoEnteredOfJob job={job} mayUse={mayWork} />
      <StatesPart job={job} />
      <section className="grid gap-1">
        <RuleEdge>Next</RuleEdge>
        <NextRows
          jobId={job.id}
          entries={entries}
          roles={session.kind === 'ready' ? session.actor.roles : []}
        />
      </section>
      <section className="grid gap-2">
        <RuleEdge>Codes taken down</RuleEdge>
        <CodeLines entries={entries} empty="None yet." features={facts.features} />
      </section>
      <section className="grid gap-2">
        <RuleEdge>Place</RuleEdge>
        {job.place === null ? (
          <p className="font-bold">No position yet.</p>
        ) : (
          <>
            <PlaceShown place={job.place} />
            {job.place.words ? <p>{job.place.words}</p> : null}
            <DaylightLine place={job.place} zone={job.zone} />
          </>
        )}
        {mayWork ? (
          <KeyLink small quiet href={jobHref(job.id, 'place')}>
            {job.place === null ? 'Take or type the position' : 'Better position'}
          </KeyLink>
        ) : null}
        <Air job={job} />
      </section>
      <section className="grid gap-1">
        <RuleEdge>Machine</RuleEdge>
        <Row
          title={facts.machineName}
          second={
            model?.specSheet
              ? `Spec sheet: ${counted(model.specSheet.components.length, 'component')}`
              : 'No spec sheet on this phone'
          }
          href={jobHref(job.id, 'sheet')}
        />
        {machine === null ? null : (
          <AlsoEnteredOfMachine machine={machine} zone={job.zone} mayUse={mayChange} />
        )}
      </section>
      <BookPart job={job} />
      <PutRight facts={facts} entries={entries} mayWork={mayWork} mayChange={mayChange} />
      <Caution signal="NOTICE">
        The maker’s manual, local rules and licensed practice come before anything shown here.
        Chances are the model’s own. You decide.
      </Caution>
      <KeyLink small quiet href="/field">
        All jobs on this phone
      </KeyLink>
    </Screen>
  )
}

type PutRightProps = { facts: JobFacts; entries: LogEntry[]; mayWork: boolean; mayChange: boolean }

/** What was taken down once and may be said better later. */
function PutRight({ facts: { job, machine }, entries, mayWork, mayChange }: PutRightProps) {
  if (!mayWork) return null
  const known = hasSymptom({ job, entries })
  const hours = machine?.hours === null ? 'Hours not known' : `${machine?.hours} h`
  return (
    <section className="grid gap-1">
      <RuleEdge>Put right</RuleEdge>
      <ul>
        <li>
          <Row title="The rider’s words" href={jobHref(job.id, 'complaint')} />
        </li>
        <li>
          <Row
            title={known ? 'One more symptom' : 'What it does'}
            href={jobHref(job.id, 'symptom')}
          />
        </li>
        <li>
          <Row title="Air and weather" href={jobHref(job.id, 'air')} />
        </li>
        {machine !== null && mayChange ? (
          <li>
            <Row title="Hours, numbers and year" second={hours} href={jobHref(job.id, 'machine')} />
          </li>
        ) : null}
      </ul>
    </section>
  )
}

function Air({ job }: { job: Job }) {
  if (job.airTempC === null && job.weather === null) return null
  return (
    <p className="text-second text-ink2">
      {job.airTempC === null ? '' : `Air ${String(job.airTempC).replace('-', '−')} °C. `}
      {job.weather ?? ''}
    </p>
  )
}

function Complaint({ job, entries }: { job: Job; entries: readonly LogEntry[] }) {
  const { index } = useBook()
  const symptoms = symptomsOf({ job, entries }).map((id) => index?.symptoms.get(id)?.name ?? null)
  return (
    <section className="grid gap-1">
      <p className="text-row font-bold">“{job.complaint.words}”</p>
      {symptoms.map((name) =>
        name === null || name === job.complaint.words ? null : <p key={name}>{name}.</p>,
      )}
      <p className="text-second text-ink2">{askedWords(job)}</p>
    </section>
  )
}
