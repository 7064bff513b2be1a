'use client'
import { useState } from 'react'
import { bookForJob } from '@/lib/diag/book-for-job'
import type { BookIndex } from '@/lib/diag/book-index'
import { living, symptomsOf } from '@/lib/diag/case'
import { knownSymptoms, looksLeft, opensWayOut } from '@/lib/diag/first-look'
import type { Outcome } from '@/lib/diag/outlook'
import type { Plan } from '@/lib/diag/plan'
import type { SymptomItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { LogEntry } from '@/lib/model/log-entry'
import { decidesWords, nextOutlook } from '../engine/decides'
import { useBelief } from '../engine/use-belief'
import { type JobCase, useCase } from '../engine/use-case'
import { type PlanView, usePlan } from '../engine/use-plan'
import type { Answer } from '../engine/work'
import { entryMention } from '../log/entry-words'
import { proofSentence } from '../outcome/proof-words'
import { useBook } from '../store/use-book'
import { useJobZone } from '../store/use-job-zone'
import { useShop } from '../store/use-rows'
import { behindWords } from '../suspects/book-words'
import { NOTICE_WORDS } from '../suspects/notice-words'
import { SuspectRows } from '../suspects/suspect-rows'
import { Key } from '../ui/key'
import { Plate } from '../ui/plate'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { AssumesPanel } from './assumes-panel'
import { BookGate } from './book-gate'
import { FirstLook } from './first-look'
import { NextPlate } from './next-plate'
import { Cautions, NoFault, NoSymptom, ToWayOut, Waiting } from './no-checks'
import { OtherChecks } from './other-checks'
import type { AdviceState } from './pick-instead'
import { RunnerUp } from './runner-up'
import { useActOn } from './use-act-on'
import { useFirstSaid } from './use-first-said'
import { WhyView } from './why-view'

/** CHECKS: what to do next and why, and every suspect with its chance (rules R5, R23). */
export function ChecksScreen({ jobId }: { jobId: Id }) {
  const { index } = useBook()
  const found = useCase(jobId)
  // Asked before the plan: the suspects are there at once, the plan may take its time.
  const suspects = useBelief(jobId)
  const plan = usePlan(jobId)
  const ids = found === null ? null : symptomsOf(found)
  const symptoms = index === null || ids === null ? [] : knownSymptoms(index, ids)
  return (
    <BookGate>
      {ids?.length === 0 ? (
        <NoSymptom jobId={jobId} />
      ) : opensWayOut(symptoms) ? (
        <NoFault jobId={jobId} symptoms={symptoms} />
      ) : index === null || found === null || suspects.answer === null ? (
        <Waiting failed={suspects.failed} />
      ) : (
        <Ready
          jobId={jobId}
          index={index}
          view={plan}
          belief={suspects.answer.belief}
          state={stateOf(suspects)}
          found={found}
          symptoms={symptoms}
        />
      )}
    </BookGate>
  )
}

type ReadyProps = {
  jobId: Id
  index: BookIndex
  view: PlanView
  belief: Answer['belief']
  /** Whether the newest entry is in these suspects. */
  state: AdviceState
  found: JobCase
  symptoms: readonly SymptomItem[]
}

const stateOf = (view: Pick<PlanView, 'working' | 'failed'>): AdviceState =>
  view.working ? 'working' : view.failed ? 'failed' : 'ready'

function Ready({ jobId, index, view, belief, state, found, symptoms }: ReadyProps) {
  const { entries, input } = found
  const shop = useShop()
  const actOn = useActOn(jobId, view)
  const plan = view.answer?.plan ?? null
  const currency = shop?.currency ?? ''
  const run = cleanRun(entries)
  const steps = { jobId, currency, index, actOn, advice: stateOf(view) }
  const looks = looksLeft(index, { symptoms, features: input.features, entries })
  useFirstSaid(jobId, belief.suspects)
  return (
    <Screen
      title="Checks"
      titleHidden
      foot={
        <StartKey
          jobId={jobId}
          plan={plan}
          view={view}
          run={run}
          onPress={(next) => actOn(next, null)}
        />
      }
    >
      <Cautions symptoms={symptoms} />
      {plan === null || view.failed ? (
        <NoPlanYet failed={view.failed} older={plan !== null} />
      ) : (
        <Top plan={plan} answer={view.answer} index={index} run={run} />
      )}
      <FirstLook jobId={jobId} looks={looks} />
      <Suspects
        jobId={jobId}
        index={index}
        belief={belief}
        outlook={view.working || view.failed ? [] : nextOutlook(view.answer)}
        entries={entries}
        state={state}
      />
      {plan !== null && (
        <>
          <RunnerUp plan={plan} {...steps} />
          <OtherChecks plan={plan} {...steps} />
        </>
      )}
      <AssumesPanel jobId={jobId} view={view.means} shop={shop} bookVersion={index.version} />
    </Screen>
  )
}

function NoPlanYet({ failed, older }: { failed: boolean; older: boolean }) {
  return (
    <p role="status" className="border-2 border-ink p-4">
      {failed ? FAILED[older ? 'older' : 'none'] : 'Working out the next best check.'}
    </p>
  )
}
const FAILED = {
  none: 'The next step could not be worked out. The way out is open all the same.',
  older:
    'The next step could not be worked out with the newest entry in it. The steps below are from before it.',
}

/** The clean proof run of the last fix; null while there is none. */
function cleanRun(entries: readonly LogEntry[]) {
  const kept = living(entries)
  const fix = kept.findLastIndex(({ body }) => body.kind === 'fix')
  const run = kept.findLast(({ body }, i) => i > fix && body.kind === 'proofRun')
  return fix >= 0 && run?.body.kind === 'proofRun' && run.body.faults === 0 ? run.body : null
}
type CleanRun = ReturnType<typeof cleanRun>

type TopProps = { plan: Plan; answer: Answer | null; index: BookIndex; run: CleanRun }

/** The plate of the next step; once the fix has its clean proof run, what that proves. */
function Top({ plan, answer, index, run }: TopProps) {
  if (plan.stage === 'prove' && run !== null)
    return (
      <Plate>
        <p className="text-second text-scribe2">Fixed, and run without the fault</p>
        <p className="mt-1 text-row font-bold">{proofSentence(run)}</p>
      </Plate>
    )
  const decides = answer === null ? plan.decides : decidesWords(answer, plan)
  return <NextPlate plan={plan} decides={decides} index={index} />
}

type StartProps = {
  jobId: Id
  plan: Plan | null
  view: PlanView
  run: CleanRun
  onPress: (next: Plan['next']) => void
}

/** The main key; locked while a newer entry is being worked in, so that no old advice is followed. */
function StartKey({ jobId, plan, view, run, onPress }: StartProps) {
  if (view.failed) return <ToWayOut jobId={jobId} />
  if (plan === null) return null
  if (plan.stage === 'prove' && run !== null) return <ToWayOut jobId={jobId} />
  const words = plan.stage === 'prove' ? 'Start the proof run' : START[plan.next.type]
  return (
    <Key kind="main" disabled={view.working} onClick={() => onPress(plan.next)}>
      {view.working ? 'Working it out' : words}
    </Key>
  )
}

const START = {
  check: 'Start this check',
  swap: 'Start this swap',
  repair: 'Do this repair',
  stop: 'Choose a way out',
} as const

type SuspectsProps = {
  jobId: Id
  index: BookIndex
  belief: Answer['belief']
  outlook: readonly Outcome[]
  entries: readonly LogEntry[]
  state: AdviceState
}

function Suspects({ jobId, index, belief, outlook, entries, state }: SuspectsProps) {
  const zone = useJobZone(jobId)
  const [open, setOpen] = useState<string | null>(null)
  return (
    <section aria-labelledby="suspects" className="grid gap-2">
      <RuleEdge id="suspects">Suspects, of 100</RuleEdge>
      <p className="text-second text-ink2">
        more than one can be true{state === 'working' ? ' · working in the newest entry' : ''}
      </p>
      {state === 'failed' && (
        <p role="alert" className="border-2 border-nogo p-3 font-bold">
          The newest entry is not counted: the sums could not be done with it in. It is kept in the
          log.
        </p>
      )}
      <Behind index={index} entries={entries} />
      <Notices notices={belief.notices} />
      <SuspectRows
        suspects={belief.suspects}
        outlook={outlook}
        open={open}
        onOpen={setOpen}
        entryWords={(id) => wordsOf(id, entries, index)}
        why={(suspect) => <WhyView suspect={suspect} entries={entries} index={index} zone={zone} />}
      />
    </section>
  )
}

function Behind({ index, entries }: Pick<SuspectsProps, 'index' | 'entries'>) {
  const { newerSeen } = bookForJob([index.version], entries)
  return newerSeen === null ? null : (
    <p className="font-bold">{behindWords(index.version, newerSeen)}</p>
  )
}

function Notices({ notices }: { notices: Answer['belief']['notices'] }) {
  if (notices.length === 0) return null
  return (
    <ul className="grid gap-1 border-l-4 border-ink pl-3 font-bold">
      {notices.map((notice) => (
        <li key={notice}>{NOTICE_WORDS[notice]} The plan looks one step ahead only.</li>
      ))}
    </ul>
  )
}

function wordsOf(id: Id, entries: readonly LogEntry[], index: BookIndex): string {
  const entry = entries.find((one) => one.id === id)
  return entry === undefined ? 'an earlier entry' : entryMention(entry.body, index)
}
