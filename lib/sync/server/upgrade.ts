import { fail, ok, type Result } from '@/lib/model/result'
import { PROTOCOL } from '@/lib/sync/protocol/message'
import { OP_SCHEMA } from '@/lib/sync/protocol/op'
import type { HttpProblem } from './problems'

/**
 * Old phones (P13). A request of this protocol or the one before is taken; an older one keeps its work
 * and updates the app. An op is never rewritten on the phone, so ops of EVERY earlier shape are brought
 * up to date here, one step per version: `STEPS[n]` turns shape n into n + 1. Shape 1 is the first;
 * shapes 2 and 3 added kinds and changed none, so their steps keep the op as it is.
 */
type RawOp = Readonly<Record<string, unknown>>
export type UpgradeStep = (op: RawOp) => RawOp

const STEPS: Readonly<Record<number, UpgradeStep>> = { 1: (op) => op, 2: (op) => op }

/** Whether a request of this protocol version is taken: `tooOld` asks for an update, `tooNew` to wait. */
export function takesProtocol(
  version: number,
  current: number = PROTOCOL,
): Result<null, HttpProblem> {
  if (version > current) return fail({ kind: 'tooNew', retryAfterSeconds: 300 })
  return version < current - 1 || version < 1 ? fail({ kind: 'tooOld' }) : ok(null)
}

/**
 * An op in the present shape. `null`: its shape is newer than this server, so it has to wait.
 * Anything that is not an op of a known shape comes back unchanged, for the strict parse to refuse.
 */
export function upgradeOp(
  raw: RawOp,
  current: number = OP_SCHEMA,
  steps: Readonly<Record<number, UpgradeStep>> = STEPS,
): RawOp | null {
  if (typeof raw.schema !== 'number') return raw
  if (raw.schema > current) return null
  let op = raw
  for (let version = raw.schema; version < current; version++) {
    const step = steps[version]
    if (!step) return raw
    op = { ...step(op), schema: version + 1 }
  }
  return op
}
