'use client'
import { useState } from 'react'
import type { BookIndex } from '@/lib/diag/book-index'
import type { Plan } from '@/lib/diag/plan'
import type { Id } from '@/lib/model/id'
import type { LogEntry } from '@/lib/model/log-entry'
import { useCase } from '../engine/use-case'
import { type PlanView, usePlan } from '../engine/use-plan'
import { type Answer, outlookKey } from '../engine/work'
import { useBook } from '../store/use-book'
import { useShop } from '../store/use-rows'
import { SuspectRows } from '../suspects/suspect-rows'
import { Key, KeyLink } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { AssumesPanel } from './assumes-panel'
import { BookGate } from './book-gate'
import { NextPlate } from './next-plate'
import { OtherChecks } from './other-checks'
import { RunnerUp } from './runner-up'
import { useActOn } from './use-act-on'
import { useFirstSaid } from './use-first-said'
import { WhyView } from './why-view'
import { entryWords } from './words'

/** CHECKS: what to do next and why, and every suspect with its chance (rules R5, R23). */
export function ChecksScreen({ jobId }: { jobId: Id }) {
  const { index } = useBook()
  const found = useCase(jobId)
  const plan = usePlan(jobId)
  const symptom =
    found !== null &&
    (found.job.complaint.symptom !== null || found.entries.some((e) => e.body.kind === 'symptom'))
  return (
    <BookGate>
      {found !== null && !symptom ? (
        <NoSymptom jobId={jobId} />
      ) : index === null || plan.answer?.plan == null ? (
        <Waiting view={plan} />
      ) : (
        <Ready
          jobId={jobId}
          index={index}
          view={plan}
          answer={plan.answer}
          plan={plan.answer.plan}
          entries={found?.entries ?? []}
        />
      )}
    </BookGate>
  )
}

function NoSymptom({ jobId }: { jobId: Id }) {
  return (
    <Screen
      title="No symptom yet"
      foot={
        <KeyLink kind="main" href={`/field/jobs/${jobId}`}>
          To the job
        </KeyLink>
      }
    >
      <p>
        The suspects start from what the machine does. Choose the symptom on the job, then come back
        here.
      </p>
    </Screen>
  )
}

function Waiting({ view }: { view: PlanView }) {
  return (
    <Screen title="Checks">
      {view.failed ? (
        <p role="alert">
          The sums could not be done for this job. Nothing recorded is lost, and notes, readings and
          the way out can still be recorded.
        </p>
      ) : (
        <p role="status">Working out the suspects.</p>
      )}
    </Screen>
  )
}

type ReadyProps = {
  jobId: Id
  index: BookIndex
  view: PlanView
  answer: Answer
  plan: Plan
  entries: readonly LogEntry[]
}

function Ready({ jobId, index, view, answer, plan, entries }: ReadyProps) {
  const [open, setOpen] = useState<string | null>(null)
  const shop = useShop()
  const actOn = useActOn(jobId, view)
  const { next } = plan
  const outlook =
    next.type === 'check' || next.type === 'swap'
      ? (answer.outlooks[outlookKey({ kind: next.type, id: next.id })] ?? [])
      : []
  useFirstSaid(jobId, answer.belief.suspects)
  const currency = shop?.currency ?? ''
  return (
    <Screen
      title="Checks"
      titleHidden
      foot={
        <Key kind="main" onClick={() => actOn(next, null)}>
          {START[next.type]}
        </Key>
      }
    >
      <NextPlate plan={plan} index={index} />
      <section aria-labelledby="suspects" className="grid gap-2">
        <RuleEdge id="suspects">Suspects, of 100</RuleEdge>
        <p className="text-second text-ink2">
          more than one can be true{view.working ? ' · working out the newest entry' : ''}
        </p>
        <Notices notices={answer.belief.notices} />
        <SuspectRows
          suspects={answer.belief.suspects}
          outlook={outlook}
          open={open}
          onOpen={setOpen}
          entryWords={(id) => wordsOf(id, entries, index)}
          why={(suspect) => <WhyView suspect={suspect} entries={entries} index={index} />}
        />
      </section>
      <RunnerUp plan={plan} currency={currency} index={index} actOn={actOn} />
      <OtherChecks plan={plan} currency={currency} index={index} actOn={actOn} />
      <AssumesPanel jobId={jobId} view={view.means} shop={shop} bookVersion={index.version} />
    </Screen>
  )
}

const START = {
  check: 'Start this check',
  swap: 'Start this swap',
  repair: 'Do this repair',
  stop: 'Choose a way out',
} as const

function Notices({ notices }: { notices: Answer['belief']['notices'] }) {
  if (notices.length === 0) return null
  return (
    <ul className="grid gap-1 border-l-4 border-ink pl-3 font-bold">
      {notices.includes('moreThanOneLikely') && (
        <li>More than one fault is likely. The plan looks one step ahead only.</li>
      )}
      {notices.includes('maybeNotInList') && (
        <li>The fault may not be in this list. The plan looks one step ahead only.</li>
      )}
    </ul>
  )
}

function wordsOf(id: Id, entries: readonly LogEntry[], index: BookIndex): string {
  const entry = entries.find((one) => one.id === id)
  return entry === undefined ? 'an earlier entry' : entryWords(entry, index)
}
