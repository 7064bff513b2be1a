import type { LogEntry } from '@/lib/model/log-entry'

type Entries = readonly Pick<LogEntry, 'bookVersion'>[]

/**
 * `version`: the code book a job is worked out with. `newerSeen`: a newer one that an entry was written with and
 * that is not at hand. `missing`: the version the job holds, when it is not at hand. `newest`: a newer one at
 * hand that the job could be moved to.
 */
export type BookForJob = {
  version: number | null
  newerSeen: number | null
  missing: number | null
  newest: number | null
}

/**
 * The version a job holds: the newest that an entry of its log was written with, whoever wrote it. It was begun
 * with one, and goes on with that until a person moves it, which writes an entry with the newer one. Null while
 * no entry says one: then it is worked out with the newest at hand.
 */
export const bookOfJob = (entries: Entries): number | null =>
  newestOf(entries.flatMap(({ bookVersion }) => bookVersion ?? []))

/**
 * Answers which code book a job is worked out with (rule R23), the same on every phone and at the desk: the one it
 * holds. One that is not at hand, or was withdrawn whole, is replaced by the next newer one at hand, else by the
 * newest. Advice that was acted on keeps its own version in the log. `held`: the versions at hand, in any order.
 */
export function bookForJob(
  held: readonly number[],
  entries: Entries,
  withdrawn: ReadonlySet<number> = new Set(),
): BookForJob {
  const good = held.filter((version) => !withdrawn.has(version))
  const newest = newestOf(good)
  const wanted = bookOfJob(entries)
  const isGone = wanted !== null && withdrawn.has(wanted)
  const version = wanted === null ? newest : bestFor(wanted, good)
  return {
    version,
    newerSeen: wanted !== null && !isGone && wanted > (version ?? 0) ? wanted : null,
    missing: wanted !== null && !isGone && wanted !== version ? wanted : null,
    newest: version !== null && newest !== null && newest > version ? newest : null,
  }
}

function bestFor(wanted: number, held: readonly number[]): number | null {
  const from = held.filter((version) => version >= wanted)
  return from.length > 0 ? Math.min(...from) : newestOf(held)
}

const newestOf = (versions: readonly number[]): number | null =>
  versions.length === 0 ? null : Math.max(...versions)
