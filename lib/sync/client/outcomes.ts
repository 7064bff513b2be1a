import type { Cursor, OpResult, SyncResponse } from '@/lib/sync/protocol/message'
import { commit, noWrites } from './commit'
import type { Core } from './core'
import { getMany } from './get-many'
import type { OutboxRecord, PhoneDb } from './phone-db'

/** One answer of the shop, with what was sent for it. */
export type Answered = {
  /** Numbers of the ops that were sent. */
  dseqs: readonly number[]
  /** The cursor that was sent. */
  cursor: Cursor | null
  response: SyncResponse
  offsetMs: number
  nowMs: number
}

/** What the applying of an answer left to do. */
export type Applied = {
  /** More rows wait at the shop. */
  more: boolean
  /** A newer code book is published. */
  bookChanged: boolean
  wasReset: boolean
  /** The phone has no room for the rows: the cursor stayed, what became of the ops is kept (P21). */
  noRoom?: true
}

/** What became of the sent ops, by their numbers; ops nothing was said of stay as they are. */
export async function outcomesOf(
  db: PhoneDb,
  of: Pick<Answered, 'dseqs' | 'response' | 'nowMs'>,
): Promise<OutboxRecord[]> {
  const results = new Map(of.response.results.map((result) => [result.opId, result]))
  const taken = new Set(of.response.taken)
  const held = await getMany(db.outbox, of.dseqs, (record) => record.dseq)
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
