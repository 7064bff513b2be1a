'use client'

import { useEffect, useRef, useState } from 'react'
import { NotYours, useMayLog } from '@/components/checks/use-may'
import { useDraft } from '@/components/store/use-draft'
import { useLog } from '@/components/store/use-log'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Screen } from '@/components/ui/screen'
import { Steps } from '@/components/ui/steps'
import { living } from '@/lib/diag/case'
import type { LogEntry } from '@/lib/model/log-entry'
import type { SpecSheet } from '@/lib/model/machine-model'
import { OfJob } from '../of-job'
import { jobHref } from '../route'
import { useRoute } from '../router'
import type { JobFacts } from '../use-job-facts'
import { ClearedPart } from './cleared-part'
import { type CodeDraft, codeKey, EMPTY_CODE } from './code-draft'
import { CodeForm } from './code-form'
import { CodeMeaning } from './code-meaning'

/** Codes: how to show them, what the dash showed, what that means, and clearing them. */
export function CodesScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{(facts) => <Codes facts={facts} />}</OfJob>
}

type CodeEntry = LogEntry & { body: Extract<LogEntry['body'], { kind: 'code' }> }
const isCode = (entry: LogEntry): entry is CodeEntry => entry.body.kind === 'code'

function Codes({ facts }: { facts: JobFacts }) {
  const { job, model, features } = facts
  const log = useLog(job.id)
  const { go, search } = useRoute()
  const entries = living((log ?? []).map((line) => line.entry))
  const codes = entries.filter(isCode)
  // How often the form was asked for; 0 when it is not wanted.
  const [adding, setAdding] = useState<number>(search.has('more') ? 1 : 0)
  const [fresh, setFresh] = useState<string | null>(null)
  const unreadable = entries.findLast((e) => e.body.kind === 'codesUnreadable')?.body
  const draft = useDraft<CodeDraft>(codeKey(job.id), EMPTY_CODE)
  const mine = useMayLog('code')
  const writing = mine && (adding > 0 || codes.length === 0 || draft.value !== EMPTY_CODE)
  const takeDown = () => setAdding((times) => times + 1)
  useFocusOnMeaning(fresh, codes, () => setFresh(null))
  return (
    <Screen
      title="Codes"
      second="Take them down before anything is cleared or the battery comes off."
      foot={
        writing ? null : (
          <div className="grid grid-cols-1 gap-2 slim:grid-cols-2">
            {mine ? <Key onClick={takeDown}>One more</Key> : null}
            <Key kind="plate" onClick={() => go(jobHref(job.id, 'checks'))}>
              To checks
            </Key>
          </div>
        )
      }
    >
      <ShowSteps sheet={model?.specSheet ?? null} folded={codes.length > 0} />
      {unreadable?.kind === 'codesUnreadable' ? (
        <p className="font-bold">Could not be read: {unreadable.reason}</p>
      ) : null}
      {codes.map((code) => (
        <div key={code.id} id={`code-${code.id}`}>
          <CodeMeaning seen={code.body.seen} context={code.body.context} features={features} />
        </div>
      ))}
      {mine ? null : <NotYours what="Taking codes down" />}
      {writing && log !== undefined ? (
        <OneCode
          jobId={job.id}
          order={codes.length + 1}
          asked={adding}
          onSaved={(id) => {
            setAdding(0)
            setFresh(id)
          }}
          onLeave={() => {
            setAdding(0)
            draft.clear().catch(() => announce('Could not be thrown away.', 'assertive'))
          }}
        />
      ) : null}
      <ClearedPart
        jobId={job.id}
        entries={entries}
        sheet={model?.specSheet ?? null}
        {...(mine ? { onTakeDown: takeDown } : {})}
      />
    </Screen>
  )
}

/** After a save the focus goes to the meaning of what was just taken down. */
function useFocusOnMeaning(fresh: string | null, codes: readonly CodeEntry[], done: () => void) {
  useEffect(() => {
    if (fresh !== null && codes.some((code) => code.id === fresh)) {
      document
        .getElementById(`code-${fresh}`)
        ?.querySelector<HTMLElement>('[data-meaning]')
        ?.focus()
      done()
    }
  }, [fresh, codes, done])
}

type OneProps = {
  jobId: string
  order: number
  /** How often it was asked for: each time the form takes the focus. */
  asked: number
  onSaved: (entryId: string) => void
  onLeave: () => void
}

/** The form for one code; after the first it can be left again. */
function OneCode({ jobId, order, asked, onSaved, onLeave }: OneProps) {
  const form = useRef<HTMLElement>(null)
  useEffect(() => {
    if (asked > 0) form.current?.querySelector('input')?.focus()
  }, [asked])
  return (
    <section ref={form} className="grid gap-4">
      <RuleEdge>{order === 1 ? 'Take it down' : `Code ${order}`}</RuleEdge>
      <CodeForm jobId={jobId} order={order} onSaved={onSaved} />
      {order > 1 ? (
        <Key small quiet onClick={onLeave}>
          No more codes
        </Key>
      ) : null}
    </section>
  )
}

function ShowSteps({ sheet, folded }: { sheet: SpecSheet | null; folded: boolean }) {
  if (sheet === null) {
    return (
      <p>
        No spec sheet for this machine: the maker’s manual says how its dash shows codes. Often it
        is a long press with the key on. Common practice, no source.
      </p>
    )
  }
  const steps = (
    <>
      <Steps steps={sheet.showCodes.steps.map((text) => ({ text }))} />
      <p className="text-second text-ink2">From: {sheet.showCodes.source}</p>
    </>
  )
  if (folded) {
    return (
      <details className="border-b-2 border-ink">
        <summary className="fold">How to show codes on this model</summary>
        <div className="grid gap-3 pb-3">{steps}</div>
      </details>
    )
  }
  return (
    <section className="grid gap-3">
      <RuleEdge>How to show them on this model</RuleEdge>
      {steps}
    </section>
  )
}
