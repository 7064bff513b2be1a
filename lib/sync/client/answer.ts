import type { LogRow } from '@/lib/model/log-entry'
import type { Cursor, OpResult, PullRow } from '@/lib/sync/protocol/message'
import { rowsTouched } from './apply-op'
import { commit, noWrites, type Writes } from './commit'
import type { Core } from './core'
import { isStored, readRow } from './entities'
import { bringsBack } from './free-room'
import { getMany } from './get-many'
import { receiveHlc } from './hlc'
import { recordsIn } from './outbox'
import { type Answered, type Applied, outcomesOf } from './outcomes'
import { type OutboxRecord, type RowRecord, readMeta, rowKey } from './phone-db'
import { photosToOffer } from './photo-store'
import { isCounted, isOnTop, type Overlay, readOverlay, rebasedRow } from './rebase'
import { type Sealed, sealJson } from './seal'
import { readCounter } from './stamp'

/**
 * What the shop answered, applied in one transaction: what became of each op, the pulled rows, and the
 * cursor (P8). A kill before it leaves everything as it was; the same answer again changes nothing.
 */

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

/** Which log a cursor is of; what follows the point says how far back that log is whole (P10). */
const logOf = (cursor: Cursor) => cursor.epoch.split('.')[0]

/** A job's closing that did not stand against an entry of the field. */
function isReopening(result: OpResult): boolean {
  if (result.result !== 'merged') return false
  const loser = result.loser as { field?: unknown; value?: unknown } | null
  return loser?.field === 'state' && loser.value === 'closed'
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
    await this.#notices(before)
    await this.#missing()
    await this.#lost()
    await this.#clocks()
    const { pull } = this.#of.response
    if (pull.kind === 'reset') await this.#reset(pull.cursor)
    const fits = pull.kind === 'page' && (await this.#follows(pull))
    if (fits) await this.#settleCounted(pull.rows)
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

  /** Numbers the shop never saw are offered again, if they are still here (P22). */
  async #missing(): Promise<void> {
    const { outbox } = this.#core.db
    for (const [first, last] of this.#of.response.missing) {
      for (const record of await outbox.where('dseq').between(first, last, true, true).toArray()) {
        if (record.state !== 'taken' && record.state !== 'done') continue
        if (this.#changed.has(record.dseq)) continue
        this.#changed.set(record.dseq, { ...record, state: 'waiting', takenAt: null })
      }
    }
  }

  /** What went with the store before this one, or may have, is kept until its person has read it (P22). */
  async #lost(): Promise<void> {
    const { lost, silent } = this.#of.response
    const { db } = this.#core
    if (lost !== null && (await readMeta(db, 'lost')) === undefined) {
      this.#writes.meta.lost = { ops: lost.ops, lastOn: lost.lastAt, told: false }
    }
    if (silent !== undefined && (await readMeta(db, 'silent')) === undefined) {
      this.#writes.meta.silent = { ...silent, told: false }
    }
  }

  /** Entries that opened a job again which the shop had closed: the person is told (R13). */
  async #notices(settled: readonly OutboxRecord[]): Promise<void> {
    const opened = new Set(
      this.#of.response.results.filter(isReopening).map((result) => result.opId),
    )
    const jobIds = settled.flatMap(({ opId, jobId }) =>
      opened.has(opId) && jobId !== null ? [jobId] : [],
    )
    if (jobIds.length === 0) return
    const held = (await readMeta(this.#core.db, 'notices')) ?? []
    const fresh = new Set(jobIds)
    const at = this.#of.nowMs
    this.#writes.meta.notices = [
      ...held.filter((notice) => !fresh.has(notice.jobId)),
      ...[...fresh].map((jobId) => ({ jobId, what: 'reopened' as const, at })),
    ]
  }

  async #clocks(): Promise<void> {
    const counter = await readCounter(this.#core.db)
    const hlc = receiveHlc(counter.hlc, Date.parse(this.#of.response.serverTime) || 0)
    this.#writes.meta.stamp = { ...counter, hlc }
    this.#writes.meta.clockOffset = this.#of.offsetMs
  }

  /**
   * The page continues from where this store still is: no other tab has applied one meanwhile. One that
   * brings back a job that was let go of for room does not, and everything is pulled anew (P21).
   */
  async #follows({ rows, cursor }: { rows: readonly PullRow[]; cursor: Cursor }): Promise<boolean> {
    const { db } = this.#core
    const held = await readMeta(db, 'cursor')
    if (JSON.stringify(held ?? null) !== JSON.stringify(this.#of.cursor)) return false
    if (!(await bringsBack(db, rows))) return true
    await this.#pullAnew(cursor)
    return false
  }

  /** Everything is pulled anew; old rows stay shown until the new ones are whole. Unsent work is untouched. */
  async #reset(cursor: Cursor): Promise<void> {
    const { db } = this.#core
    await this.#pullAnew(cursor)
    const held = this.#of.cursor
    const restored = held !== null && logOf(held) !== logOf(cursor)
    if (!restored) return
    // The shop was restored from a backup: what it took lately is offered again (P12).
    for (const record of await recordsIn(db, 'taken', 'done')) {
      this.#changed.set(record.dseq, { ...record, state: 'waiting', takenAt: null })
    }
    this.#writes.photos = await photosToOffer(db, this.#of.nowMs - KEEP_TAKEN_MS)
  }

  async #pullAnew(cursor: Cursor): Promise<void> {
    this.applied.wasReset = true
    this.applied.more = true
    this.#writes.meta.cursor = { ...cursor, seq: 0 }
    this.#writes.meta.gen = ((await readMeta(this.#core.db, 'gen')) ?? 0) + 1
    this.#writes.meta.setAside = []
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
    // In the order of their numbers, which is that of their time but for ops that were offered again.
    const done = db.outbox.where('state').equals('done')
    const old = await done.until((record) => (record.takenAt ?? 0) >= oldest).toArray()
    this.#writes.dropOutbox = old.map((record) => record.dseq)
    return [...this.#changed.values()].filter((record) => record.state === 'done')
  }

  /** A row was read after the shop took these ops, so it has what they counted. */
  async #settleCounted(rows: readonly PullRow[]): Promise<void> {
    const { db } = this.#core
    const came = new Set(rows.map((row) => row.id))
    const taken = await db.outbox.where('state').equals('taken').toArray()
    for (const record of [...taken, ...this.#changed.values()]) {
      const now = this.#changed.get(record.dseq) ?? record
      if (now.state !== 'taken' || !isCounted(now) || !came.has(now.entityId)) continue
      this.#changed.set(now.dseq, { ...now, state: 'done' })
    }
  }

  async #page(rows: readonly PullRow[], overlay: Overlay, cursor: Cursor): Promise<void> {
    const { db } = this.#core
    const gen = (await readMeta(db, 'gen')) ?? 0
    const aside = new Map(
      ((await readMeta(db, 'setAside')) ?? []).map((one) => [rowKey(one.entity, one.id), one]),
    )
    const own = await this.#ownBases(rows)
    const bases = await Promise.all(rows.map((row) => own.get(row.id)?.base ?? this.#baseOf(row)))
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
      const merged = mergedInto(row)
      const shop = {
        base,
        seq: base === null ? null : row.seq,
        gen,
        jobId: row.jobId,
        ...(merged === undefined ? {} : { mergedInto: merged }),
        ...own.get(row.id),
      }
      const place = { entity: row.entity, id: row.id }
      this.#rows.set(key, await rebasedRow(this.#core, key, { ...shop, ...place }, overlay))
    }
    this.#writes.meta.setAside = [...aside.values()]
    this.#writes.meta.cursor = cursor
    const whole = new Date(this.#of.nowMs).toISOString()
    if (!this.applied.more) this.#writes.meta.fetchedAt = whole
  }

  /** Entries of this phone as they were sealed when they were recorded: the shop's rows say the same. */
  async #ownBases(
    rows: readonly PullRow[],
  ): Promise<Map<string, Pick<RowRecord, 'base' | 'told'>>> {
    const own = rows.filter((row) => row.own === true)
    const keys = own.map((row) => rowKey(row.entity, row.id))
    const held = await getMany(this.#core.db.row, keys, (row) => row.key)
    const bases = new Map<string, Pick<RowRecord, 'base' | 'told'>>()
    for (const [index, { id, row }] of own.entries()) {
      const { base = null, body = null } = held[index] ?? {}
      const { order, receivedAt } = row as LogRow
      if (base === null && body !== null) bases.set(id, { base: body, told: { order, receivedAt } })
    }
    return bases
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
    const ops = await Promise.all(records.map((record) => cache.op(keys.outbox, record)))
    const touched = new Set(
      ops.flatMap((op) => rowsTouched(op).map((at) => rowKey(at.entity, at.id))),
    )
    const left = [...touched].filter((key) => !this.#rows.has(key))
    for (const held of await getMany(db.row, left, (row) => row.key)) {
      // Taken, but not shown to this person: what they wrote stays visible to them.
      if (held === undefined || held.base === null) continue
      this.#rows.set(held.key, await rebasedRow(this.#core, held.key, held, overlay))
    }
    cache.forgetOps(records.map((record) => record.opId))
  }

  /** After a full pull: rows it did not bring are gone, unless unsent work lies on them. */
  async #sweep(overlay: Overlay): Promise<void> {
    const { db } = this.#core
    const gen = (await readMeta(db, 'gen')) ?? 0
    for (const held of await db.row.where('gen').below(gen).toArray()) {
      // One worked out again in this very answer is no row of this pull.
      const now = this.#rows.get(held.key)
      if (now === null || now?.gen === gen) continue
      const nothing = { ...held, base: null, seq: null, gen }
      this.#rows.set(held.key, await rebasedRow(this.#core, held.key, nothing, overlay))
    }
  }
}

/** The job that goes on for a merged one, as its row says; kept open beside the sealed row. */
function mergedInto({ entity, row }: PullRow): string | undefined {
  if (entity !== 'job') return undefined
  return (row as { mergedInto?: string } | null)?.mergedInto
}
