import type { LogEntry } from '@/lib/model/log-entry'

/** `version`: the code book a job is worked out with; `newerSeen`: a newer one that an entry was written with. */
export type BookForJob = { version: number | null; newerSeen: number | null }

/**
 * Answers which code book a job is worked out with (rule R23): the newest published version at hand, on
 * the phone as at the desk, whatever version its entries were written with, so that a withdrawn check or
 * limit counts for every job at once. Advice that was acted on keeps its own version in the log. `held`:
 * the versions at hand, in any order; `version` is null without one. `newerSeen` says that the answer is
 * behind: somebody has already worked with a version that is not at hand here.
 */
export function bookForJob(
  held: readonly number[],
  entries: readonly Pick<LogEntry, 'bookVersion'>[],
): BookForJob {
  const version = newestOf(held)
  const seen = newestOf(entries.flatMap(({ bookVersion }) => bookVersion ?? []))
  return { version, newerSeen: seen !== null && seen > (version ?? 0) ? seen : null }
}

const newestOf = (versions: readonly number[]): number | null =>
  versions.length === 0 ? null : Math.max(...versions)
