import type { JobState } from '@/lib/model/job'
import { fail, ok, type Result } from '@/lib/model/result'

/**
 * When one stranding was reported twice (R13): the desk merges a job into another that goes on. Nothing is
 * written over, so it can be undone at any time. Machines likewise.
 */
export type MergeProblem =
  | { kind: 'sameRow' }
  | { kind: 'alreadyMerged' }
  | { kind: 'jobClosed' }
  | { kind: 'notMerged' }

type MergeRow = { id: string; mergedInto: string | null; state: JobState | null }

/** Whether `from` may be merged into `into`; both stand for themselves, and jobs are not closed. */
export function mayMerge(from: MergeRow, into: MergeRow): Result<null, MergeProblem> {
  if (from.id === into.id) return fail({ kind: 'sameRow' })
  if (from.mergedInto !== null || into.mergedInto !== null) return fail({ kind: 'alreadyMerged' })
  return from.state === 'closed' || into.state === 'closed' ? fail({ kind: 'jobClosed' }) : ok(null)
}
