'use client'
import { useState } from 'react'
import { living } from '@/lib/diag/case'
import { proofBound } from '@/lib/diag/proof-run'
import type { Id } from '@/lib/model/id'
import type { LogEntry } from '@/lib/model/log-entry'
import { useFocusTitle } from '../checks/saved-outcome'
import { UndoBar } from '../checks/undo-bar'
import { useJustSaved } from '../checks/use-just-saved'
import { NotYours, useMayLog } from '../checks/use-may'
import { NotSaved, useSave } from '../checks/use-save'
import { type JobCase, useCase } from '../engine/use-case'
import { ReadCodesAgain } from '../field/codes/read-codes-again'
import { useStamp } from '../store/use-stamp'
import { Caution } from '../ui/caution'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { Key, KeyLink } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { moreSentence, proofSentence, stopwatch } from './proof-words'
import {
  minutesOf,
  type ProofDraft,
  proofDraftKey,
  ranUntil,
  useProofDraft,
  useRanMs,
} from './use-proof-draft'

/** Restarts and running time, and what they prove about the fault still being there (F7). */
export function ProofScreen({ jobId }: { jobId: Id }) {
  const found = useCase(jobId)
  const { savedId, keepSaved, forget } = useJustSaved(found?.entries ?? [])
  const saved = found?.entries.find((entry) => entry.id === savedId)
  const mine = useMayLog('proofRun')
  if (found === null)
    return (
      <Screen title="Proof run">
        <p role="status">Opening the job.</p>
      </Screen>
    )
  if (saved !== undefined)
    return <SavedProof jobId={jobId} entry={saved} found={found} onUndone={forget} />
  if (!mine)
    return (
      <Screen title="Proof run">
        <NotYours what="The proof run" />
      </Screen>
    )
  return <Counting jobId={jobId} found={found} onSaved={keepSaved} />
}

type CountingProps = { jobId: Id; found: JobCase; onSaved: (entryId: Id) => void }

function Counting({ jobId, found, onSaved }: CountingProps) {
  const { value: draft, set, ready, kept } = useProofDraft(jobId)
  const ranMs = useRanMs(draft)
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const missing = whatIsMissing(draft, minutesOf(draft, ranMs))
  const keep = async () => {
    const minutes = minutesOf(draft, ranUntil(draft, Date.parse(stamp.now())))
    if (minutes === null) return
    const bound = proofBound(draft)
    const op = stamp.entry(jobId, {
      kind: 'proofRun',
      starts: draft.starts,
      faults: draft.faults,
      minutes,
      hot: draft.hot === 'hot',
      words: draft.words.trim() || null,
      boundExact: bound.exact,
      boundRuleOfThree: bound.ruleOfThree,
    })
    if (await save([op], { clearDrafts: [proofDraftKey(jobId)] })) onSaved(op.fields.id)
  }
  return (
    <Screen
      title="Proof run"
      second="Restart it the way it failed before. Count every start."
      kept={kept}
      foot={
        <Key kind="main" disabled={!ready || saving || missing !== null} onClick={keep}>
          Save the proof run
        </Key>
      }
    >
      <Before found={found} />
      <Count draft={draft} set={set} />
      <section aria-live="polite" className="border-l-4 border-ink pl-3">
        <p className="text-row font-bold">{proofSentence(draft)}</p>
        <p>{moreSentence(draft)}</p>
      </section>
      <Timer draft={draft} set={set} ranMs={ranMs} now={stamp.now} />
      <Choice
        legend="Engine"
        columns={2}
        value={draft.hot}
        onChange={(hot) => set({ ...draft, hot })}
        options={[
          { value: 'hot', label: 'Hot', hint: 'at working heat' },
          { value: 'cold', label: 'Cold' },
        ]}
      />
      <Field
        label="Load and route"
        hint="May stay empty"
        value={draft.words}
        onChange={(words) => set({ ...draft, words })}
        maxLength={500}
      />
      {missing !== null && <p className="text-second text-ink2">{missing}</p>}
      <NotSaved problem={problem} />
    </Screen>
  )
}

function whatIsMissing(draft: ProofDraft, minutes: number | null): string | null {
  if (minutes === null) return MINUTES_UNREAD
  if (draft.starts === 0 && minutes === 0) return 'Count a start or let the clock run first.'
  return draft.hot === null ? 'Say whether the engine was hot or cold.' : null
}

const MINUTES_UNREAD = 'Type the minutes as figures alone, as 12 or 12.5, up to 1440.'

/** What must be there before a proof run means anything, and its caution. */
function Before({ found }: { found: JobCase }) {
  const entries = living(found.entries)
  const has = (kind: LogEntry['body']['kind']) => entries.some((entry) => entry.body.kind === kind)
  return (
    <>
      <Caution signal="WARNING">
        Run it in the open, never in a tent, trailer or snow hole: exhaust kills. Neutral or drive
        off the ground on a guarded stand, brake on, nobody in front.
      </Caution>
      {!has('fix') && (
        <p className="font-bold">
          No fix is recorded yet: a clean run now proves nothing about one.
        </p>
      )}
      {!has('codesCleared') && (
        <p className="text-second text-ink2">
          The codes are not recorded as cleared, so a code that stands afterwards may be the old
          one.
        </p>
      )}
    </>
  )
}

type CountProps = { draft: ProofDraft; set: (next: ProofDraft) => void }

function Count({ draft, set }: CountProps) {
  const { starts, faults } = draft
  return (
    <section aria-labelledby="restarts" className="grid gap-3">
      <RuleEdge id="restarts">Restarts</RuleEdge>
      <p className="flex items-baseline justify-between gap-3">
        <span>
          <span className="figures text-hero">{starts - faults}</span> <b>clean</b>
        </span>
        <span>
          <span className="figures text-figure">{faults}</span> <b>with the fault</b>
        </span>
      </p>
      <div className="grid grid-cols-2 gap-2">
        <Key
          kind="plate"
          className="min-h-24"
          onClick={() => set({ ...draft, starts: starts + 1 })}
        >
          Clean start
        </Key>
        <Key
          className="min-h-24"
          onClick={() => set({ ...draft, starts: starts + 1, faults: faults + 1 })}
        >
          Fault came
        </Key>
      </div>
      <div className="grid grid-cols-2 gap-2">
        <Key
          small
          disabled={starts - faults === 0}
          onClick={() => set({ ...draft, starts: starts - 1 })}
        >
          One clean less
        </Key>
        <Key
          small
          disabled={faults === 0}
          onClick={() => set({ ...draft, starts: starts - 1, faults: faults - 1 })}
        >
          One fault less
        </Key>
      </div>
    </section>
  )
}

function Timer({ draft, set, ranMs, now }: CountProps & { ranMs: number; now: () => string }) {
  const running = draft.runningSince !== null
  const [byHand, setByHand] = useState(draft.typedMinutes !== '')
  const press = () =>
    set(
      running
        ? { ...draft, ranMs: ranUntil(draft, Date.parse(now())), runningSince: null }
        : { ...draft, runningSince: now() },
    )
  return (
    <section aria-labelledby="running" className="grid gap-3">
      <RuleEdge id="running">Running time</RuleEdge>
      <div className="flex items-center justify-between gap-3">
        <span role="timer" className="figures text-figure">
          {stopwatch(ranMs)}
        </span>
        <Key kind={running ? 'plain' : 'plate'} className="min-w-40" onClick={press}>
          {running ? 'Stop' : ranMs > 0 ? 'Run on' : 'Start clock'}
        </Key>
      </div>
      {running && (
        <p className="text-second text-ink2">
          The clock runs on with this closed or the phone dead.
        </p>
      )}
      {byHand ? (
        <Field
          label="Minutes, typed"
          hint="These count instead of the clock. Empty: the clock counts."
          figures
          inputMode="decimal"
          value={draft.typedMinutes}
          onChange={(typedMinutes) => set({ ...draft, typedMinutes })}
          error={minutesOf(draft, ranMs) === null ? MINUTES_UNREAD : null}
        />
      ) : (
        <Key small onClick={() => setByHand(true)}>
          Type the minutes instead
        </Key>
      )}
    </section>
  )
}

type SavedProps = { jobId: Id; entry: LogEntry; found: JobCase; onUndone: () => void }

function SavedProof({ jobId, entry, found, onUndone }: SavedProps) {
  useFocusTitle()
  const { body } = entry
  if (body.kind !== 'proofRun') return null
  return (
    <Screen
      title="Proof run saved"
      foot={
        <KeyLink kind="main" href={`/field/jobs/${jobId}/wayout`}>
          To the way out
        </KeyLink>
      }
    >
      <UndoBar
        key={entry.id}
        jobId={jobId}
        entryId={entry.id}
        what="Proof run"
        onUndone={onUndone}
      />
      <p className="text-row font-bold">{proofSentence(body)}</p>
      <p>{moreSentence(body)}</p>
      <p>
        <span className="figures">{body.minutes}</span> minutes, engine {body.hot ? 'hot' : 'cold'}.
        {!body.hot && ' A fault that only comes when hot is not touched by this run.'}
      </p>
      <ReadCodesAgain jobId={jobId} entries={found.entries} />
    </Screen>
  )
}
