import { asShop } from '@/db/client'
import { findOps, type StoredOp } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { Files } from '@/lib/ports/files'
import type { ImportAnswer, ImportOutcome } from '@/lib/sync/protocol/unsent-file'
import type { CheckedFile } from './unsent-file'

/** Who brings a file of unsent work to the desk, and whether it is only to be looked at. */
export type Bringing = {
  desk: Actor
  text: string
  apply: boolean
  files: Files
  now: number
  newId: () => Id
}

/** The records and files of such a file, each with what became of it. */
export type Listed = Pick<ImportAnswer, 'ops' | 'photos'>
export type ListedOp = Listed['ops'][number]
export type ListedPhoto = Listed['photos'][number]
export type Became = Pick<ListedOp, 'outcome' | 'code' | 'detail'>

/** What an op says of itself, for the list; nothing of it is believed before it was judged. */
export function headOf(
  op: unknown,
  index: number,
): Pick<ListedOp, 'opId' | 'kind' | 'entry' | 'jobId'> {
  const said = (typeof op === 'object' && op !== null ? op : {}) as Record<string, unknown>
  const body = (said.fields as { body?: { kind?: unknown } } | undefined)?.body
  const text = (value: unknown) => (typeof value === 'string' ? value.slice(0, 64) : null)
  return {
    opId: text(said.id) ?? `#${index}`,
    kind: text(said.kind) ?? 'unknown',
    entry: text(body?.kind),
    jobId: text(said.jobId),
  }
}

/** An outcome of which nothing more is to be said. */
export const settled = (outcome: ImportOutcome): Became => ({ outcome, code: null, detail: null })

/** What the shop knows of each op without taking any. */
export async function lookAtOps({
  actor,
  body,
}: Pick<CheckedFile, 'actor' | 'body'>): Promise<Map<string, Became>> {
  const ids = body.ops.map((held, index) => headOf(held.op, index).opId)
  const known = await asShop(actor.shopId, (tx) => findOps(tx, ids))
  return new Map(ids.map((opId) => [opId, knownAs(known.get(opId))]))
}

function knownAs(op: StoredOp | undefined): Became {
  if (op === undefined || op.outcome === 'quarantined') return settled('new')
  if (op.outcome === 'rejected') return { outcome: 'refused', code: op.code, detail: op.detail }
  if (op.outcome === 'blocked') return { outcome: 'blocked', code: op.blockedOn, detail: null }
  return settled('already')
}
