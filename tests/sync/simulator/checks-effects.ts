// What the shop has done with the field's work: each op once, nothing without an op, in order.
import type { Op } from '@/lib/sync/protocol/op'
import { breaks } from './broken-rule'
import type { SimShop } from './shop-set'
import type { World } from './world'

type StoredOp = { op_id: string; kind: string; raw: string; outcome: string; device_id: string }

/** P4: every taken op had its effect, every row of the field has its op, and nothing happened twice. */
export async function holdEffects(world: World, shop: SimShop): Promise<void> {
  const { rows: stored } = await world.admin.query<StoredOp>(
    'select op_id, kind, raw, outcome, device_id from sync_op where shop_id = $1',
    [shop.id],
  )
  for (const row of stored) {
    if (!world.ledger.ops.has(row.op_id)) breaks('opFromNowhere', `${row.kind} ${row.op_id}`)
  }
  const taken = stored.filter((row) => row.outcome === 'accepted' || row.outcome === 'merged')
  const ops = taken.map((row) => JSON.parse(row.raw) as Op)
  await holdRows(world, shop, ops)
  await holdLines(world, shop, ops)
  await holdValues(world, shop, ops)
  await holdSteps(world, shop, ops)
  if (world.restores === 0) await holdOrder(world, shop, ops)
}

/** Which table keeps what an op of that kind adds. */
const TABLES = {
  'log.add': 'log_entry',
  'job.open': 'job',
  'machine.add': 'machine',
  'partRequest.ask': 'part_request',
  'advice.keep': 'advice',
} as const

async function holdRows(world: World, shop: SimShop, ops: readonly Op[]): Promise<void> {
  for (const [kind, table] of Object.entries(TABLES)) {
    const { rows } = await world.admin.query<{ id: string }>(
      `select id from ${table} where shop_id = $1`,
      [shop.id],
    )
    const there = new Set(rows.map((row) => row.id))
    const written = ops.filter((op) => op.kind === kind).map((op) => op.entityId)
    const lost = written.filter((id) => !there.has(id))
    if (lost.length > 0) breaks('acknowledgedIsThere', `no ${table} of ${kind} ${lost.join(' ')}`)
    if (written.length !== new Set(written).size) breaks('once', `two ${kind} with one id`)
    // Machines are added at the desk as well.
    const ghosts = kind === 'machine.add' ? [] : [...there].filter((id) => !written.includes(id))
    if (ghosts.length > 0) breaks('noGhosts', `${table} without an op: ${ghosts.join(' ')}`)
  }
}

/** How many of each line were asked for, all told. */
function wantedOf(ops: readonly Op[]): Map<string, number> {
  const wanted = new Map<string, number>()
  const add = (id: string, by: number) => wanted.set(id, (wanted.get(id) ?? 0) + by)
  for (const op of ops) {
    if (op.kind === 'partLine.quantity') add(op.fields.lineId, op.fields.by)
    if (op.kind === 'partLine.add') add(op.fields.line.id, op.fields.line.quantity)
    const lines = op.kind === 'partRequest.ask' ? op.fields.lines : []
    for (const line of lines) add(line.id, line.quantity)
  }
  return wanted
}

/** Quantities: as asked for, and changed by every taken change once; no line is lost or there twice. */
async function holdLines(world: World, shop: SimShop, ops: readonly Op[]): Promise<void> {
  const wanted = wantedOf(ops)
  const { rows } = await world.admin.query<{ id: string; counted: number }>(
    'select id, coalesce(wanted, quantity) as counted from part_line where shop_id = $1',
    [shop.id],
  )
  for (const { id, counted } of rows) {
    if (wanted.get(id) !== counted) breaks('once', `line ${id}: ${counted}, not ${wanted.get(id)}`)
  }
  if (rows.length !== wanted.size) breaks('once', `${rows.length} lines, not ${wanted.size}`)
}

type Column = { entity: string; column: string; value: string; written: string | null }
const COLUMNS = {
  job: {
    complaintWords: "complaint ->> 'words'",
    airTempC: 'air_temp_c::text',
    weather: 'weather',
  },
  machine: {
    hours: 'hours::text',
    unitNumber: 'unit_number',
    serial: 'serial',
    year: 'year::text',
  },
}

/** M1, M2: every taken value is kept once, one of each field stands, and it is the one in the row. */
async function holdValues(world: World, shop: SimShop, ops: readonly Op[]): Promise<void> {
  const { rows: history } = await world.admin.query<{ id: string; entity_id: string }>(
    'select id, entity_id from field_history where shop_id = $1',
    [shop.id],
  )
  const kept = new Set(history.map((row) => `${row.entity_id} ${row.id}`))
  for (const op of ops) {
    if (op.kind !== 'job.set' && op.kind !== 'machine.set') continue
    if (!kept.has(`${op.entityId} ${op.id}`))
      breaks('valuesAreKept', `${op.kind} ${op.id} is nowhere`)
  }
  for (const [table, columns] of Object.entries(COLUMNS)) {
    for (const [field, column] of Object.entries(columns)) {
      const { rows } = await world.admin.query<Column>(
        `select h.entity_id as entity, (h.value ->> 'is') as value, t.${column} as written
         from field_history h join ${table} t on t.shop_id = h.shop_id and t.id = h.entity_id
         where h.shop_id = $1 and h.field = $2 and h.state = 'current'
           and (h.value ->> 'is') is distinct from (${column})`,
        [shop.id, field],
      )
      const [wrong] = rows
      if (wrong)
        breaks('valuesStand', `${table} ${wrong.entity} ${field}: ${JSON.stringify(wrong)}`)
    }
  }
}

type Step = { action: string; entity_id: string; detail: { from?: string; to?: string } }
const STATES = { job: 'state', people: 'people_state', machine: 'machine_state' } as const
const FIRST = { job: 'open', people: 'withMachine', machine: 'stranded' } as const
type Track = keyof typeof STATES
type JobRow = { id: string } & Record<(typeof STATES)[Track], string>
const TRACKS = ['job', 'people', 'machine'] as const
const trackOf = (action: string): Track =>
  action === 'job.people' ? 'people' : action === 'job.machine' ? 'machine' : 'job'

/** The audit trail tells each job's way from its opening to where it stands, every step once. */
async function holdSteps(world: World, shop: SimShop, ops: readonly Op[]): Promise<void> {
  const { rows: steps } = await world.admin.query<Step>(
    `select action, entity_id, detail from audit_entry
     where shop_id = $1 and entity = 'job' and action = any($2) order by chain, order_no`,
    [shop.id, ['job.move', 'job.people', 'job.machine', 'job.assign', 'job.unassign']],
  )
  const { rows: jobs } = await world.admin.query<JobRow>(
    'select id, state, people_state, machine_state from job where shop_id = $1',
    [shop.id],
  )
  for (const job of jobs) {
    holdWay(
      job,
      steps.filter((step) => step.entity_id === job.id),
    )
  }
  // Of merged jobs a step is told in both.
  if (world.hasMerged) return
  for (const kind of ['job.people', 'job.machine'] as const) {
    const taken = ops.filter((op) => op.kind === kind).length
    const told = steps.filter((step) => step.action === kind).length
    if (taken !== told) breaks('once', `${taken} taken ${kind}, ${told} steps told`)
  }
}

/** Each step begins where the one before ended. */
function holdWay(job: JobRow, steps: readonly Step[]): void {
  const now: Record<Track, string> = { ...FIRST }
  for (const { action, detail } of steps) {
    const track = trackOf(action)
    if (now[track] !== detail.from) {
      breaks('once', `job ${job.id}: ${action} from ${detail.from}, but it stood at ${now[track]}`)
    }
    now[track] = detail.to ?? ''
  }
  for (const track of TRACKS) {
    const is = job[STATES[track]]
    if (now[track] !== is) breaks('once', `job ${job.id}: ${track} is ${is}, told ${now[track]}`)
  }
}

/** The entries of one phone stand in a job in the order in which they were written. */
async function holdOrder(world: World, shop: SimShop, ops: readonly Op[]): Promise<void> {
  const dseqs = new Map(ops.map((op) => [op.entityId, op.dseq]))
  const { rows } = await world.admin.query<{ id: string; job_id: string; device_id: string }>(
    `select e.id, e.job_id, e.device_id from log_entry e
       join sync_op o on o.shop_id = e.shop_id and o.entity_id = e.id::text and o.kind = 'log.add'
     where e.shop_id = $1 and o.settled_at = o.received_at
       and not exists (select from quarantine_op q where q.shop_id = o.shop_id and q.op_id = o.op_id)
     order by e.job_id, e.order_no`,
    [shop.id],
  )
  const last = new Map<string, number>()
  for (const row of rows) {
    const of = `${row.job_id} ${row.device_id}`
    const dseq = dseqs.get(row.id) ?? 0
    if (dseq < (last.get(of) ?? 0)) {
      breaks('order', `job and phone ${of}: number ${dseq} stands after ${last.get(of)}`)
    }
    last.set(of, dseq)
  }
}
