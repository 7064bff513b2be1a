'use client'
import { useMemo } from 'react'
import type { BookIndex } from '@/lib/diag/book-index'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { type Action, outlookKey } from '../engine/outlook-key'
import { useBelief } from '../engine/use-belief'
import { of100 } from '../reading-strip/figures'
import { MarkPicture } from '../suspects/mark-sign'
import { marksOf, saysNothing } from '../suspects/outlook-words'
import { RuleEdge } from '../ui/rule-edge'

type Props = { jobId: Id; check: CheckItem; index: BookIndex }

/** Which suspects this check tells apart, as they stand now and after each outcome. */
export function Separates({ jobId, check, index }: Props) {
  const wanted = useMemo<Action[]>(() => [{ kind: 'check', id: check.id }], [check.id])
  const { answer, failed } = useBelief(jobId, wanted)
  const outlook = answer?.outlooks[outlookKey({ kind: 'check', id: check.id })]
  if (answer === null || outlook === undefined || failed) return null
  const rows = answer.belief.suspects
    .map((suspect) => ({ suspect, marks: marksOf(suspect.fault, outlook) }))
    .filter(({ suspect, marks }) => suspect.ruledOutBy === null && !saysNothing(marks))
  const names = Object.keys(check.table).map((id) => index.faults.get(id)?.name ?? id)
  return (
    <section aria-labelledby="separates" className="grid gap-1">
      <RuleEdge id="separates">Tells apart, of 100</RuleEdge>
      {rows.length === 0 ? (
        <p>
          As things stand this check moves no suspect by 3 of 100 or more
          {names.length === 0 ? '.' : `. It is about: ${names.join(', ').toLowerCase()}.`}
        </p>
      ) : (
        <ul className="grid gap-2">
          {rows.map(({ suspect, marks }) => (
            <li key={suspect.fault}>
              <span className="flex justify-between gap-3 font-bold">
                {suspect.name}
                <span>
                  now <span className="figures">{of100(suspect.chance)}</span>
                </span>
              </span>
              <span className="flex flex-wrap gap-x-4 text-second text-ink2">
                {marks.map((mark) => (
                  <span key={mark.outcome} className="inline-flex items-center gap-1.5">
                    <MarkPicture shape={mark.shape} />
                    {mark.words}{' '}
                    <span className="figures whitespace-nowrap text-ink">{of100(mark.chance)}</span>
                  </span>
                ))}
              </span>
            </li>
          ))}
        </ul>
      )}
    </section>
  )
}
