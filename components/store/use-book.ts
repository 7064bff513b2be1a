'use client'
import { createContext, use, useMemo } from 'react'
import type { BookForJob } from '@/lib/diag/book-for-job'
import { withdrawnVersions } from '@/lib/diag/withdrawn-in'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { BookView } from '@/lib/sync/client/views'
import { useStore } from './store-provider'
import { useWithdrawals } from './use-rows'
import { useWatch } from './use-watch'

/** The version that the job around holds; `opening` while its log is. Null outside of a job. */
export type JobsBook = BookForJob & { opening: boolean }
export const JobsBookContext = createContext<JobsBook | null>(null)

/** Which version the job around is worked out with; null outside of a job. */
export const useJobsBook = (): JobsBook | null => use(JobsBookContext)

/**
 * The code book to work with: inside a job the version it holds, else the newest, in both without what was
 * withdrawn from it (R23).
 */
export function useBook(): BookView {
  const held = useWatch(useStore().book)
  const job = useJobsBook()
  const taken = useWithdrawals()
  return useMemo(() => bookView(held, job, taken), [held, job, taken])
}

/** As `useBook`, of what was read. */
export function bookView(
  held: BookView,
  job: JobsBook | null,
  taken: readonly BookWithdrawal[],
): BookView {
  const of = (version: number) => held.of(version, taken)
  if (job?.opening === true) return { ...held, status: 'opening', index: null, version: null, of }
  const gone = withdrawnVersions(taken)
  const newest = held.versions.filter((version) => !gone.has(version)).at(-1) ?? null
  const version = job === null ? newest : job.version
  const index = version === null ? null : of(version)
  if (held.status !== 'ready') return held
  if (index === null) return { ...held, status: 'missing', index, version: null, of }
  return { ...held, index, version, of }
}
