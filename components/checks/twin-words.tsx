'use client'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { LogEntry, ReadingBody } from '@/lib/model/log-entry'
import { useBelief } from '../engine/use-belief'
import { asTypedOnScreen } from '../reading-strip/figures'

type Props = { jobId: Id; check: CheckItem; entries: readonly LogEntry[] }
type Read = { id: Id; body: ReadingBody }

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
        Suspect part <b className="figures">{asTypedOnScreen(suspect.body.asTyped)}</b>{' '}
        {suspect.body.unit}, known-good part{' '}
        <b className="figures">{asTypedOnScreen(good.body.asTyped)}</b> {good.body.unit}.
      </p>
      {silent && (
        <p className="text-row font-bold">
          They read alike: this check says nothing about the part.
        </p>
      )}
    </section>
  )
}

/** The last reading of each, when both were taken. */
export function twinOf(checkId: string, entries: readonly LogEntry[]) {
  const last = (subject: ReadingBody['subject']): Read | null => {
    const found = entries.findLast(
      ({ body }) => body.kind === 'reading' && body.checkId === checkId && body.subject === subject,
    )
    return found?.body.kind === 'reading' ? { id: found.id, body: found.body } : null
  }
  const suspect = last('suspect')
  const good = last('knownGood')
  return suspect === null || good === null ? null : { suspect, good }
}

type Suspects = { why: { entryId: Id | null; saysNothing: boolean; logRatio: number }[] }[]

/** True when the engine takes nothing from this reading for any suspect. */
export function saysNothingOf(suspects: Suspects, entryId: Id): boolean {
  const pieces = suspects.flatMap((one) => one.why.filter((why) => why.entryId === entryId))
  return pieces.every((why) => why.saysNothing || Math.abs(why.logRatio) < 0.005)
}
