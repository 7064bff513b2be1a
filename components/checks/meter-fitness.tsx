'use client'
import { type BookIndex, swapsFor } from '@/lib/diag/book-index'
import type { MeterInput } from '@/lib/diag/meter'
import { canDecide, type MeterFitness } from '@/lib/diag/reading'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { JawGlyph } from '../reading-strip/jaw-glyph'
import { RuleEdge } from '../ui/rule-edge'
import { onScreen } from './words'

type Props = { jobId: Id; check: CheckItem; index: BookIndex; input: MeterInput }

/** Before the panel comes off: can this meter decide this figure, why not, and what would (F4). */
export function MeterFitnessView({ jobId, check, index, input }: Props) {
  const fitness = canDecide(input)
  return (
    <section aria-labelledby="fitness" className="grid gap-2 border-2 border-ink p-3">
      <h2 id="fitness" className="caps flex items-center gap-2 text-section">
        <JawGlyph verdict={fitness.decides ? 'in' : 'tooClose'} />
        {fitness.decides ? 'This meter can decide it' : 'This meter cannot decide it'}
      </h2>
      <p>{onScreen(fitness.words)}</p>
      {fitness.because.length > 0 && (
        <ul className="grid gap-1 text-second">
          {fitness.because.map((line) => (
            <li key={line} className="border-l-4 border-rule pl-2">
              {onScreen(line)}.
            </li>
          ))}
        </ul>
      )}
      <WouldDecide jobId={jobId} check={check} index={index} ways={fitness.wouldDecide} />
    </section>
  )
}

type WaysProps = {
  jobId: Id
  check: CheckItem
  index: BookIndex
  ways: MeterFitness['wouldDecide']
}

/** What would make it tell: what reaches 95 of 100 first, the swap as a link. */
export function WouldDecide({ jobId, check, index, ways }: WaysProps) {
  if (ways.length === 0) return null
  const swaps = swapsFor(index, check)
  return (
    <div>
      <RuleEdge level={3}>What would decide</RuleEdge>
      <ul className="mt-1 grid gap-2">
        {ways.map((way) => (
          <li key={way.way} className="flex gap-2">
            <span className="caps w-10 shrink-0 pt-0.5 text-section">
              {way.reaches95 ? 'yes' : 'no'}
            </span>
            <span className="min-w-0 flex-1">
              {onScreen(way.words)}
              {way.way === 'swap' &&
                swaps.map((swap) => (
                  <a
                    key={swap.id}
                    href={`/field/jobs/${jobId}/swap/${swap.id}`}
                    className="flex min-h-target items-center font-bold"
                  >
                    {swap.name}
                  </a>
                ))}
            </span>
          </li>
        ))}
      </ul>
    </div>
  )
}
