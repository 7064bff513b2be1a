'use client'

import type { ReactNode } from 'react'
import { KeyLink } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
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
    return (
      <Screen
        title="Not on this phone"
        foot={
          <KeyLink kind="main" href="/field">
            Jobs on this phone
          </KeyLink>
        }
      >
        <p>
          This job is not on this phone. If the shop has it and it is yours or open, it arrives at
          the next contact.
        </p>
      </Screen>
    )
  }
  return children(facts)
}
