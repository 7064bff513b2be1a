'use client'
import type { Id } from '@/lib/model/id'
import { useBelief, useBeliefWithout } from '../engine/use-belief'
import { of100 } from '../reading-strip/figures'
import { RuleEdge } from '../ui/rule-edge'
import { movedBetween } from './why-words'

/** What one entry did to the suspects: before and after, farthest mover first. */
export function BeliefShift({ jobId, entryId }: { jobId: Id; entryId: Id }) {
  const after = useBelief(jobId)
  const before = useBeliefWithout(jobId, entryId)
  if (after.failed || before.failed)
    return (
      <p role="alert">
        What it did to the suspects could not be worked out. It is recorded, and not counted yet.
      </p>
    )
  if (after.answer === null || before.answer === null || after.working || before.working)
    return <p role="status">Working out what it did to the suspects.</p>
  const { rows, barely } = movedBetween(before.answer.belief.suspects, after.answer.belief.suspects)
  return (
    <section aria-labelledby="shift" className="grid gap-2">
      <RuleEdge id="shift">Suspects, of 100</RuleEdge>
      {barely && <p className="font-bold">The suspects barely move.</p>}
      <table className="w-full border-collapse">
        <thead className="text-second text-ink2">
          <tr className="border-b-2 border-ink">
            <th scope="col" className="py-1 text-left font-normal">
              Suspect
            </th>
            <th scope="col" className="py-1 pl-3 text-right font-normal">
              before
            </th>
            <th scope="col" className="py-1 pl-3 text-right font-normal">
              now
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.slice(0, 5).map((row) => (
            <tr key={row.fault} className="border-b-[1.5px] border-rule">
              <th scope="row" className="py-2 text-left font-bold">
                {row.name}
              </th>
              <td className="figures py-2 pl-3 text-right text-ink2">{of100(row.before)}</td>
              <td className="figures py-2 pl-3 text-right text-row">{of100(row.after)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  )
}
