'use client'
import { type ReactNode, useState } from 'react'
import {
  decidedWayOut,
  limpRefusals,
  limpUnjudged,
  SAID_BY_HAND,
  type WayOutFacts,
  wayOutNotices,
} from '@/lib/diag/way-out'
import type { Id } from '@/lib/model/id'
import { type Job, WAYS_OUT, type WayOut } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import { UndoBar } from '../checks/undo-bar'
import { useJustSaved } from '../checks/use-just-saved'
import { NotYours, useMayLog } from '../checks/use-may'
import { useBelief } from '../engine/use-belief'
import { type JobCase, useCase } from '../engine/use-case'
import { useNow } from '../field/use-now'
import { whenWords } from '../field/when-words'
import { MACHINE_WORDS, PEOPLE_WORDS, WAY_OUT_WORDS } from '../field/words'
import { useBook } from '../store/use-book'
import { useDraft } from '../store/use-draft'
import { useJobZone } from '../store/use-job-zone'
import { useSession } from '../store/use-session'
import { announce } from '../ui/announce'
import { Caution } from '../ui/caution'
import { Choice, ChoiceMany } from '../ui/choice'
import { Key, KeyLink } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { FRESH_WAY_OUT, type WayOutDraft, wayOutDraftKey } from './way-out-draft'
import { useWayOutForm } from './way-out-form'
import { movesBack } from './way-out-moves'
import {
  NOTICE_WORDS,
  refusalWords,
  SAID_WORDS,
  UNJUDGED_WORDS,
  WAY_CAUTIONS,
} from './way-out-words'

/** Repair here, limp out, tow, return later: refusals first, then the person decides (F6, rules R2, R10). */
export function WayOutScreen({ jobId }: { jobId: Id }) {
  const found = useCase(jobId)
  const { savedId, keepSaved, forget } = useJustSaved(found?.entries ?? [])
  const [again, setAgain] = useState(false)
  const [before, setBefore] = useState<Job | null>(null)
  const draft = useDraft<WayOutDraft>(wayOutDraftKey(jobId), FRESH_WAY_OUT)
  const mine = useMayLog('wayOut')
  const session = useSession()
  if (found === null)
    return (
      <Screen title="Way out">
        <p role="status">Opening the job.</p>
      </Screen>
    )
  const last = decidedWayOut(found.entries)
  const saved = (id: Id) => {
    keepSaved(id)
    setBefore(found.job)
    setAgain(false)
  }
  const leaveIt = () => {
    setAgain(false)
    draft.clear().catch(() => announce('Could not be thrown away.', 'assertive'))
  }
  if (last === undefined && !mine)
    return (
      <Screen title="Way out">
        <NotYours what="Deciding the way out" />
      </Screen>
    )
  if (mine && (last === undefined || again || draft.value.way !== null))
    return (
      <Deciding jobId={jobId} found={found} onSaved={saved}>
        {last !== undefined && (
          <>
            <Decided entry={last} />
            <Key small onClick={leaveIt}>
              Leave it as decided
            </Key>
          </>
        )}
      </Deciding>
    )
  const movesTakenBack = () =>
    before === null || last === undefined
      ? []
      : movesBack({
          jobId,
          before,
          now: found.job,
          put: { machine: last.body.machineState, people: last.body.peopleState },
          roles: session.kind === 'ready' ? session.actor.roles : [],
        })
  return (
    <Screen
      title="Way out"
      foot={
        <KeyLink kind="main" href={`/field/jobs/${jobId}`}>
          To the job
        </KeyLink>
      }
    >
      {savedId !== null && (
        <UndoBar
          key={savedId}
          jobId={jobId}
          entryId={savedId}
          what="Way out recorded"
          alsoBack={movesTakenBack}
          onUndone={forget}
        />
      )}
      {last !== undefined && <Decided entry={last} />}
      {mine && (
        <Key small onClick={() => setAgain(true)}>
          Decide again
        </Key>
      )}
    </Screen>
  )
}

function Decided({ entry }: { entry: LogEntry }) {
  const { body } = entry
  const zone = useJobZone(entry.jobId)
  const now = useNow()
  if (body.kind !== 'wayOut') return null
  return (
    <section aria-labelledby="decided" className="grid gap-1">
      <RuleEdge id="decided">Decided</RuleEdge>
      <p className="text-row font-bold">
        <span className="figures mr-2 text-ink2">{whenWords(entry.happenedAt, zone, now)}</span>
        {WAY_OUT_WORDS[body.wayOut]}
      </p>
      <p>
        Machine: {MACHINE_WORDS[body.machineState].toLowerCase()}. People:{' '}
        {PEOPLE_WORDS[body.peopleState].toLowerCase()}.
      </p>
      <p className="whitespace-pre-line">{body.reasons}</p>
    </section>
  )
}

type DecidingProps = {
  jobId: Id
  found: JobCase
  onSaved: (entryId: Id) => void
  /** The decision that stands, when it is being made again. */
  children: ReactNode
}

function Deciding({ jobId, found, onSaved, children }: DecidingProps) {
  const { value: draft, set, kept } = useDraft<WayOutDraft>(wayOutDraftKey(jobId), FRESH_WAY_OUT)
  const { index } = useBook()
  const { answer, failed } = useBelief(jobId)
  const facts: WayOutFacts = {
    job: found.job,
    features: found.input.features,
    entries: found.entries,
    suspects: answer?.belief.suspects ?? null,
    index,
    said: draft.said,
  }
  const refused = limpRefusals(facts).map(refusalWords)
  const unjudged = limpUnjudged(facts).map((one) => UNJUDGED_WORDS[one])
  const limpHint = refused.length > 0 ? 'refused' : unjudged.length > 0 ? 'not judged yet' : null
  const way = draft.way === 'limpOut' && limpHint !== null ? null : draft.way
  const form = useWayOutForm({ jobId, found, way, draft, set, onSaved })
  return (
    <Screen
      title="Way out"
      second="You decide. The reasons go into the log."
      kept={kept}
      foot={form.foot}
    >
      {children}
      <ChoiceMany
        legend="Is any of these so?"
        hint="With any of them riding out is not offered."
        value={draft.said}
        onChange={(said) => set({ ...draft, said })}
        options={SAID_BY_HAND.map((value) => ({ value, label: SAID_WORDS[value] }))}
      />
      {refused.length > 0 && (
        <section aria-labelledby="refused" className="grid gap-1 border-2 border-nogo p-3">
          <h2 id="refused" className="caps text-section">
            Limp out refused
          </h2>
          <ul className="grid gap-1">
            {refused.map((reason) => (
              <li key={reason}>{reason}</li>
            ))}
          </ul>
          <p className="text-second text-ink2">Whatever a tow costs.</p>
        </section>
      )}
      {unjudged.length > 0 && (
        <p role="status" className="border-l-4 border-ink pl-3">
          <b>Limp out not judged:</b> {unjudged.join('; ')}.{' '}
          {index === null ? 'The code book is not on this phone.' : ''}
          {index !== null && failed ? 'The sums could not be done for this job.' : ''}
        </p>
      )}
      <Choice
        legend="Way out"
        value={way}
        onChange={(next) => set({ ...draft, way: next, machine: null, people: null })}
        options={WAYS_OUT.map((value) => ({
          value,
          label: WAY_OUT_WORDS[value],
          disabled: value === 'limpOut' && limpHint !== null,
          ...(value === 'limpOut' && limpHint !== null ? { hint: limpHint } : {}),
        }))}
      />
      {way !== null && (
        <>
          <Remarks way={way} facts={facts} found={found} />
          {form.fields}
        </>
      )}
    </Screen>
  )
}

function Remarks({ way, facts, found }: { way: WayOut; facts: WayOutFacts; found: JobCase }) {
  const list = wayOutNotices(way, facts).map((one) => NOTICE_WORDS[one])
  return (
    <div className="grid gap-3">
      {WAY_CAUTIONS[way].map((one) => (
        <Caution key={one.text} signal={one.signal}>
          {one.text}
        </Caution>
      ))}
      {way === 'tow' && (
        <p>
          <b>Before towing:</b>{' '}
          {found.spec?.towPreparation ??
            'The spec sheet says nothing on towing this model. Belt off or neutral, driven wheels or track free: see the maker’s manual.'}
        </p>
      )}
      {list.length > 0 && (
        <ul className="grid gap-1 border-l-4 border-ink pl-3 font-bold">
          {list.map((one) => (
            <li key={one}>{one}</li>
          ))}
        </ul>
      )}
      <p className="text-second text-ink2">
        Common practice, no source. The maker&apos;s manual and local rules come first.
      </p>
    </div>
  )
}
