import type { QueryKey } from '@tanstack/react-query'
import type { Change } from './live-words'

/** Names of what the desk reads, as react-query keys. */
export const reads = {
  all: ['desk'] as const,
  board: ['desk', 'board'] as const,
  jobs: ['desk', 'job'] as const,
  job: (jobId: string) => ['desk', 'job', jobId] as const,
  parts: ['desk', 'parts'] as const,
  book: ['book'] as const,
  books: ['book', 'desk'] as const,
  phones: ['desk', 'phones'] as const,
}

/** What one change makes stale: no more than that is read again. A word not known here: everything. */
export function staleReads(change: Change): QueryKey[] {
  const job = change.jobId ? [reads.job(change.jobId)] : []
  switch (change.entity) {
    case 'job':
      return [reads.board, reads.job(change.jobId ?? change.id)]
    case 'logEntry':
    case 'photo':
      return [reads.board, ...job]
    case 'partRequest':
      return [reads.board, reads.parts, ...job]
    case 'machine':
    case 'machineModel':
      return [reads.board, reads.jobs, reads.parts]
    case 'meterProfile':
    case 'bag':
      return []
    case 'book':
    case 'bookWithdrawal':
      return [reads.book]
    default:
      return [reads.all]
  }
}
