'use client'
import { useMemo, useState } from 'react'
import type { BookIndex } from '@/lib/diag/book-index'
import { living } from '@/lib/diag/case'
import { judge, type ReadingResult } from '@/lib/diag/reading'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { LogEntry, ReadingBody } from '@/lib/model/log-entry'
import { asTypedOnScreen, fixed, shortUnit, twoDigits } from '../reading-strip/figures'
import { ReadingFigure, Rule } from '../reading-strip/reading-strip'
import {
  acrossOf,
  distanceWords,
  placesOf,
  type StripReading,
  stripOfBody,
} from '../reading-strip/verdict'
import { VerdictLine } from '../reading-strip/verdict-line'
import { Key, KeyLink } from '../ui/key'
import { Screen } from '../ui/screen'
import { BeliefShift } from './belief-shift'
import { WouldDecide } from './meter-fitness'
import { useReadingDraft } from './reading-draft'
import { useFocusTitle } from './saved-outcome'
import { TwinWords } from './twin-words'
import { UndoBar } from './undo-bar'

type Props = {
  jobId: Id
  entry: LogEntry
  body: ReadingBody
  check: CheckItem
  index: BookIndex
  entries: readonly LogEntry[]
  onAgain: () => void
}

/** After SAVE: the verdict as the heading, what it means, what would make it tell, what it did. */
export function SavedReading({ jobId, entry, body, check, index, entries, onAgain }: Props) {
  useFocusTitle()
  const draft = useReadingDraft(jobId, check.id)
  const result = useMemo(() => judge(body), [body])
  const strip = stripOfBody(body)
  const other = body.subject === 'suspect' ? 'knownGood' : 'suspect'
  const alsoOther = () => {
    draft.set({ typed: '', unit: null, overRange: false, subject: other })
    onAgain()
  }
  return (
    <Screen
      title={
        <VerdictLine
          verdict={body.result?.verdict ?? null}
          across={strip === null ? 'low' : acrossOf(strip)}
          large
        />
      }
      second={`${check.name}${body.subject === 'knownGood' ? ', on a known-good part' : ''}`}
      foot={
        <KeyLink kind="main" href={`/field/jobs/${jobId}/checks`}>
          Back to checks
        </KeyLink>
      }
    >
      <UndoBar jobId={jobId} entryId={entry.id} what="Reading" onUndone={onAgain} />
      {strip !== null && <Drawn strip={strip} result={result} body={body} />}
      <TwinWords jobId={jobId} check={check} entries={living(entries)} />
      <WouldDecide jobId={jobId} check={check} index={index} ways={result.wouldDecide} />
      <BeliefShift jobId={jobId} entryId={entry.id} />
      <Key quiet onClick={alsoOther}>
        {other === 'knownGood' ? 'Measure a known-good part too' : 'Measure the suspect part'}
      </Key>
    </Screen>
  )
}

type DrawnProps = { strip: StripReading; result: ReadingResult; body: ReadingBody }

function Drawn({ strip, result, body }: DrawnProps) {
  const [open, setOpen] = useState(false)
  const unit = shortUnit(body.quantity)
  return (
    <section aria-label="The reading" className="grid gap-2">
      <div>
        <ReadingFigure reading={strip} />
        <Rule reading={strip} />
        <p className="text-second text-ink2">{distanceWords(strip)}</p>
      </div>
      <p>{meaning(strip, result, unit)}</p>
      <Key small aria-expanded={open} onClick={() => setOpen(!open)}>
        {open ? 'Close the sums' : 'Show the sums'}
      </Key>
      {open && <Sums strip={strip} result={result} unit={unit} />}
    </section>
  )
}

/** Estimate and chance in one plain sentence. */
export function meaning(strip: StripReading, result: ReadingResult, unit: string): string {
  const places = placesOf(strip)
  const best = `Best estimate ${fixed(strip.estimate, places)} ${unit}, ±${twoDigits(strip.expandedU).text}.`
  if (strip.overRange)
    return `Over the range of the meter: more than ${asTypedOnScreen(strip.shown)} ${strip.unit}.`
  if (result.conformance === null) return best
  const exact =
    result.conformanceExact === null ? '' : ` (${share(result.conformanceExact)} by the exact sum)`
  return `${best} Chance of being within the spec: ${share(result.conformance)} of 100${exact}.`
}

const share = (value: number): string => fixed(value * 100, value < 0.1 || value > 0.9 ? 1 : 0)

function Sums({
  strip,
  result,
  unit,
}: {
  strip: StripReading
  result: ReadingResult
  unit: string
}) {
  const places = Math.max(placesOf(strip), 3)
  return (
    <div className="grid gap-2 text-second">
      <p>
        u = <b className="figures">{fixed(result.standardU, places)}</b> {unit}, shown as ±2 u.
        Every part from <b className="figures">{fixed(result.span.low, places)}</b>
        {result.span.high === null ? (
          ' up'
        ) : (
          <>
            {' '}
            to <b className="figures">{fixed(result.span.high, places)}</b>
          </>
        )}{' '}
        {unit} can show this figure.
      </p>
      <table className="w-full border-collapse text-left">
        <caption className="visually-hidden">Where the uncertainty comes from</caption>
        <thead className="text-ink2">
          <tr className="border-b-2 border-ink">
            <th scope="col" className="font-normal">
              Source
            </th>
            <th scope="col" className="text-right font-normal">
              ± {unit}
            </th>
            <th scope="col" className="text-right font-normal">
              of 100
            </th>
          </tr>
        </thead>
        <tbody>
          {result.budget.map((line) => (
            <tr key={line.source} className="border-b-[1.5px] border-rule">
              <th scope="row" className="py-1 font-bold">
                {line.source}
              </th>
              <td className="figures py-1 text-right">{fixed(line.halfWidth, 3)}</td>
              <td className="figures py-1 text-right">{fixed(line.share * 100, 0)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="text-ink2">After JCGM 100 and JCGM 106; the verdict after ISO 14253-1.</p>
    </div>
  )
}
