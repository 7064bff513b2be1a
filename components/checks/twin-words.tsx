'use client'
import { saysNothingOf, twinOf } from '@/lib/diag/good-twin'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { LogEntry, ReadingBody } from '@/lib/model/log-entry'
import { useBelief } from '../engine/use-belief'
import { unitLabel } from '../reading-strip/unit-words'
import { shownFigure } from '../reading-strip/verdict'

const Typed = ({ body }: { body: ReadingBody }) => (
  <>
    <b className="figures">{shownFigure({ ...body, shown: body.asTyped })}</b>{' '}
    {unitLabel(body.quantity, body.unit)}
  </>
)

type Props = { jobId: Id; check: CheckItem; entries: readonly LogEntry[] }

/** The suspect part beside a known-good one, and plainly when the pair says nothing about the part (R17). */
export function TwinWords({ jobId, check, entries }: Props) {
  const pair = twinOf(check.id, entries)
  const { answer, working } = useBelief(jobId)
  if (pair === null) return null
  const { suspect, good } = pair
  const silent = answer !== null && !working && saysNothingOf(answer.belief.suspects, suspect.id)
  return (
    <section
      aria-label="Beside a known-good part"
      className="grid gap-1 border-l-4 border-ink pl-3"
    >
      <p>
        Suspect part <Typed body={suspect.body} />, known-good part <Typed body={good.body} />.
      </p>
      {silent && (
        <p className="text-row font-bold">
          They read alike: this check says nothing about the part.
        </p>
      )}
    </section>
  )
}
