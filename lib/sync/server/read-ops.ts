import { createHash } from 'node:crypto'
import canonicalize from 'canonicalize'
import { MAX_OP_BYTES, type OpResult } from '@/lib/sync/protocol/message'
import { type Op, op } from '@/lib/sync/protocol/op'
import { upgradeOp } from './upgrade'

/**
 * Reads each op of a push on its own, so that one bad op costs only itself (P5). What has an id is kept
 * under it with its outcome; what has none is refused in this answer alone.
 */
export type ReadOp = {
  opId: string
  /** The op as it was sent (P2), or a note of its size and hash when it is past the limit. */
  raw: string
  /** Its place in the device's sequence; 0 when it does not say. */
  dseq: number
  /** False when it has no id to be kept under. */
  named: boolean
  read: { kind: 'op'; op: Op } | { kind: 'refused'; result: Rejected } | { kind: 'later' }
}

export type Rejected = Extract<OpResult, { result: 'rejected' }>
type Refusal = { code: Rejected['code']; field: string | null; detail: string | null }

/** Nesting past which an op is refused: ours need 8; PostgreSQL and the parser are spared the rest. */
const MAX_DEPTH = 24
const MAX_ID_LENGTH = 64
const KINDS: ReadonlySet<string> = new Set(
  op._zod.def.options.map((member) => member.shape.kind._zod.def.values[0] ?? ''),
)
/** Ids are compared as text, so they come in the one form that PostgreSQL gives back. */
const ID_FIELDS = ['id', 'dev', 'entityId', 'jobId'] as const

const refusal = (
  code: Rejected['code'],
  field: string | null = null,
  detail: string | null = null,
): Refusal => ({ code, field, detail })

/** Where a value cannot be kept as jsonb: too deep, NUL, or half a character. Null when it can. */
function unkept(value: unknown, path: string, depth: number): string | null {
  if (typeof value === 'string') return /\0|\p{Surrogate}/u.test(value) ? path : null
  if (typeof value !== 'object' || value === null) return null
  if (depth >= MAX_DEPTH) return path
  for (const [key, part] of Object.entries(value)) {
    const at = path === '' ? key : `${path}.${key}`
    const found = unkept(key, at, depth) ?? unkept(part, at, depth + 1)
    if (found !== null) return found.slice(0, 120)
  }
  return null
}

const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value)

/** The text of the op as it is kept, and its refusal when it is too deep or too big to be read. */
function textOf(raw: unknown): { text: string; tooBig: boolean } {
  let text: string
  try {
    text = JSON.stringify(raw)
  } catch {
    return { text: '{"tooDeep":true}', tooBig: true }
  }
  const bytes = Buffer.byteLength(text)
  if (bytes <= MAX_OP_BYTES) return { text, tooBig: false }
  const sha256 = createHash('sha256').update(text).digest('hex')
  return { text: JSON.stringify({ tooBig: bytes, sha256 }), tooBig: true }
}

/** The op in its present shape; the refusal names the first field that does not fit. */
function shapeOf(raw: Record<string, unknown>): Op | Refusal | 'later' {
  const deep = unkept(raw, '', 0)
  if (deep !== null) return refusal('invalid', deep, 'Text or nesting that cannot be kept')
  const odd = ID_FIELDS.find((field) => /[A-F]/.test(String(raw[field] ?? '')))
  if (odd) return refusal('invalid', odd, 'Ids are written in lower case')
  const current = upgradeOp(raw)
  if (current === null) return 'later'
  if (typeof current.kind !== 'string' || !KINDS.has(current.kind)) {
    return refusal('unknown_kind', 'kind')
  }
  const parsed = op.safeParse(current)
  if (parsed.success) return parsed.data
  const issue = parsed.error.issues[0]
  const path = issue?.path.join('.').slice(0, 120) ?? ''
  return refusal('invalid', path === '' ? null : path, issue?.message.slice(0, 200) ?? null)
}

function readShape(raw: unknown, opId: string, tooBig: boolean): ReadOp['read'] {
  const shape = tooBig
    ? refusal('too_big', null, `An op has ${MAX_OP_BYTES} bytes at most`)
    : isObject(raw)
      ? shapeOf(raw)
      : refusal('invalid')
  if (shape === 'later') return { kind: 'later' }
  if ('code' in shape) return { kind: 'refused', result: { opId, result: 'rejected', ...shape } }
  return { kind: 'op', op: shape }
}

/** Reads one op of the batch; `index` names it when it has no id of its own. */
export function readOp(raw: unknown, index: number): ReadOp {
  const id = isObject(raw) && typeof raw.id === 'string' ? raw.id : ''
  const named = id.length > 0 && id.length <= MAX_ID_LENGTH && unkept(id, '', 0) === null
  const opId = named ? id : `#${index}`
  const { text, tooBig } = textOf(raw)
  const dseq = isObject(raw) && Number.isSafeInteger(raw.dseq) ? Math.max(0, Number(raw.dseq)) : 0
  return { opId, raw: text, dseq, named, read: readShape(raw, opId, tooBig) }
}

/** True when two texts are the same op, whatever the order of their keys. */
export function isSameOp(left: string, right: string): boolean {
  if (left === right) return true
  return canonicalize(JSON.parse(left)) === canonicalize(JSON.parse(right))
}
