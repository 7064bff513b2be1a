'use client'

import { useEffect, useRef } from 'react'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { DeskJob } from '@/lib/model/desk'
import type { SettleAction } from '../desk-actions'
import { JobLog } from '../log/job-log'
import { AlsoEntered } from '../values/also-entered'
import { DeskSuspects } from './desk-suspects'
import { JobFacts } from './job-facts'
import { LatestReading } from './latest-reading'
import type { JobCase } from './use-job-case'

type Props = { found: DeskJob; reckoned: JobCase; settle: SettleAction }

/** The picked job: facts, the latest reading, the suspects after it, and the whole log. */
export function PickedJob({ found, reckoned, settle }: Props) {
  const heading = useRef<HTMLHeadingElement>(null)
  const shown = useRef<string | null>(null)
  const jobId = found.job.id
  useEffect(() => {
    // A job picked by hand takes the focus to its heading; the first one shown does not.
    if (shown.current !== null && shown.current !== jobId) heading.current?.focus()
    shown.current = jobId
  }, [jobId])
  return (
    <article>
      <h2 ref={heading} tabIndex={-1} className="caps text-figure">
        {found.job.complaint.words}
      </h2>
      <JobFacts found={found} />
      <AlsoEntered found={found} settle={settle} />
      <LatestReading found={found} index={reckoned.index} />
      <DeskSuspects found={found} reckoned={reckoned} />
      <section className="mt-8">
        <RuleEdge end={found.entries.length}>Job log</RuleEdge>
        <JobLog found={found} index={reckoned.index} />
      </section>
    </article>
  )
}
