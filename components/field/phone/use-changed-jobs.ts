'use client'
import { useMemo } from 'react'
import { useStore } from '@/components/store/store-provider'
import {
  useAllEntries,
  useJobs,
  useMachines,
  useModels,
  useWithdrawals,
} from '@/components/store/use-rows'
import { useWatch } from '@/components/store/use-watch'
import { belief } from '@/lib/diag/belief'
import { bookForJob } from '@/lib/diag/book-for-job'
import type { BookIndex } from '@/lib/diag/book-index'
import { buildCase } from '@/lib/diag/case'
import { restsOn, type VerdictChange, verdictChange, withoutWithdrawn } from '@/lib/diag/withdrawn'
import { withdrawnVersions } from '@/lib/diag/withdrawn-in'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { Job } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'

export type ChangedHere = { job: Job; change: VerdictChange }

/** The jobs on this phone whose verdict a withdrawal changes, as the shop lists them for all of its jobs (R23). */
export function useChangedJobs(one: BookWithdrawal): ChangedHere[] {
  const held = useWatch(useStore().book)
  const taken = useWithdrawals()
  const jobs = useJobs()
  const entries = useAllEntries()
  const machines = useMachines()
  const models = useModels()
  return useMemo(() => {
    if (jobs === undefined || entries === undefined) return []
    const others = taken.filter(({ id }) => id !== one.id)
    const logs = logsOf(entries)
    return jobs.flatMap((job): ChangedHere[] => {
      const ids = [job.id, ...(job.mergedFrom ?? [])]
      const log = ids.flatMap((id) => logs.get(id) ?? [])
      if (!mayConcern(one, job, log)) return []
      const machine = machines?.find((row) => row.id === job.machineId)
      const model = models?.find((row) => row.id === machine?.modelId)
      const features = { ...model?.features, ...machine?.features }
      const beliefWith = (applied: readonly BookWithdrawal[]) => {
        const { version } = bookForJob(held.versions, log, withdrawnVersions(applied))
        const index: BookIndex | null = version === null ? null : held.of(version)
        if (index === null) return null
        const book = withoutWithdrawn(index, applied)
        return belief(buildCase({ index: book, features, spec: null, job, entries: log }))
      }
      const [before, after] = [beliefWith(others), beliefWith(taken)]
      const change = before && after && verdictChange(before, after)
      return change ? [{ job, change }] : []
    })
  }, [one, taken, held, jobs, entries, machines, models])
}

function logsOf(entries: readonly LogEntry[]): Map<string, LogEntry[]> {
  const logs = new Map<string, LogEntry[]>()
  for (const entry of entries) {
    const log = logs.get(entry.jobId) ?? []
    logs.set(entry.jobId, log)
    log.push(entry)
  }
  return logs
}

/** Of a fault or a whole version any open job may be worked out otherwise; else those that used it. */
function mayConcern(one: BookWithdrawal, job: Job, log: readonly LogEntry[]): boolean {
  const ofAll = one.what === 'fault' || one.what === 'version'
  return (ofAll && job.state !== 'closed') || log.some((entry) => restsOn(entry, one))
}
