import { bookOfJob } from '@/lib/diag/book-for-job'
import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Needs } from './book-fetch'
import type { Core } from './core'

/**
 * The versions of the code book that open jobs on this phone are worked out with, each told by the entries of
 * its log. `knows`: the newest version the page shows.
 */
export async function neededBooks(core: Core, knows: number | null): Promise<Needs> {
  const { cache, keys, db, personId } = core
  const open = async <T>(entity: string): Promise<T[]> => {
    const records = await db.row.where('entity').equals(entity).toArray()
    return (await Promise.all(records.map((record) => cache.row(keys, record)))) as T[]
  }
  const jobs = await open<Job>('job')
  const leadOf = new Map<Id, Id>()
  for (const { id, state, mergedInto } of jobs) {
    const lead = mergedInto ?? id
    const isOpen = jobs.find((job) => job.id === lead)?.state ?? state
    if (isOpen !== 'closed') leadOf.set(id, lead)
  }
  const entries = new Map<Id, LogEntry[]>()
  for (const entry of await open<LogEntry>('logEntry')) {
    const lead = leadOf.get(entry.jobId)
    if (lead !== undefined) entries.set(lead, [...(entries.get(lead) ?? []), entry])
  }
  const versions = new Set([...entries.values()].flatMap((log) => bookOfJob(log) ?? []))
  return { personId, versions: [...versions].sort((a, b) => a - b), knows }
}
