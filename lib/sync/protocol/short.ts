import type { Id } from '@/lib/model/id'
import { OP_SCHEMA } from './op'

/**
 * The short form of ops in a brief request and of rows in a brief answer: what another part of the same
 * message says already is left out, and the reader puts it back. On a slow line every id that is said twice
 * costs as much as a word of a note. Only a part that says just what would be put back is left out, so that
 * both forms are one op; nothing past the message knows of the short form.
 */
export type Said = { dev: Id; personId: Id; schema?: number }

type Part = Record<string, unknown>
const isPart = (value: unknown): value is Part =>
  typeof value === 'object' && value !== null && !Array.isArray(value)

/** What is put back into an op, in the order in which ops are written. */
const opRest = (op: Part, { dev, schema = OP_SCHEMA }: Said): Part => ({
  id: op.id,
  dev,
  dseq: op.dseq,
  hlc: op.hlc,
  entityId: op.id,
  jobId: null,
  base: null,
  schema,
})

/** What is put back into the fields of an entry. */
const entryRest = (fields: Part, entry: { id: unknown; jobId: unknown }): Part => ({
  id: entry.id,
  jobId: entry.jobId,
  supersedes: null,
  happenedAt: fields.happenedAt,
  writtenAt: fields.happenedAt,
})

const without = (part: Part, rest: Part, kept: readonly string[]): Part =>
  Object.fromEntries(
    Object.entries(part).filter(([key, value]) => kept.includes(key) || rest[key] !== value),
  )

/** Parts that the others are put back from. */
const OP_SAYS = ['id', 'dseq', 'hlc']
const ENTRY_SAYS = ['happenedAt']

/** An op as it is sent in a brief request. */
export function shortOp(op: Part, said: Said): Part {
  const short = without(op, opRest(op, said), OP_SAYS)
  if (op.kind !== 'log.add' || !isPart(op.fields)) return short
  const rest = { ...entryRest(op.fields, { id: op.id, jobId: op.jobId }), ...authorRest(said) }
  return { ...short, fields: without(op.fields, rest, ENTRY_SAYS) }
}

const authorRest = ({ dev, personId }: Said): Part => ({ authorId: personId, deviceId: dev })

/** The op that a brief request says in short; anything that is no op stays as it is. */
export function fullOp(short: unknown, said: Said): unknown {
  if (!isPart(short)) return short
  const op: Part = { ...opRest(short, said), ...short }
  if (op.kind !== 'log.add' || !isPart(op.fields)) return op
  const { fields } = op
  const rest = { ...entryRest(fields, { id: op.id, jobId: op.jobId }), ...authorRest(said) }
  return { ...op, fields: { ...rest, ...fields } }
}

type Row = { entity: string; id: string; jobId: string | null; row: unknown }

/** A row of a pull as it goes in a brief answer. */
export function shortRow<R extends Row>(row: R): R {
  if (row.entity !== 'logEntry' || !isPart(row.row)) return row
  return { ...row, row: without(row.row, entryRest(row.row, row), ENTRY_SAYS) }
}

/** The row that a brief answer says in short. */
export function fullRow<R extends Row>(row: R): R {
  if (row.entity !== 'logEntry' || !isPart(row.row)) return row
  return { ...row, row: { ...entryRest(row.row, row), ...row.row } }
}
