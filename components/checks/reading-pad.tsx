'use client'
import { useState } from 'react'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { JobCase } from '../engine/use-case'
import { asTypedOnScreen, THIN, twoDigits } from '../reading-strip/figures'
import { Rule } from '../reading-strip/reading-strip'
import { distanceWords } from '../reading-strip/verdict'
import { VerdictLine } from '../reading-strip/verdict-line'
import { useStamp } from '../store/use-stamp'
import { Key } from '../ui/key'
import { Keypad } from './keypad'
import { setupWords, useMeterSetup } from './meter-setup'
import { MeterSetupForm } from './meter-setup-form'
import {
  type Live,
  type ReadingDraft,
  readingBodyOf,
  readingDraftKey,
  useLive,
  useReadingDraft,
} from './reading-draft'
import { type Judged, provenanceOf, specOf } from './spec-of'
import { neverNegative } from './units'
import { NotSaved, useSave } from './use-save'
import { onScreen } from './words'

type Props = { jobId: Id; check: CheckItem; found: JobCase; onSaved: (entryId: Id) => void }

const WIDE = '[@media(max-height:37.5rem)_and_(min-width:37.5rem)]'

/** The keypad with the figure, the verdict and the rule above it; side by side on a phone lying down. */
export function ReadingPad({ jobId, check, found, onSaved }: Props) {
  const { value: draft, set, ready } = useReadingDraft(jobId, check.id)
  const view = useMeterSetup(jobId)
  const [open, setOpen] = useState(false)
  const judged = specOf(check, found.spec)
  const quantity = check.reading?.quantity ?? 'resistance'
  const live = useLive(draft, view, { quantity, judged })
  const { keep, saving, problem } = useKeep({ jobId, check, draft, view, live, onSaved })
  return (
    <div className={`flex flex-1 flex-col ${WIDE}:flex-row ${WIDE}:items-start`}>
      <div className="safe-sides grid min-w-0 flex-1 grid-cols-[minmax(0,1fr)] content-start gap-1 pb-3">
        <h1 id="screen-title" tabIndex={-1} className="caps text-screen">
          {check.name}
        </h1>
        <p className="text-second text-ink2">{setupWords(view, quantity)}</p>
        <Shown draft={draft} live={live} judged={judged} />
        <div className="mt-1 grid grid-cols-2 gap-1.5">
          <SubjectKey draft={draft} set={set} />
          <Key small aria-expanded={open} onClick={() => setOpen(!open)}>
            {open ? 'Close set-up' : 'Meter set-up'}
          </Key>
        </div>
        {open && (
          <div className="grid gap-4 border-y-2 border-ink py-3">
            <MeterSetupForm view={view} quantity={quantity} airTempC={found.job.airTempC} />
            {!neverNegative(quantity) && (
              <Key
                small
                aria-pressed={draft.overRange}
                onClick={() => set({ ...draft, overRange: !draft.overRange })}
              >
                {draft.overRange ? 'Not over range' : 'OL, over range'}
              </Key>
            )}
          </div>
        )}
        <NotSaved problem={problem} />
      </div>
      <div className={`screen-foot no-print safe-sides bg-ground py-2 ${WIDE}:w-1/2`}>
        <Keypad
          quantity={quantity}
          value={draft}
          unit={live.unit}
          onChange={(next) => set({ ...draft, ...next })}
          onSave={keep}
          saveBlocked={!ready || saving || live.result === null}
        />
      </div>
    </div>
  )
}

function useKeep(of: {
  jobId: Id
  check: CheckItem
  draft: ReadingDraft
  view: ReturnType<typeof useMeterSetup>
  live: Live
  onSaved: (entryId: Id) => void
}) {
  const { jobId, check, onSaved } = of
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const keep = async () => {
    const body = readingBodyOf({ ...of, checkId: check.id })
    if (body === null) return
    const op = stamp.entry(jobId, body)
    if (await save([op], { clearDrafts: [readingDraftKey(jobId, check.id)] })) onSaved(op.fields.id)
  }
  return { keep, saving, problem }
}

/** The figure, +-U, verdict word with distance, the rule and where the band comes from. */
function Shown({ draft, live, judged }: { draft: ReadingDraft; live: Live; judged: Judged }) {
  const { strip, unit } = live
  return (
    <div>
      <p className="mt-1 flex items-baseline justify-between gap-3">
        <output className="min-w-0" aria-label="Figure">
          <span className="figures text-hero">
            {draft.overRange && <span className="caps text-screen">OL &gt; </span>}
            {draft.typed === '' ? '–' : asTypedOnScreen(draft.typed)}
          </span>
          <span className="text-section font-bold">
            {THIN}
            {unit.label}
          </span>
        </output>
        {strip !== null && !draft.overRange && (
          <span className="figures shrink-0 text-section text-ink2">
            ±{twoDigits(strip.expandedU).text}
          </span>
        )}
      </p>
      {strip === null ? (
        <p className="mt-2 text-ink2">
          {draft.overRange
            ? 'Type the top of the range, as on the dial.'
            : 'Type what the meter shows.'}
        </p>
      ) : (
        <>
          <div
            className="flex min-h-9 flex-wrap items-center justify-between gap-x-3"
            aria-live="polite"
          >
            <VerdictLine verdict={strip.verdict} large />
            <span className="text-second text-ink2">{distanceWords(strip)}</span>
          </div>
          <Rule reading={strip} />
        </>
      )}
      <p className="mt-1 text-second text-ink2">{onScreen(provenanceOf(judged))}</p>
    </div>
  )
}

/** Whose figure it is: the suspect part's, or that of a known-good one of the same kind (rule R17). */
function SubjectKey({ draft, set }: { draft: ReadingDraft; set: (next: ReadingDraft) => void }) {
  const good = draft.subject === 'knownGood'
  return (
    <Key
      small
      aria-pressed={good}
      aria-label={`Measured on: ${good ? 'known-good part' : 'suspect part'}. Change`}
      className={good ? 'key-down' : ''}
      onClick={() => set({ ...draft, subject: good ? 'suspect' : 'knownGood' })}
    >
      {good ? 'Known-good part' : 'Suspect part'}
    </Key>
  )
}
