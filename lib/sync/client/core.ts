import type { Id } from '@/lib/model/id'
import { AppError } from '@/lib/model/result'
import type { Op } from '@/lib/sync/protocol/op'
import type { PhoneKeys } from './keys'
import type { OutboxRecord, PhoneDb, RowRecord } from './phone-db'
import { openJson, type Sealed } from './seal'

/** What every part of an open store works with. */
export type Core = {
  db: PhoneDb
  keys: PhoneKeys
  personId: Id
  cache: OpenedCache
  /** Called with the name of each step that could be the last one; tests let it throw. */
  step(name: string): void
}

/** The place an op is sealed for. */
export const opPlace = (dseq: number, opId: Id) => `op/${dseq}/${opId}`

/** Opens an op kept in the outbox. It was checked when it was made. */
export async function openOp(
  outboxKey: CryptoKey,
  record: Pick<OutboxRecord, 'dseq' | 'opId' | 'op'>,
): Promise<Op> {
  return (await openJson(outboxKey, opPlace(record.dseq, record.opId), record.op)) as Op
}

/** What was opened lately, so that a screen that looks again opens only what changed. */
export class OpenedCache {
  readonly #rows = new Map<string, { turn: number; row: Promise<unknown> }>()
  readonly #ops = new Map<Id, Promise<Op>>()

  /** The row as the screens see it. */
  row(keys: PhoneKeys, record: RowRecord): Promise<unknown> {
    const held = this.#rows.get(record.key)
    if (held?.turn === record.turn) return held.row
    const row = openRow(keys.store, record)
    this.#rows.set(record.key, { turn: record.turn, row })
    row.catch(() => this.#rows.delete(record.key))
    return row
  }

  op(outboxKey: CryptoKey, record: OutboxRecord): Promise<Op> {
    const held = this.#ops.get(record.opId)
    if (held !== undefined) return held
    const op = openOp(outboxKey, record)
    this.#ops.set(record.opId, op)
    op.catch(() => this.#ops.delete(record.opId))
    return op
  }

  /** An op that was just made or sealed. */
  keepOp(op: Op): void {
    this.#ops.set(op.id, Promise.resolve(op))
  }

  /** Lets go of ops that are no longer unsent. */
  forgetOps(opIds: readonly Id[]): void {
    for (const opId of opIds) this.#ops.delete(opId)
  }
}

/** The row as the screens see it, opened. */
async function openRow(storeKey: CryptoKey, record: RowRecord): Promise<unknown> {
  const sealed = record.body ?? record.base
  if (sealed === null) throw new AppError('emptyRow', { context: { key: record.key } })
  return record.body === null
    ? await openBase(storeKey, record.key, { base: sealed, told: record.told })
    : await openJson(storeKey, record.key, sealed)
}

/** The shop's row, opened. */
export async function openBase(
  storeKey: CryptoKey,
  key: string,
  { base, told }: { base: Sealed; told?: RowRecord['told'] | undefined },
): Promise<unknown> {
  const row = await openJson(storeKey, key, base)
  return told === undefined ? row : { ...(row as object), ...told }
}
