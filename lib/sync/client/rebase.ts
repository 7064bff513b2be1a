import type { Op } from '@/lib/sync/protocol/op'
import { applyOpLocally, rowsTouched, type Touched } from './apply-op'
import { type Core, openBase } from './core'
import { numbersIn, ON_TOP } from './outbox'
import { type OutboxRecord, type RowRecord, rowKey } from './phone-db'
import { type Sealed, sealJson } from './seal'

/**
 * Works out rows again: the shop's row with this phone's ops on top, in the order they were made (P9).
 * An op stays on top until a whole pull has been applied after the shop took it. A refused op that only
 * adds something stays too (the work is kept and shown); a refused change does not.
 */
const ADDS: ReadonlySet<Op['kind']> = new Set([
  'machine.add',
  'job.open',
  'log.add',
  'partRequest.ask',
  'partLine.add',
  'advice.keep',
])

/** True while an op of the outbox lies on top of the shop's rows. */
export const isOnTop = (record: Pick<OutboxRecord, 'state' | 'kind'>): boolean =>
  record.state === 'stuck' ? ADDS.has(record.kind) : record.state !== 'done'

/** What counts would count twice on a row that has it already: it goes as soon as that row comes. */
export const isCounted = (record: Pick<OutboxRecord, 'kind'>): boolean =>
  record.kind === 'partLine.quantity'

/** Ops that lie on top, oldest first, by the key of each row they touch. */
export type Overlay = Map<string, { at: Touched; ops: Op[] }>

/** Reads the outbox as it would be after `changes`, and orders it by row. */
export async function readOverlay(
  core: Core,
  changes: readonly OutboxRecord[] = [],
): Promise<Overlay> {
  const { outbox } = core.db
  const changed = new Map(changes.map((record) => [record.dseq, record]))
  const dseqs = await numbersIn(core.db, ...ON_TOP)
  const others = await outbox.bulkGet(dseqs.filter((dseq) => !changed.has(dseq)))
  const records = [...changes, ...others.flatMap((record) => record ?? [])]
  records.sort((a, b) => a.dseq - b.dseq)
  const overlay: Overlay = new Map()
  for (const record of records.filter(isOnTop)) {
    const op = await core.cache.op(core.keys.outbox, record)
    for (const at of rowsTouched(op)) {
      const key = rowKey(at.entity, at.id)
      const entry = overlay.get(key) ?? { at, ops: [] }
      entry.ops.push(op)
      overlay.set(key, entry)
    }
  }
  return overlay
}

type Shop = Pick<RowRecord, 'told'> & {
  base: Sealed | null
  seq: number | null
  gen: number
  jobId: string | null
  mergedInto?: string
}

/** The record of a row with its ops on top of `shop`; null when nothing is left of it. */
export async function rebasedRow(
  core: Core,
  key: string,
  shop: Shop & { entity: string; id: string },
  overlay: Overlay,
): Promise<Omit<RowRecord, 'turn'> | null> {
  const entry = overlay.get(key)
  const { base: sealed, told, ...rest } = shop
  const record = { key, ...rest, base: sealed, ...(sealed && told ? { told } : {}), body: null }
  // Evidence is only ever added: nothing lies on top of what the shop has.
  if (sealed !== null && (entry === undefined || shop.entity === 'logEntry')) return record
  if (entry === undefined) return null
  const base = sealed === null ? undefined : await openBase(core.keys.store, key, { base: sealed })
  const who = { personId: core.personId }
  const top = entry.ops.reduce((row, op) => applyOpLocally(row, entry.at, op, who), base)
  if (top === undefined) return null
  if (top === base) return record
  // The shop knows under which job a row is shown, should that have been merged (R13).
  const jobId = sealed === null ? entry.at.jobId : shop.jobId
  return { ...record, jobId, body: await sealJson(core.keys.store, key, top) }
}
