import type { Job } from '@/lib/model/job'

/**
 * The order of the dispatcher's board (rule R19): by exposure of people, never by when a job came in.
 * Rungs of R19 that need the contact plan (overdue, late) have their place kept free in the numbering.
 */
export const EXPOSURES = {
  hurtOrMissing: 0,
  exposedAndStill: 3,
  noPosition: 4,
  aloneInTheDark: 5,
  inTheField: 7,
  safe: 8,
} as const
export type Exposure = keyof typeof EXPOSURES

type Seen = Pick<Job, 'people' | 'peopleState' | 'place'>

/**
 * How exposed the people of a job are. `dark`: the sun is under the horizon at the job's place, false
 * when that cannot be known. People who are safe rank last, whatever was said before.
 */
export function exposureOf(job: Seen, dark: boolean): Exposure {
  if (job.peopleState === 'safe') return 'safe'
  if (job.people.hurt || job.people.missing) return 'hurtOrMissing'
  if (job.people.exposed && job.peopleState === 'withMachine') return 'exposedAndStill'
  if (!job.place) return 'noPosition'
  if (job.people.count === 1 && dark) return 'aloneInTheDark'
  return 'inTheField'
}

/**
 * The rows in board order: most exposed first, then the one that has waited longest, then by id so that
 * two desks show the same order. The rows given are left as they are.
 */
export function byExposure<R extends { job: Job }>(
  rows: readonly R[],
  dark: (job: Job) => boolean,
): R[] {
  const rung = (row: R) => EXPOSURES[exposureOf(row.job, dark(row.job))]
  return [...rows].sort(
    (a, b) =>
      rung(a) - rung(b) ||
      a.job.openedAt.localeCompare(b.job.openedAt) ||
      a.job.id.localeCompare(b.job.id),
  )
}
