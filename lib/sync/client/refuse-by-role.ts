import type { LogEntry } from '@/lib/model/log-entry'
import { AppError } from '@/lib/model/result'
import { mayRecord, type Writer } from '@/lib/shop/may-record'
import type { OpInput } from '@/lib/sync/protocol/op'
import type { Core } from './core'
import { rowKey } from './phone-db'

/** Throws AppError `notAllowed` when the writer's roles do not allow one of the ops: the shop's own gate (R22). */
export async function refuseByRole(
  core: Core,
  ops: readonly OpInput[],
  writer: Writer,
): Promise<void> {
  core.step('roomLooked')
  for (const op of ops) {
    if (!mayRecord(op, writer, await targetOf(core, op, ops)))
      throw new AppError('notAllowed', { context: { kind: op.kind } })
  }
  core.step('allowed')
}

/** The entry an op points back to, kept here or recorded in the same piece. */
async function targetOf(
  core: Core,
  op: OpInput,
  ops: readonly OpInput[],
): Promise<LogEntry | undefined> {
  const id = op.kind === 'log.add' ? op.fields.supersedes : null
  if (id === null) return undefined
  const twin = ops.find((one) => one.kind === 'log.add' && one.fields.id === id)
  if (twin?.kind === 'log.add') return twin.fields
  const held = await core.db.row.get(rowKey('logEntry', id))
  return held && ((await core.cache.row(core.keys, held)) as LogEntry)
}
