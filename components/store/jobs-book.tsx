'use client'
import { type ReactNode, useEffect, useMemo } from 'react'
import { bookForJob } from '@/lib/diag/book-for-job'
import { withdrawnVersions } from '@/lib/diag/withdrawn-in'
import type { Id } from '@/lib/model/id'
import { useStore } from './store-provider'
import { type JobsBook as Held, JobsBookContext } from './use-book'
import { useLog } from './use-log'
import { useWithdrawals } from './use-rows'
import { useWatch } from './use-watch'

/** Everything inside works with the version of the code book that this job holds. */
export function JobsBook({ jobId, children }: { jobId: Id; children: ReactNode }) {
  const store = useStore()
  const { versions } = useWatch(store.book)
  const log = useLog(jobId)
  const taken = useWithdrawals()
  const value = useMemo<Held>(() => {
    const entries = log?.map(({ entry }) => entry) ?? []
    return {
      ...bookForJob(versions, entries, withdrawnVersions(taken)),
      opening: log === undefined,
    }
  }, [versions, log, taken])
  const { missing } = value
  useEffect(() => {
    if (missing !== null) store.askForBook()
  }, [store, missing])
  return <JobsBookContext value={value}>{children}</JobsBookContext>
}
