'use client'

import type { ReactNode } from 'react'
import { Screen } from '@/components/ui/screen'
import { NotHere } from './not-here'
import { type JobFacts, useJobFacts } from './use-job-facts'

/** Draws a screen of a job once its rows are open, or says that this phone does not hold the job. */
export function OfJob({
  jobId,
  children,
}: {
  jobId: string
  children: (facts: JobFacts) => ReactNode
}) {
  const facts = useJobFacts(jobId)
  if (facts === undefined) {
    return (
      <Screen title="Job">
        <p className="text-ink2">Opening the job.</p>
      </Screen>
    )
  }
  if (facts === 'gone') {
    return <NotHere what="job" />
  }
  return children(facts)
}
