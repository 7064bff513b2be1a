'use client'
import { useId, useState } from 'react'
import { type Judged, specOf } from '@/lib/diag/spec-of'
import { neverNegative } from '@/lib/diag/typed-units'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { JobCase } from '../engine/use-case'
import { asTypedOnScreen, fixed, THIN, twoDigits } from '../reading-strip/figures'
import { Rule } from '../reading-strip/reading-strip'
import { acrossOf, distanceWords, placesOf, type StripReading } from '../reading-strip/verdict'
import { VerdictLine } from '../reading-strip/verdict-line'
import { useStamp } from '../store/use-stamp'
import { DraftSign, keptWith } from '../ui/draft-sign'
import { Key } from '../ui/key'
import { useTitle } from '../ui/title-focus'
import { Keypad } from './keypad'
import { setupShort, useMeterSetup } from './meter-setup'
import { MeterSetupForm } from './meter-setup-form'
import {
  type Live,
  type ReadingDraft,
  readingBodyOf,
  readingDraftKey,
  useLive,
  useReadingDraft,
} from './reading-draft'
import { sourceOf } from './spec-words'
import { NotSaved, useSave } from './use-save'
import { onScreen } from './words'

type Props = { jobId: Id; check: CheckItem; found: JobCase; onSaved: (entryId: Id) => void }

/** A phone lying down: keypad right, strip left. Whole class names, so that the style sheet finds them. */
const LYING_DOWN = {
  row: '[@media(max-height:37.5rem)_and_(min-width:37.5rem)]:flex-row [@media(max-height:37.5rem)_and_(min-width:37.5rem)]:items-start',
  pad: '[@media(max-height:37.5rem)_and_(min-width:37.5rem)]:w-1/2',
}

/** The keypad with the figure, the verdict and the rule above it; side by side on a phone lying down. */
export function ReadingPad({ jobId, check, found, onSaved }: Props) {
  const { value: draft, set, ready, kept } = useReadingDraft(jobId, check.id)
  const view = useMeterSetup(jobId)
  const [open, setOpen] = useState(false)
  const summary = useId()
  const title = useTitle()
  const judged = specOf(check, found.spec)
  const quantity = check.reading?.quantity ?? 'resistance'
  const live = useLive(draft, view, { quantity, judged })
  const { keep, saving, problem } = useKeep({ jobId, check, draft, view, live, onSaved })
  return (
    <div className={`flex flex-1 flex-col ${LYING_DOWN.row}`}>
      <div className="safe-sides grid min-w-0 flex-1 grid-cols-[minmax(0,1fr)] content-start gap-1 pb-3">
        <h1 ref={title} id="screen-title" tabIndex={-1} className="caps text-screen">
          {check.name}
        </h1>
        <div className="mt-1 grid grid-cols-2 gap-1.5">
          <SubjectKey draft={draft} set={set} />
          <Key
            small
            quiet
            aria-expanded={open}
            aria-describedby={summary}
            onClick={() => setOpen(!open)}
          >
            <span className="leading-tight">
              {open ? 'Close set-up' : 'Meter set-up'}
              <span id={summary} aria-hidden="true" className="block text-second font-normal">
                {setupShort(view, quantity)}
              </span>
            </span>
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
        <Shown draft={draft} live={live} judged={judged} />
        <DraftSign kept={keptWith(kept, view.kept)} />
        <NotSaved problem={problem} />
      </div>
      <div className={`screen-foot no-print safe-sides bg-ground py-2 ${LYING_DOWN.pad}`}>
        <Keypad
          quantity={quantity}
          value={draft}
          unit={live.unit}
          onChange={(next) => {
            if (ready) set({ ...draft, ...next })
          }}
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
  const { strip } = live
  return (
    <div>
      <p className="mt-1 flex items-end justify-between gap-3">
        <output className="min-w-0" aria-label="Figure">
          <span className="figures text-hero">
            {draft.overRange && <span className="caps text-screen">OL &gt; </span>}
            {draft.typed === '' ? '–' : asTypedOnScreen(draft.typed)}
          </span>
          <span className="text-section font-bold">
            {THIN}
            {live.label}
          </span>
        </output>
        {strip !== null && !draft.overRange && (
          <Meant strip={strip} typed={live.input?.value ?? null} />
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
            <VerdictLine verdict={strip.verdict} across={acrossOf(strip)} large />
            <span className="text-second text-ink2">{distanceWords(strip)}</span>
          </div>
          <Rule reading={strip} />
        </>
      )}
      <p className="mt-1 text-second text-ink2">{onScreen(sourceOf(judged))}</p>
    </div>
  )
}

/** What the figure means: +-U, and the estimate where leads or temperature are taken off. */
function Meant({ strip, typed }: { strip: StripReading; typed: number | null }) {
  const same = typed === null || Math.abs(strip.estimate - typed) < strip.resolution / 20
  return (
    <span className="shrink-0 text-right text-ink2">
      {!same && <span className="block text-second">{takenOff(strip)}</span>}
      <span className="figures text-section">
        {!same && <span className="text-ink">{fixed(strip.estimate, placesOf(strip))} </span>}±
        {twoDigits(strip.expandedU).text}
      </span>
    </span>
  )
}

const takenOff = ({ quantity }: StripReading): string =>
  quantity === 'resistance' ? 'less the leads' : 'corrected'

/** Whose figure it is: the suspect part's, or that of a known-good one of the same kind (rule R17). */
function SubjectKey({ draft, set }: { draft: ReadingDraft; set: (next: ReadingDraft) => void }) {
  const good = draft.subject === 'knownGood'
  return (
    <Key
      small
      quiet
      aria-pressed={good}
      aria-label={`Measured on: ${good ? 'known-good part' : 'suspect part'}. Change`}
      className={good ? 'key-down' : ''}
      onClick={() => set({ ...draft, subject: good ? 'suspect' : 'knownGood' })}
    >
      {good ? 'Known-good part' : 'Suspect part'}
    </Key>
  )
}
