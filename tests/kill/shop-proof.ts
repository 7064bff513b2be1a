// What must hold at the shop, looked at past the product: by the database's superuser, in plain SQL.
import pg from 'pg'
import { asShop } from '@/db/client'
import { verifyAudit } from '@/db/queries/audit'
import { verifyLog } from '@/db/queries/log-entries'
import type { Op } from '@/lib/sync/protocol/op'
import type { FieldHand } from './field-hand'
import { broken } from './tally'

export type Ask = <T extends object>(text: string, values: unknown[]) => Promise<T[]>

/** A connection of its own for each look, as the database may have been away since the last one. */
export async function looking<T>(adminUrl: string, look: (ask: Ask) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: adminUrl })
  await client.connect()
  try {
    return await look(async (text, values) => (await client.query(text, values)).rows)
  } finally {
    await client.end()
  }
}

/**
 * Nothing acknowledged is lost: every op that a phone has an answer for is there, taken. Answers how many of
 * the unanswered ops the shop had taken all the same.
 */
export async function holdAcknowledged(
  ask: Ask,
  shopId: string,
  hands: readonly FieldHand[],
): Promise<number> {
  const rows = await ask<{ op_id: string; outcome: string }>(
    'select op_id, outcome from sync_op where shop_id = $1',
    [shopId],
  )
  const taken = new Set(rows.flatMap((row) => (row.outcome === 'accepted' ? [row.op_id] : [])))
  for (const hand of hands) {
    const lost = [...hand.acknowledged].filter((id) => !taken.has(id))
    if (lost.length > 0) broken('P4', `${lost.length} acknowledged ops are lost: ${lost[0]} ..`)
  }
  return hands.flatMap((hand) => hand.unsure).filter((op) => taken.has(op.id)).length
}

/** Once everything is sent: each op once, with its effect once, and nothing beside them. */
export async function holdOnce(
  ask: Ask,
  shopId: string,
  hands: readonly FieldHand[],
): Promise<void> {
  const ops = hands.flatMap((hand) => hand.made)
  const devices = hands.map((hand) => hand.device.id)
  const stored = await ask<{ op_id: string; dseq: number; device_id: string; raw: string }>(
    'select op_id, dseq::int, device_id, raw from sync_op where shop_id = $1 and device_id = any($2)',
    [shopId, devices],
  )
  same(
    'P4',
    'ops',
    ops.map((op) => op.id),
    stored.map((row) => row.op_id),
  )
  for (const hand of hands) {
    const numbers = stored.filter((row) => row.device_id === hand.device.id).map((row) => row.dseq)
    same(
      'P2',
      'op numbers',
      hand.made.map((op) => op.dseq),
      numbers,
    )
  }
  await holdRows(ask, shopId, { ops, devices })
  await holdCounted(ask, shopId, ops)
}

const TABLES = {
  'log.add': ['log_entry', 'device_id'],
  'job.open': ['job', 'opened_on'],
  'partRequest.ask': ['part_request', 'asked_on'],
  'advice.keep': ['advice', 'device_id'],
} as const

/** Every row of the field has its op, and every op its row. */
async function holdRows(
  ask: Ask,
  shopId: string,
  of: { ops: readonly Op[]; devices: readonly string[] },
): Promise<void> {
  for (const [kind, [table, device]] of Object.entries(TABLES)) {
    const rows = await ask<{ id: string }>(
      `select id from ${table} where shop_id = $1 and ${device} = any($2)`,
      [shopId, of.devices],
    )
    const added = of.ops.filter((op) => op.kind === kind).map((op) => op.entityId)
    same(
      'P4',
      table,
      added,
      rows.map((row) => row.id),
    )
  }
  const sets = of.ops.filter((op) => op.kind === 'machine.set').map((op) => op.id)
  const history = await ask<{ id: string }>(
    'select id from field_history where shop_id = $1 and id = any($2)',
    [shopId, sets],
  )
  same(
    'M1',
    'values written',
    sets,
    history.map((row) => row.id),
  )
}

/** Pieces asked for: what each op counted is counted once. */
async function holdCounted(ask: Ask, shopId: string, ops: readonly Op[]): Promise<void> {
  const wanted = new Map<string, number>()
  for (const op of ops) {
    if (op.kind === 'partRequest.ask')
      for (const line of op.fields.lines) wanted.set(line.id, line.quantity)
    if (op.kind === 'partLine.quantity') {
      const { lineId, by } = op.fields
      wanted.set(lineId, (wanted.get(lineId) ?? 0) + by)
    }
  }
  const rows = await ask<{ id: string; counted: number }>(
    'select id, coalesce(wanted, quantity)::int as counted from part_line where shop_id = $1 and id = any($2)',
    [shopId, [...wanted.keys()]],
  )
  const counted = rows.map((row) => `${row.id} ${row.counted}`)
  same(
    'P4',
    'pieces',
    [...wanted].map(([id, count]) => `${id} ${count}`),
    counted,
  )
}

/** Change numbers run from 1 without a hole, the counter is not ahead of them, and every row has one. */
export async function holdDense(ask: Ask, shopId: string): Promise<number> {
  const [log] = await ask<{ count: number; last: number; counter: number }>(
    `select count(*)::int as count, coalesce(max(seq), 0)::int as last,
       (select seq::int from shop_counter where shop_id = $1) as counter
     from change_log where shop_id = $1`,
    [shopId],
  )
  if (log === undefined || log.count !== log.last || log.last !== log.counter)
    return broken('P7', `change numbers are not dense: ${JSON.stringify(log)}`)
  const unnumbered = await ask<{ id: string }>(
    `select id from log_entry e where shop_id = $1 and not exists (select from change_log c
       where c.shop_id = $1 and c.entity_id = e.id::text and c.entity = 'logEntry')`,
    [shopId],
  )
  if (unnumbered.length > 0) broken('P7', `${unnumbered.length} entries without a change number`)
  return log.last
}

/** The log and the audit trail of each job are whole chains (R23). */
export async function holdChains(shopId: string, jobIds: readonly string[]): Promise<void> {
  await asShop(shopId, async (tx) => {
    for (const id of jobIds) {
      const [log, audit] = [await verifyLog(tx, id), await verifyAudit(tx, id)]
      if (!log.ok) broken('R23', `log of ${id}: ${JSON.stringify(log.problem)}`)
      if (!audit.ok) broken('R23', `audit of ${id}: ${JSON.stringify(audit.problem)}`)
    }
    const whole = await verifyAudit(tx, null)
    if (!whole.ok) broken('R23', `audit of the shop: ${JSON.stringify(whole.problem)}`)
  })
}

/** What a phone wrote has come back to it. */
export function holdSeen(hand: FieldHand): void {
  const lost = hand.made.flatMap((op) => {
    const entity = SEEN[op.kind as keyof typeof SEEN]
    return entity === undefined || hand.seen.has(`${entity}/${op.entityId}`) ? [] : [op.entityId]
  })
  if (lost.length > 0) broken('P7', `${lost.length} rows never came back: ${lost[0]} ..`)
}
const SEEN = {
  'log.add': 'logEntry',
  'job.open': 'job',
  'machine.add': 'machine',
  'partRequest.ask': 'partRequest',
} as const

/** Fails unless both lists hold the same, each once. */
export function same(
  rule: string,
  what: string,
  wanted: readonly (string | number)[],
  found: readonly (string | number)[],
): void {
  const [left, right] = [new Set(wanted), new Set(found)]
  const lost = [...left].filter((one) => !right.has(one))
  const extra = [...right].filter((one) => !left.has(one))
  const twice = found.length - right.size
  if (lost.length + extra.length + twice === 0) return
  broken(
    rule,
    `${what}: ${lost.length} lost (${lost.slice(0, 2)}), ${extra.length} too many (${extra.slice(0, 2)}), ${twice} twice`,
  )
}
