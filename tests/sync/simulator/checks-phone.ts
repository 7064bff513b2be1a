// What must hold on a phone after every step.
import canonicalize from 'canonicalize'
import { droppedJobs } from '@/lib/sync/client/free-room'
import { type OutboxRecord, readMeta } from '@/lib/sync/client/phone-db'
import type { Op } from '@/lib/sync/protocol/op'
import { breaks } from './broken-rule'
import type { Handset, Tab } from './handset'
import type { Recorded } from './ledger'
import { keysOf, readFacts, readStand, visibleTo } from './oracle'
import type { World } from './world'

/** How long a taken op is kept for a restore (docs/spec/sync.md, P12), ms. */
const KEPT_MS = 7 * 24 * 3_600_000
/** Refusals that the rules of the shop explain. */
const EXPLAINED = new Set(['stale_status', 'forbidden'])
/** An epoch as a cursor carries it may say how far back its log is whole. */
const epochOf = (cursor: { epoch: string } | null | undefined) => cursor?.epoch.split('.')[0]

/** Takes down what the phone in this person's hands now holds, and holds it to what it held before. */
export async function lookAtPhone(world: World, handset: Handset): Promise<void> {
  const trouble = handset.troubles[0]
  if (trouble !== undefined) breaks('storeFails', `${handset.name}: ${trouble}`)
  const tab = await handset.tab()
  const key = world.storeKey(handset)
  const records = await tab.phone.core.db.outbox.orderBy('dseq').toArray()
  const fresh = await takeDown(world, { key, tab, records })
  settlePending(world, key, fresh)
  await holdNumbers(world, tab, key)
  holdKept(world, key, records)
  await holdAcknowledged(world, { key, tab, records })
  await holdCursor(world, key, tab)
}

type Look = { key: string; tab: Tab; records: OutboxRecord[] }

async function takeDown(world: World, { key, tab, records }: Look): Promise<Recorded[]> {
  const { core } = tab.phone
  const fresh: Recorded[] = []
  for (const record of records) {
    const known = world.ledger.ops.get(record.opId)
    if (known !== undefined) {
      if (known.store !== key) breaks('onlyOwnWork', `${record.opId} of ${known.store} in ${key}`)
      known.state = record.state
      known.reason = record.reason
      continue
    }
    const op: Op = await core.cache.op(core.keys.outbox, record)
    const { state, reason } = record
    const made = { op, store: key, state, reason, isOdd: false, takenAt: record.takenAt }
    world.ledger.ops.set(record.opId, made)
    fresh.push(made)
  }
  return fresh
}

const textOf = (op: { kind: string; fields: unknown }) => canonicalize([op.kind, op.fields]) ?? ''

/** P1: what was kept in one call is there whole; what was not, is not there at all. */
function settlePending(world: World, key: string, fresh: readonly Recorded[]): void {
  const left = [...fresh]
  const { ledger } = world
  for (const pending of ledger.pending.filter((one) => one.store === key)) {
    const found = pending.made.ops.map((op) => {
      const at = left.findIndex((recorded) => textOf(recorded.op) === textOf(op))
      return at === -1 ? undefined : left.splice(at, 1)[0]
    })
    const there = found.filter((one) => one !== undefined)
    if (pending.isKept && there.length < found.length) {
      breaks(
        'keptIsThere',
        `${key}: ${there.length} of ${found.length} ops of one record are there`,
      )
    }
    if (there.length > 0 && there.length < found.length) {
      breaks('allOrNothing', `${key}: ${there.length} of ${found.length} ops of a cut record`)
    }
    for (const one of there) one.isOdd = pending.made.isOdd === true
    if (there.length > 0) notePhotos(world, key, pending.made.photos ?? [], there)
  }
  ledger.pending = ledger.pending.filter((one) => one.store !== key)
  if (left.length > 0) breaks('opFromNowhere', `${key}: ${left.map((one) => one.op.kind).join()}`)
}

function notePhotos(
  world: World,
  key: string,
  photos: readonly { hash: string }[],
  ops: readonly Recorded[],
): void {
  for (const { hash } of photos) {
    const entry = ops.find(({ op }) => op.kind === 'log.add' && op.fields.body.kind === 'photo')
    if (entry) world.ledger.store(key).photos.set(hash, entry.op.id)
  }
}

/** P2: numbers 1, 2, 3 .. without a hole, none twice. */
async function holdNumbers(world: World, tab: Tab, key: string): Promise<void> {
  const last = (await readMeta(tab.phone.core.db, 'stamp'))?.dseq ?? 0
  const given = world.ledger.of(key).map((recorded) => recorded.op.dseq)
  given.sort((a, b) => a - b)
  const isWhole = given.length === last && given.every((dseq, index) => dseq === index + 1)
  if (!isWhole) breaks('numbers', `${key}: up to ${last}, given out ${given.join(',')}`)
}

/** No op ever leaves the outbox before the shop has had it for a week. */
function holdKept(world: World, key: string, records: readonly OutboxRecord[]): void {
  const there = new Set(records.map((record) => record.opId))
  for (const recorded of world.ledger.of(key)) {
    const { op, state, takenAt } = recorded
    if (there.has(op.id) || world.ledger.store(key).isEmptied) continue
    const isOld = state === 'done' && world.truth.now() - (takenAt ?? 0) > KEPT_MS
    if (!isOld) breaks('nothingVanishes', `${key}: ${op.kind} ${op.id} (${state}) is gone`)
  }
  for (const record of records) {
    const recorded = world.ledger.ops.get(record.opId)
    if (recorded) recorded.takenAt = record.takenAt === null ? null : world.truth.now()
  }
}

type Stored = { op_id: string; outcome: string; code: string | null }

/** P4, P6: what the phone was told is what the shop has written down. */
async function holdAcknowledged(world: World, { key, tab, records }: Look): Promise<void> {
  const settled = records.filter(({ state }) => state !== 'waiting' && state !== 'blocked')
  const cursor = await readMeta(tab.phone.core.db, 'cursor')
  const { rows } = await world.admin.query<Stored>(
    `select op_id, outcome, code from sync_op where shop_id = $1 and op_id = any($2)
     union all
     select op_id, 'quarantined', null from quarantine_op where shop_id = $1 and op_id = any($2)
       and op_id not in (select op_id from sync_op where shop_id = $1)`,
    [tab.user.shop.id, settled.map((record) => record.opId)],
  )
  const stored = new Map(rows.map((row) => [row.op_id, row]))
  const { epoch } = await readStand(world.admin, tab.user.shop.id, tab.user.person.id)
  for (const record of settled) {
    const row = stored.get(record.opId)
    const what = `${key}: ${record.kind} ${record.opId} is ${record.state} (${record.reason}), the shop says ${row?.outcome ?? 'nothing'}`
    if (record.state === 'stuck') holdRefused(world, record, row, what)
    else if (epochOf(cursor) === epoch && !isTaken(row)) breaks('acknowledgedIsThere', what)
  }
}

const TAKEN = ['accepted', 'merged', 'quarantined']
const isTaken = (row: Stored | undefined) => row !== undefined && TAKEN.includes(row.outcome)

function holdRefused(
  world: World,
  record: OutboxRecord,
  row: Stored | undefined,
  what: string,
): void {
  if (record.reason === null) breaks('refusedSaysWhy', what)
  if (row?.outcome !== 'quarantined' && isTaken(row)) breaks('acceptedIsNotRefused', what)
  if (row?.outcome === 'rejected' && row.code !== record.reason) breaks('sameAnswer', what)
  const recorded = world.ledger.ops.get(record.opId)
  const reason = record.reason ?? ''
  if (recorded?.isOdd || EXPLAINED.has(reason)) return
  if (reason === 'no_parent' && world.hasPruned) return
  breaks('refusedForAReason', `${what}: ${reason} ${record.detail ?? ''}`)
}

/** P7, P8: within an epoch and a scope the cursor only moves on. */
async function holdCursor(world: World, key: string, { phone }: Tab): Promise<void> {
  const { db } = phone.core
  const facts = world.ledger.store(key)
  const cursor = (await readMeta(db, 'cursor')) ?? null
  const gen = (await readMeta(db, 'gen')) ?? 0
  const before = facts.cursor
  const isSame =
    before?.epoch === cursor?.epoch &&
    before?.scopeVersion === cursor?.scopeVersion &&
    facts.gen === gen
  if (before && cursor && isSame && cursor.seq < before.seq) {
    breaks('cursorMovesOn', `${key}: from ${before.seq} back to ${cursor.seq}`)
  }
  facts.cursor = cursor
  facts.gen = gen
}

/** True when the store's cursor says that it holds everything of the shop. */
export async function isEven(world: World, { phone, user }: Tab): Promise<boolean> {
  const cursor = await readMeta(phone.core.db, 'cursor')
  const stand = await readStand(world.admin, user.shop.id, user.person.id)
  return (
    epochOf(cursor) === stand.epoch &&
    cursor?.seq === stand.seq &&
    cursor.scopeVersion === stand.scope
  )
}

/** P7, P11: a store that is even with the shop holds what its person may see, all of it and nothing else. */
export async function holdVisible(world: World, handset: Handset): Promise<boolean> {
  const tab = await handset.tab()
  if (!(await isEven(world, tab))) return false
  const facts = await readFacts(world.admin, tab.user.shop.id)
  world.count('whole pulls compared')
  const rows = await tab.phone.core.db.row.toArray()
  const held = new Set(rows.filter((row) => row.base !== null).map((row) => row.key))
  const visible = visibleTo(facts, tab.user.person.id)
  const letGo = keysOf(facts, await droppedJobs(tab.phone.core.db))
  const missing = [...visible].filter((key) => !held.has(key) && !letGo.has(key)).sort()
  const extra = [...held].filter((key) => !visible.has(key)).sort()
  if (missing.length + extra.length > 0) {
    const said = `misses ${missing.slice(0, 5).join(' ') || 'nothing'}, has too much: ${extra.slice(0, 5).join(' ') || 'nothing'}`
    const first = rows.find((row) => row.key === extra[0])
    const gen = await readMeta(tab.phone.core.db, 'gen')
    const how = first ? `; number ${first.seq}, of pull ${first.gen} of ${gen}` : ''
    breaks('pulledIsVisible', `${world.storeKey(handset)} at ${facts.seq} ${said}${how}`)
  }
  return true
}
