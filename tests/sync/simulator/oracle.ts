// Who may hold what, worked out apart from the pull's SQL: plain reads of the tables, and the table of
// docs/spec/data.md ("What a pull holds") as a program.
import type pg from 'pg'
import type { Role } from '@/lib/model/role'

type Row = { id: string }
type JobRow = Row & {
  state: string
  opened_by: string
  left_field_at: string | null
  merged_root: string | null
}
type OfJob = Row & { job_id: string }

/** The rows of a shop that are there, as far as a scope asks for them. */
export type ShopFacts = {
  shopId: string
  epoch: string
  seq: number
  people: Row[]
  models: Row[]
  machines: Row[]
  meters: Row[]
  bags: (Row & { person_id: string })[]
  jobs: JobRow[]
  assigned: { job_id: string; person_id: string }[]
  entries: OfJob[]
  requests: OfJob[]
  photos: OfJob[]
  members: { person_id: string; roles: Role[]; scope_version: number }[]
}

const ROWS = (columns: string, table: string, where = 'true') =>
  `(select coalesce(json_agg(t), '[]') from (select ${columns} from ${table} where shop_id = $1 and ${where}) t)`
const PRESENT = 'deleted_at is null'

/** The last change number: the counter's, or what a wrong counter falls short of. */
const LAST = `greatest(seq, (select max(l.seq) from change_log l where l.shop_id = $1))::float8 as seq`

const FACTS = `select epoch, ${LAST},
  ${ROWS('id', 'person', PRESENT)} as people,
  ${ROWS('id', 'machine_model', PRESENT)} as models,
  ${ROWS('id', 'machine', PRESENT)} as machines,
  ${ROWS('id', 'meter_profile', PRESENT)} as meters,
  ${ROWS('id, person_id', 'bag', PRESENT)} as bags,
  ${ROWS('id, state, opened_by, left_field_at, merged_root', 'job', PRESENT)} as jobs,
  ${ROWS('job_id, person_id', 'job_assignment')} as assigned,
  ${ROWS('id, job_id', 'log_entry')} as entries,
  ${ROWS('id, job_id', 'part_request', PRESENT)} as requests,
  ${ROWS('hash as id, job_id', 'photo')} as photos,
  ${ROWS('person_id, roles, scope_version', 'membership', 'revoked_at is null')} as members
  from shop_counter where shop_id = $1`

/** Where the shop stands, and this person's scope version; null for one who is no member. */
export async function readStand(
  admin: pg.Client,
  shopId: string,
  personId: string,
): Promise<{ epoch: string; seq: number; scope: number | null }> {
  const { rows } = await admin.query(
    `select epoch, ${LAST}, (select scope_version from membership
       where shop_id = $1 and person_id = $2 and revoked_at is null) as scope
     from shop_counter where shop_id = $1`,
    [shopId, personId],
  )
  return rows[0]
}

export async function readFacts(admin: pg.Client, shopId: string): Promise<ShopFacts> {
  const { rows } = await admin.query(FACTS, [shopId])
  return { ...rows[0], shopId }
}

/** Keys (`entity/id`) of everything this person's phone has to hold; empty for one who is no member. */
export function visibleTo(facts: ShopFacts, personId: string): Set<string> {
  const roles = facts.members.find((member) => member.person_id === personId)?.roles ?? []
  const held = new Set<string>()
  const hold = (entity: string, rows: readonly Row[]) => {
    for (const { id } of rows) held.add(`${entity}/${id}`)
  }
  if (roles.length === 0) return held
  const all = roles.some((role) => role === 'dispatcher' || role === 'owner')
  const field = all || roles.some((role) => role === 'mechanic' || role === 'guide')
  hold('shop', [{ id: facts.shopId }])
  hold('person', facts.people)
  hold('machineModel', facts.models)
  hold('machine', facts.machines)
  if (field) hold('meterProfile', facts.meters)
  if (field)
    hold(
      'bag',
      facts.bags.filter((bag) => all || bag.person_id === personId),
    )
  const jobs = field ? facts.jobs.filter((job) => all || isOnPhone(facts, job, personId)) : []
  const known = new Set(jobs.map((job) => job.id))
  const ofKnown = (rows: readonly OfJob[]) => rows.filter((row) => known.has(row.job_id))
  hold('job', jobs)
  hold('logEntry', ofKnown(facts.entries))
  hold('photo', ofKnown(facts.photos))
  hold('partRequest', all || roles.includes('parts') ? facts.requests : ofKnown(facts.requests))
  return held
}

/** Keys of what hangs on those of these jobs that are closed: a phone may let go of it for room (P21). */
export function keysOf(facts: ShopFacts, jobIds: readonly string[]): Set<string> {
  const closed = facts.jobs.filter((job) => job.state === 'closed' && jobIds.includes(job.id))
  const ids = new Set(closed.map((job) => job.id))
  const of = (entity: string, rows: readonly OfJob[]) =>
    rows.filter((row) => ids.has(row.job_id)).map((row) => `${entity}/${row.id}`)
  return new Set([
    ...closed.map((job) => `job/${job.id}`),
    ...of('logEntry', facts.entries),
    ...of('photo', facts.photos),
    ...of('partRequest', facts.requests),
  ])
}

/**
 * Own jobs until they leave the field; jobs of nobody while they are not closed. Of merged jobs the one
 * that goes on decides, and it is everybody's who opened one of them.
 */
function isOnPhone(facts: ShopFacts, job: JobRow, personId: string): boolean {
  const root = job.merged_root ?? job.id
  const lead = facts.jobs.find((one) => one.id === root)
  if (lead === undefined || lead.left_field_at !== null) return false
  const hands = facts.assigned.filter((one) => one.job_id === root)
  const family = facts.jobs.filter((one) => one.id === root || one.merged_root === root)
  const isOwn =
    family.some((one) => one.opened_by === personId) ||
    hands.some((one) => one.person_id === personId)
  return isOwn || (lead.state !== 'closed' && hands.length === 0)
}
