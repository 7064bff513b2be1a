import { distanceMetres } from '@/lib/diag/distance'
import type { BoardJob } from '@/lib/model/desk'
import type { Job } from '@/lib/model/job'

/**
 * The other open jobs, the likeliest to be the same stranding first: by distance where both have a place,
 * then those without, each by how close in time they were opened.
 */
export function nearest(job: Job, open: readonly BoardJob[]): BoardJob[] {
  const far = ({ job: other }: BoardJob) =>
    job.place && other.place ? distanceMetres(job.place, other.place) : Number.POSITIVE_INFINITY
  const apart = ({ job: other }: BoardJob) =>
    Math.abs(Date.parse(other.openedAt) - Date.parse(job.openedAt))
  const others = open.filter((other) => other.job.id !== job.id && other.job.state !== 'closed')
  return others.sort((a, b) => {
    const [one, two] = [far(a), far(b)]
    return one === two ? apart(a) - apart(b) : one - two
  })
}
