import type { Features } from '@/lib/model/features'
import type { Job } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { SpecSheet } from '@/lib/model/machine-model'
import type { MeterProfile } from '@/lib/model/meter-profile'
import type { BookIndex } from './book-index'

/** Everything the engine looks at for one job: pure data, the same on phone, server and desk. */
export type Case = {
  index: BookIndex
  features: Features
  spec: SpecSheet | null
  /** The symptom that is the condition of the belief (rule R5): the complaint's, else the first one taken down. */
  symptom: string | null
  /** Living entries in the order they happened (then written, then id). */
  entries: readonly LogEntry[]
  /** The meter in the bag, where known: it decides what a reading can tell before it is taken. */
  meter: MeterProfile | null
}

/**
 * A job as the engine sees it. Entries that a later one supersedes or corrects are left out; what was itself
 * corrected no longer strikes anything. The order is by `happenedAt`, then `writtenAt`, then id, so
 * that two devices holding the same entries reckon the same figures.
 */
export function buildCase(input: {
  index: BookIndex
  features: Features
  spec: SpecSheet | null
  job: Pick<Job, 'complaint'>
  entries: readonly LogEntry[]
  meter?: MeterProfile | null
}): Case {
  const entries = living(input.entries)
  const first = entries.find((e) => e.body.kind === 'symptom')?.body
  const taken = first?.kind === 'symptom' ? first.symptom : null
  return {
    index: input.index,
    features: input.features,
    spec: input.spec,
    symptom: input.job.complaint.symptom ?? taken,
    entries,
    meter: input.meter ?? null,
  }
}

/** What the machine is said to do, each once: the complaint's symptom first, then what was taken down later. */
export function symptomsOf(of: {
  job: Pick<Job, 'complaint'>
  entries: readonly LogEntry[]
}): string[] {
  const later = living(of.entries).flatMap(({ body }) =>
    body.kind === 'symptom' ? [body.symptom] : [],
  )
  const first = of.job.complaint.symptom
  return [...new Set(first === null ? later : [first, ...later])]
}

/** True once it is known what the machine does: before that the model has nothing to rank suspects by. */
export const hasSymptom = (of: Parameters<typeof symptomsOf>[0]): boolean =>
  symptomsOf(of).length > 0

/** The entries still in evidence, in the order they happened; corrections themselves are left out. */
export function living(entries: readonly LogEntry[]): LogEntry[] {
  const struck = strikes(entries)
  return entries.filter((e) => !struck.has(e.id) && e.body.kind !== 'correction').sort(byTime)
}

/**
 * The entries that are out of evidence, each with the one that took it out: a correction, or the entry that
 * stands in its place. An entry that a standing correction points to strikes nothing; one that was only
 * replaced still does, so that what it replaced does not come back beside the newest.
 */
export function strikes<E extends LogEntry>(entries: readonly E[]): Map<string, E> {
  const correctedBy = new Map<string, E[]>()
  for (const e of entries) {
    if (e.body.kind !== 'correction' || e.supersedes === null) continue
    correctedBy.set(e.supersedes, [...(correctedBy.get(e.supersedes) ?? []), e])
  }
  const stands = new Map<string, boolean>()
  const standing = (e: E): boolean => {
    const known = stands.get(e.id)
    if (known !== undefined) return known
    // Two that point at each other cannot be written; should they be, both stand.
    stands.set(e.id, true)
    const answer = !(correctedBy.get(e.id) ?? []).some(standing)
    stands.set(e.id, answer)
    return answer
  }
  const struck = new Map<string, E>()
  for (const e of entries)
    if (e.supersedes !== null && !struck.has(e.supersedes) && standing(e))
      struck.set(e.supersedes, e)
  return struck
}

function byTime(a: LogEntry, b: LogEntry): number {
  if (a.happenedAt !== b.happenedAt) return a.happenedAt < b.happenedAt ? -1 : 1
  if (a.writtenAt !== b.writtenAt) return a.writtenAt < b.writtenAt ? -1 : 1
  return a.id < b.id ? -1 : a.id > b.id ? 1 : 0
}
