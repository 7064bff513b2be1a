'use client'

import { RuleEdge } from '@/components/ui/rule-edge'
import type { BoardJob } from '@/lib/model/desk'
import { whenWords } from '../../field/when-words'
import { useDesk } from '../desk-context'
import { deskPaths } from '../desk-path'
import { useNow } from '../use-now'

/** Jobs closed in the last 24 hours, newest first. */
export function ClosedJobs({ rows }: { rows: readonly BoardJob[] }) {
  const { shop } = useDesk()
  const now = useNow()
  if (rows.length === 0) return null
  return (
    <section className="mt-8">
      <RuleEdge>Closed in the last 24 hours</RuleEdge>
      <ul>
        {rows.map((row) => (
          <li key={row.job.id} className="border-b-[1.5px] border-rule">
            <a
              href={deskPaths.job(row.job.id)}
              className="flex min-h-11 items-center gap-3 text-ink no-underline"
            >
              <span className="figures text-second">{row.job.number}</span>
              <span className="min-w-0 flex-1 truncate text-body font-bold">
                {row.job.complaint.words}
              </span>
              <span className="figures text-second text-ink2">
                {row.closedAt ? whenWords(row.closedAt, shop.zone, now) : ''}
              </span>
            </a>
          </li>
        ))}
      </ul>
    </section>
  )
}
