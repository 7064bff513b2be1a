import type { LogPage } from '@/db/queries/change-log'
import type { Id } from '@/lib/model/id'
import type { LogRow } from '@/lib/model/log-entry'
import { ownRuns, runsOf } from '@/lib/sync/protocol/brief'
import type { PullAnswer, SyncResponse } from '@/lib/sync/protocol/message'
import { OP_SCHEMA } from '@/lib/sync/protocol/op'
import { shortRow } from '@/lib/sync/protocol/short'
import type { PushAnswer } from './push'

/** Entries that a request's ops added, with the number of the op that has each one's words. */
export type OwnEntries = ReadonlyMap<Id, { dseq: number; jobId: Id }>

type Said = { id: string; dseq: number; kind: unknown; schema: unknown; fields: unknown }

/** The ops of a request that say who they are, each id and number once: only those can be told in short. */
function saidOf(ops: readonly unknown[]): Said[] {
  const said = ops.filter((op): op is Said => {
    const { id, dseq } = (op ?? {}) as Partial<Said>
    return typeof id === 'string' && Number.isSafeInteger(dseq) && (dseq ?? 0) > 0
  })
  const ids = new Set(said.map((op) => op.id))
  const numbers = new Set(said.map((op) => op.dseq))
  return ids.size === said.length && numbers.size === said.length ? said : []
}

/** Entries that the shop took from these ops just as they say, so that the phone need not hear them again. */
export function ownEntries(ops: readonly unknown[], pushed: PushAnswer): OwnEntries {
  const taken = new Set(pushed.taken)
  for (const { opId, result } of pushed.results) if (result === 'rejected') taken.delete(opId)
  const own = new Map<Id, { dseq: number; jobId: Id }>()
  for (const { id, dseq, kind, schema, fields } of saidOf(ops)) {
    if (kind !== 'log.add' || schema !== OP_SCHEMA || !taken.has(id)) continue
    const entry = fields as { id: Id; jobId: Id }
    own.set(entry.id, { dseq, jobId: entry.jobId })
  }
  return own
}

/** The settled ops by their numbers. */
export function foldedPush(
  ops: readonly unknown[],
  pushed: PushAnswer,
): Pick<SyncResponse, 'taken' | 'takenNumbers' | 'results'> {
  const numbers = new Map(saidOf(ops).map(({ id, dseq }) => [id, dseq]))
  const taken = pushed.taken.filter((id) => !numbers.has(id))
  const takenNumbers = runsOf(pushed.taken.flatMap((id) => numbers.get(id) ?? []))
  return { taken, takenNumbers, results: pushed.results }
}

/** A page with the own entries as runs, and the others in short. */
export function foldedPage(page: LogPage, own: OwnEntries): PullAnswer {
  if (page.kind !== 'page') return page
  const entries = page.rows.flatMap(({ seq, id, own: isOwn, row }) => {
    const dseq = own.get(id)?.dseq
    if (isOwn === undefined || dseq === undefined) return []
    const { order, receivedAt } = row as LogRow
    return [{ dseq, seq, order, receivedAt }]
  })
  const rows = page.rows.filter((row) => row.own === undefined).map(shortRow)
  return { ...page, rows, own: ownRuns(entries) }
}
