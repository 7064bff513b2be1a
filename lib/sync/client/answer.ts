import type { Cursor, OpResult, PullRow, SyncResponse } from '@/lib/sync/protocol/message'
import { rowsTouched } from './apply-op'
import { commit, noWrites, type Writes } from './commit'
import type { Core } from './core'
import { isStored, readRow } from './entities'
import { receiveHlc } from './hlc'
import { type OutboxRecord, type PhoneDb, type RowRecord, readMeta, rowKey } from './phone-db'
import { isOnTop, type Overlay, readOverlay, rebasedRow } from './rebase'
import { type Sealed, sealJson } from './seal'
import { readCounter } from './stamp'

/**
 * What the shop answered, applied in one transaction: what became of each op, the pulled rows, and the
 * cursor (P8). A kill before it leaves everything as it was; the same answer again changes nothing.
 */
export type Answered = {
  /** Numbers of the ops that were sent. */
  dseqs: readonly number[]
  /** The cursor that was sent. */
  cursor: Cursor | null
  response: SyncResponse
  offsetMs: number
  nowMs: number
}

export type Applied = {
  /** More rows wait at the shop. */
  more: boolean
  /** A newer code book is published. */
  bookChanged: boolean
  wasReset: boolean
}

/** How long a taken op is kept, to be offered again after a restored backup (P12; a choice). */
const KEEP_TAKEN_MS = 7 * 24 * 3600 * 1000

/** Applies an answer to a store that is open. */
export async function applyAnswer(core: Core, of: Answered): Promise<Applied> {
  let applied: Applied = { more: false, bookChanged: false, wasReset: false }
  await commit(core, async () => {
    const plan = new AnswerPlan(core, of)
    const writes = await plan.writes()
    applied = plan.applied
    return writes
  })
  return applied
}

/** What became of the sent ops, by their numbers; ops nothing was said of stay as they are. */
async function outcomesOf(
  db: PhoneDb,
  of: Pick<Answered, 'dseqs' | 'response' | 'nowMs'>,
): Promise<OutboxRecord[]> {
  const results = new Map(of.response.results.map((result) => [result.opId, result]))
  const taken = new Set(of.response.taken)
  const held = await db.outbox.bulkGet([...of.dseqs])
  return held.flatMap((record) => {
    if (record === undefined || record.state === 'taken' || record.state === 'done') return []
    const result = results.get(record.opId)
    if (result !== undefined) return [withResult(record, result, of.nowMs)]
    return taken.has(record.opId) ? [asTaken(record, of.nowMs)] : []
  })
}

const asTaken = (record: OutboxRecord, nowMs: number): OutboxRecord => ({
  ...record,
  state: 'taken',
  reason: null,
  detail: null,
  takenAt: nowMs,
})

function withResult(record: OutboxRecord, result: OpResult, nowMs: number): OutboxRecord {
  switch (result.result) {
    case 'duplicate':
    case 'merged':
      return asTaken(record, nowMs)
    case 'rejected':
      return { ...record, state: 'stuck', reason: result.code, detail: result.detail }
    case 'blocked':
      return { ...record, state: 'blocked', reason: result.on, detail: null }
    case 'retry':
      return { ...record, state: 'waiting', reason: null, detail: null }
  }
}

class AnswerPlan {
  readonly applied: Applied = { more: false, bookChanged: false, wasReset: false }
  readonly #core: Core
  readonly #of: Answered
  readonly #writes: Writes = noWrites()
  readonly #rows = new Map<string, Omit<RowRecord, 'turn'> | null>()
  readonly #changed = new Map<number, OutboxRecord>()

  constructor(core: Core, of: Answered) {
    this.#core = core
    this.#of = of
  }

  async writes(): Promise<Writes> {
    const { db } = this.#core
    for (const record of await outcomesOf(db, this.#of)) this.#changed.set(record.dseq, record)
    const before = [...this.#changed.values()]
    await this.#clocks()
    const { pull } = this.#of.response
    if (pull.kind === 'reset') await this.#reset(pull.cursor)
    const fits = pull.kind === 'page' && (await this.#cursorStands())
    const settled = fits && !pull.more ? await this.#settleTaken() : []
    const overlay = await readOverlay(this.#core, [...this.#changed.values()])
    if (pull.kind === 'page') this.applied.more = pull.more || !fits
    if (fits) await this.#page(pull.rows, overlay, pull.cursor)
    await this.#touchedAgain([...before.filter((record) => !isOnTop(record)), ...settled], overlay)
    if (fits && !pull.more) await this.#sweep(overlay)
    this.#writes.outbox = [...this.#changed.values()]
    for (const [key, row] of this.#rows) {
      if (row === null) this.#writes.dropRows.push(key)
      else this.#writes.rows.push(row)
    }
    return this.#writes
  }

  async #clocks(): Promise<void> {
    const counter = await readCounter(this.#core.db)
    const hlc = receiveHlc(counter.hlc, Date.parse(this.#of.response.serverTime) || 0)
    this.#writes.meta.stamp = { ...counter, hlc }
    this.#writes.meta.clockOffset = this.#of.offsetMs
  }

  /** The page continues from where this store still is: no other tab has applied one meanwhile. */
  async #cursorStands(): Promise<boolean> {
    const held = await readMeta(this.#core.db, 'cursor')
    return JSON.stringify(held ?? null) === JSON.stringify(this.#of.cursor)
  }

  /** Everything is pulled anew; old rows stay shown until the new ones are whole. Unsent work is untouched. */
  async #reset(cursor: Cursor): Promise<void> {
    const { db } = this.#core
    this.applied.wasReset = true
    this.applied.more = true
    this.#writes.meta.cursor = { ...cursor, seq: 0 }
    this.#writes.meta.gen = ((await readMeta(db, 'gen')) ?? 0) + 1
    this.#writes.meta.setAside = []
    const restored = this.#of.cursor !== null && this.#of.cursor.epoch !== cursor.epoch
    if (!restored) return
    // The shop was restored from a backup: what it took lately is offered again (P12).
    for (const record of await db.outbox.where('state').anyOf('taken', 'done').toArray()) {
      this.#changed.set(record.dseq, { ...record, state: 'waiting', takenAt: null })
    }
  }

  /** A whole pull shows every op taken before it; those are on top no longer. */
  async #settleTaken(): Promise<OutboxRecord[]> {
    const { db } = this.#core
    const taken = await db.outbox.where('state').equals('taken').toArray()
    for (const record of [...this.#changed.values(), ...taken]) {
      const now = this.#changed.get(record.dseq) ?? record
      if (now.state === 'taken') this.#changed.set(now.dseq, { ...now, state: 'done' })
    }
    const oldest = this.#of.nowMs - KEEP_TAKEN_MS
    const done = db.outbox.where('state').equals('done')
    const old = await done.filter((record) => (record.takenAt ?? 0) < oldest).toArray()
    this.#writes.dropOutbox = old.map((record) => record.dseq)
    return [...this.#changed.values()].filter((record) => record.state === 'done')
  }

  async #page(rows: readonly PullRow[], overlay: Overlay, cursor: Cursor): Promise<void> {
    const { db } = this.#core
    const gen = (await readMeta(db, 'gen')) ?? 0
    const aside = new Map(
      ((await readMeta(db, 'setAside')) ?? []).map((one) => [rowKey(one.entity, one.id), one]),
    )
    const bases = await Promise.all(rows.map((row) => this.#baseOf(row)))
    for (const [index, row] of rows.entries()) {
      if (row.entity === 'book') this.applied.bookChanged = true
      if (!isStored(row.entity)) continue
      const key = rowKey(row.entity, row.id)
      const base = bases[index]
      aside.delete(key)
      if (base === undefined) {
        aside.set(key, { entity: row.entity, id: row.id, seq: row.seq })
        continue
      }
      const shop = { base, seq: base === null ? null : row.seq, gen, jobId: row.jobId }
      const place = { entity: row.entity, id: row.id }
      this.#rows.set(key, await rebasedRow(this.#core, key, { ...shop, ...place }, overlay))
    }
    this.#writes.meta.setAside = [...aside.values()]
    this.#writes.meta.cursor = cursor
    const whole = new Date(this.#of.nowMs).toISOString()
    if (!this.applied.more) this.#writes.meta.fetchedAt = whole
  }

  /** The shop's row sealed; null when it is gone, undefined when this version cannot read it. */
  async #baseOf(row: PullRow): Promise<Sealed | null | undefined> {
    if (row.state !== 'present' || !isStored(row.entity)) return null
    const read = readRow(row.entity, row.row)
    if (read === undefined) return undefined
    return await sealJson(this.#core.keys.store, rowKey(row.entity, row.id), read)
  }

  /** Rows whose ops on top have changed, though the shop's row has not. */
  async #touchedAgain(records: readonly OutboxRecord[], overlay: Overlay): Promise<void> {
    const { cache, keys, db } = this.#core
    for (const record of records) {
      const op = await cache.op(keys.outbox, record)
      for (const at of rowsTouched(op)) {
        const key = rowKey(at.entity, at.id)
        const held = await db.row.get(key)
        // Taken, but not shown to this person: what they wrote stays visible to them.
        if (this.#rows.has(key) || held === undefined || held.base === null) continue
        this.#rows.set(key, await rebasedRow(this.#core, key, held, overlay))
      }
    }
    cache.forgetOps(records.map((record) => record.opId))
  }

  /** After a full pull: rows it did not bring are gone, unless unsent work lies on them. */
  async #sweep(overlay: Overlay): Promise<void> {
    const { db } = this.#core
    const gen = (await readMeta(db, 'gen')) ?? 0
    for (const held of await db.row.where('gen').below(gen).toArray()) {
      if (this.#rows.has(held.key)) continue
      const nothing = { ...held, base: null, seq: null, gen }
      this.#rows.set(held.key, await rebasedRow(this.#core, held.key, nothing, overlay))
    }
  }
}

/** Works out the rows of ops that a sender without the store key has marked. */
export async function settleRows(core: Core): Promise<void> {
  const marked = core.db.outbox.where('unsettled').equals(1)
  if ((await marked.count()) === 0) return
  await commit(core, async () => {
    const writes = noWrites()
    const overlay = await readOverlay(core)
    for (const record of await marked.toArray()) {
      writes.outbox.push({ ...record, unsettled: 0 })
      for (const at of rowsTouched(await core.cache.op(core.keys.outbox, record))) {
        const held = await core.db.row.get(rowKey(at.entity, at.id))
        const row = held && held.base !== null && (await rebasedRow(core, held.key, held, overlay))
        if (row) writes.rows.push(row)
      }
    }
    return writes
  })
}

/** Keeps only what became of the ops, for a sender that cannot open rows. */
export async function applyOutcomes(
  core: Pick<Core, 'db' | 'step'>,
  of: Pick<Answered, 'dseqs' | 'response' | 'nowMs'>,
): Promise<void> {
  await commit(core, async () => {
    const outbox = await outcomesOf(core.db, of)
    return { ...noWrites(), outbox: outbox.map((record) => ({ ...record, unsettled: 1 as const })) }
  })
}

/** Sets ops aside that the shop will never take as they are; kept, never deleted (P16). */
export async function setAside(
  core: Pick<Core, 'db' | 'step'>,
  of: { dseqs: readonly number[]; reason: string; detail: string | null },
): Promise<void> {
  await commit(core, async () => {
    const held = await core.db.outbox.bulkGet([...of.dseqs])
    const outbox = held.flatMap((record): OutboxRecord[] =>
      record === undefined
        ? []
        : [{ ...record, state: 'stuck', reason: of.reason, detail: of.detail, unsettled: 1 }],
    )
    return { ...noWrites(), outbox }
  })
}
