import { type Selectable, type SqlBool, sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type {
  Job,
  JobMachineState,
  JobOpening,
  JobState,
  PeopleState,
  WayOut,
} from '@/lib/model/job'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'
import type { JobTable } from '../tables/job'
import { type AlsoEnteredRow, alsoEnteredOf } from './field-history'

/** How a job stands: its three states beside each other, and the way out. */
export type JobStand = {
  state: JobState
  peopleState: PeopleState
  machineState: JobMachineState
  wayOut: WayOut | null
}

/** A job to be stored: `number` from takeJobNumbers; `openedOn` null when the desk opened it. */
export type NewJob = {
  opening: JobOpening
  stand: JobStand
  number: string
  openedBy: Id
  openedOn: Id | null
  receivedAt: Instant
}

/** Stores jobs under their own ids. Take a change number (job) for each. */
export async function insertJobs(tx: ShopTx, jobs: readonly NewJob[]): Promise<void> {
  if (jobs.length === 0) return
  await tx
    .insertInto('job')
    .values(
      jobs.map(({ opening, stand, ...rest }) => ({
        shopId: tx.shopId,
        ...opening,
        people: JSON.stringify(opening.people),
        place: opening.place === null ? null : JSON.stringify(opening.place),
        complaint: JSON.stringify(opening.complaint),
        before: JSON.stringify(opening.before),
        ...stand,
        ...rest,
        closedAt: stand.state === 'closed' ? rest.receivedAt : null,
        closedOn: stand.state === 'closed' ? rest.openedOn : null,
      })),
    )
    .execute()
}

/** Answers a job; undefined when it is not this shop's or was deleted. */
export async function findJob(tx: ShopTx, id: Id): Promise<Job | undefined> {
  return (await jobsById(tx, [id]))[0]
}

/** Answers the job that goes on for this one: itself, unless it was merged (R13). */
export async function findLeadJob(tx: ShopTx, id: Id): Promise<Job | undefined> {
  const job = await findJob(tx, id)
  return job?.mergedInto === undefined ? job : await findJob(tx, job.mergedInto)
}

/** Answers the jobs with these ids that are there, in no order. */
export async function jobsById(tx: ShopTx, ids: readonly Id[]): Promise<Job[]> {
  if (ids.length === 0) return []
  return (await jobs(tx).where('id', 'in', ids).execute()).map(toJob)
}

/** Answers the shop's jobs, the newest first: those not closed, or with `closed` up to `limit` closed ones. */
export async function listJobs(
  tx: ShopTx,
  { closed = false, limit = 500 }: { closed?: boolean; limit?: number } = {},
): Promise<Job[]> {
  const rows = await jobs(tx)
    .where('state', closed ? '=' : '!=', 'closed')
    .where('mergedInto', 'is', null)
    .orderBy('openedAt', 'desc')
    .orderBy('id', 'desc')
    .limit(limit)
    .execute()
  return rows.map(toJob)
}

/** Answers which of these jobs are closed and were closed by this phone itself. */
export async function jobsClosedOn(
  tx: ShopTx,
  { deviceId, ids }: { deviceId: Id; ids: readonly Id[] },
): Promise<Set<Id>> {
  if (ids.length === 0) return new Set()
  const rows = await tx
    .selectFrom('job')
    .select('id')
    .where('shopId', '=', tx.shopId)
    .where('id', 'in', ids)
    .where('closedOn', '=', deviceId)
    .execute()
  return new Set(rows.map((row) => row.id))
}

/**
 * Stores how a job stands now. `by` says which phone did it (null: the desk) and when it was received.
 * Take a change number (job), with `whole` when it was closed or reopened.
 */
export async function setJobStand(
  tx: ShopTx,
  { id, stand, by }: { id: Id; stand: JobStand; by: { deviceId: Id | null; at: Instant } },
): Promise<void> {
  const isClosed = stand.state === 'closed'
  await tx
    .updateTable('job')
    .set({
      state: stand.state,
      peopleState: stand.peopleState,
      machineState: stand.machineState,
      wayOut: stand.wayOut,
      closedAt: isClosed ? sql`coalesce(closed_at, ${by.at}::timestamptz)` : null,
      closedOn: isClosed
        ? sql`case when closed_at is null then ${by.deviceId}::uuid else closed_on end`
        : null,
      ...(isClosed ? {} : { leftFieldAt: null }),
    })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', id)
    .execute()
}

/** Puts a job into a person's hands; twice is once. Take a change number (job, whole). */
export async function assignJob(
  tx: ShopTx,
  { jobId, personId }: { jobId: Id; personId: Id },
): Promise<void> {
  await tx
    .insertInto('jobAssignment')
    .values({ shopId: tx.shopId, jobId, personId })
    .onConflict((on) => on.doNothing())
    .execute()
}

/** Takes a job out of a person's hands. Take a change number (job, whole). */
export async function unassignJob(
  tx: ShopTx,
  { jobId, personId }: { jobId: Id; personId: Id },
): Promise<void> {
  await tx
    .deleteFrom('jobAssignment')
    .where('shopId', '=', tx.shopId)
    .where('jobId', '=', jobId)
    .where('personId', '=', personId)
    .execute()
}

/**
 * Takes jobs closed before `closedBefore` (60 days ago) off the phones and answers their ids (R22).
 * Take a change number (job, whole) for each.
 */
export async function leaveField(
  tx: ShopTx,
  { closedBefore, now }: { closedBefore: Instant; now: Instant },
): Promise<Id[]> {
  const rows = await tx
    .updateTable('job')
    .set({ leftFieldAt: now })
    .where('shopId', '=', tx.shopId)
    .where('state', '=', 'closed')
    .where('closedAt', '<', closedBefore)
    .where('leftFieldAt', 'is', null)
    .returning('id')
    .execute()
  return rows.map((row) => row.id)
}

/**
 * The SQL of "this job belongs on this person's phone" (R22), for the pull: own (opened by or assigned
 * to them), until it left the field; or not closed and in nobody's hands. A merged job goes with the one
 * that goes on, and is theirs who opened any of them. lib/shop/scope.ts says the same of an op. `jobId` is
 * a column.
 */
export function onPhoneOf(
  { shopId, personId }: { shopId: Id; personId: Id },
  jobId: ReturnType<typeof sql.ref>,
) {
  return sql<SqlBool>`exists (
    select 1 from job j
    join job s on s.shop_id = j.shop_id and s.id = coalesce(j.merged_root, j.id)
    where j.shop_id = ${shopId} and j.id = ${jobId} and s.left_field_at is null and (
      s.opened_by = ${personId}
      or exists (select 1 from job_assignment a
        where a.shop_id = s.shop_id and a.job_id = s.id and a.person_id = ${personId})
      or (s.state <> 'closed' and not exists (select 1 from job_assignment a
        where a.shop_id = s.shop_id and a.job_id = s.id))
      or exists (select 1 from job m
        where m.shop_id = s.shop_id and m.merged_root = s.id and m.opened_by = ${personId})
    )
  )`
}

const jobs = (tx: ShopTx) =>
  tx
    .selectFrom('job')
    .selectAll()
    .select((eb) =>
      sql<Id[]>`array(${eb
        .selectFrom('jobAssignment as a')
        .select('a.personId')
        .whereRef('a.shopId', '=', 'job.shopId')
        .whereRef('a.jobId', '=', 'job.id')
        .orderBy('a.assignedAt')
        .orderBy('a.personId')})`.as('assignedTo'),
    )
    .select(() => [
      alsoEnteredOf(tx, sql.ref('job.id')).as('alsoEntered'),
      membersOf(tx).as('members'),
    ])
    .where('shopId', '=', tx.shopId)
    .where('deletedAt', 'is', null)

/** Ids and openers of the jobs that were merged into this one; null for none. */
export const membersOf = (tx: ShopTx) =>
  sql<{ id: Id; openedBy: Id }[] | null>`(select jsonb_agg(
      jsonb_build_object('id', m.id, 'openedBy', m.opened_by) order by m.opened_at, m.id)
    from job m where m.shop_id = ${tx.shopId} and m.merged_root = job.id)`

type JobRow = Selectable<JobTable> & { assignedTo: Id[] } & Merges
type Merges = Pick<Selectable<JobTable>, 'mergedRoot'> & {
  alsoEntered: AlsoEnteredRow[] | null
  members: { id: Id; openedBy: Id }[] | null
}

/** What a job's row says of merges and of values that did not stand; nothing where there are none. */
export const mergesOf = ({ mergedRoot, members, alsoEntered }: Merges) => ({
  ...(mergedRoot === null ? {} : { mergedInto: mergedRoot }),
  ...(members === null
    ? {}
    : {
        mergedFrom: members.map((member) => member.id),
        alsoOpenedBy: [...new Set(members.map((member) => member.openedBy))],
      }),
  ...(alsoEntered === null ? {} : { alsoEntered }),
})

/** A stored job in the words of the model. */
export const toJob = (row: JobRow): Job => ({
  id: row.id,
  machineId: row.machineId,
  people: row.people,
  place: row.place,
  complaint: row.complaint,
  before: row.before,
  airTempC: row.airTempC,
  weather: row.weather,
  openedAt: row.openedAt,
  zone: row.zone,
  number: row.number,
  state: row.state,
  peopleState: row.peopleState,
  machineState: row.machineState,
  wayOut: row.wayOut,
  openedBy: row.openedBy,
  assignedTo: row.assignedTo,
  ...mergesOf(row),
})
