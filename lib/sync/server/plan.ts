import { assertNever } from '@/lib/model/result'
import type { OpResult } from '@/lib/sync/protocol/message'
import type { Op } from '@/lib/sync/protocol/op'
import { Draft } from './draft'
import type { Effects, Known, Outcome } from './known'
import { planAdviceKeep } from './ops/advice'
import { planBookHeard } from './ops/book-heard'
import { planJobOpen, planJobStep } from './ops/job'
import { planLogAdd } from './ops/log-entry'
import { planMachineAdd, planMachineDrop } from './ops/machine'
import { planLineAdd, planLineChange, planRequestDrop } from './ops/part-line'
import { planPartRequestAsk } from './ops/part-request'
import { planJobSet, planMachineSet, planSettle } from './ops/setting'
import { isSameOp, type ReadOp } from './read-ops'

/**
 * Decides what becomes of a batch without touching anything: ops and what is known in, effects and
 * results out. The write phase runs it again when the shop changed between reading and locking, so it
 * must be quick and give the same plan for the same input.
 */
export type Plan = {
  effects: Effects
  /** What to keep with each op that was not settled before, in the order sent. */
  outcomes: { op: ReadOp; outcome: Outcome }[]
  /** Ids of ops that are settled: the phone may let go of them or set them aside. */
  taken: string[]
  results: OpResult[]
}

function step(op: Op, draft: Draft): Outcome {
  if (op.dev !== draft.known.deviceId) {
    return { kind: 'rejected', code: 'not_yours', field: 'dev', detail: null }
  }
  switch (op.kind) {
    case 'machine.add':
      return planMachineAdd(op, draft)
    case 'job.open':
      return planJobOpen(op, draft)
    case 'job.move':
    case 'job.people':
    case 'job.machine':
      return planJobStep(op, draft)
    case 'log.add':
      return planLogAdd(op, draft)
    case 'partRequest.ask':
      return planPartRequestAsk(op, draft)
    case 'advice.keep':
      return planAdviceKeep(op, draft)
    case 'book.heard':
      return planBookHeard(op, draft)
    case 'job.set':
      return planJobSet(op, draft)
    case 'machine.set':
      return planMachineSet(op, draft)
    case 'job.settle':
    case 'machine.settle':
      return planSettle(op, draft)
    case 'partLine.add':
      return planLineAdd(op, draft)
    case 'partLine.cancel':
    case 'partLine.quantity':
      return planLineChange(op, draft)
    case 'partRequest.drop':
      return planRequestDrop(op, draft)
    case 'machine.drop':
      return planMachineDrop(op, draft)
    default:
      return assertNever(op)
  }
}

/** Judges every op, and those that wait for a parent again for as long as parents keep landing. */
function settle(ops: readonly ReadOp[], draft: Draft): Map<ReadOp, Outcome> {
  const outcomes = new Map<ReadOp, Outcome>()
  let waiting: readonly ReadOp[] = ops
  for (let before = -1; waiting.length > 0 && waiting.length !== before; ) {
    before = waiting.length
    for (const op of waiting) outcomes.set(op, judge(op, draft))
    waiting = waiting.filter((op) => outcomes.get(op)?.kind === 'blocked')
  }
  return outcomes
}

function judge({ read }: ReadOp, draft: Draft): Outcome {
  if (read.kind === 'op') return step(read.op, draft)
  if (read.kind === 'later') return { kind: 'blocked', on: '' }
  const { code, field, detail } = read.result
  return { kind: 'rejected', code, field, detail }
}

/** How an outcome is told: acceptance needs no line of its own (P5). */
function told(opId: string, outcome: Outcome): OpResult | null {
  switch (outcome.kind) {
    case 'accepted':
      return null
    case 'merged':
      return { opId, result: 'merged', loser: outcome.loser }
    case 'blocked':
      return { opId, result: 'blocked', on: outcome.on }
    case 'rejected': {
      const { code, field, detail } = outcome
      return { opId, result: 'rejected', code, field, detail }
    }
    default:
      return assertNever(outcome)
  }
}

/** What is told of an op that came before: the same as then (P4), or that its id is another op's. */
function toldAgain(op: ReadOp, seen: { raw: string; outcome: Outcome }): OpResult {
  if (!isSameOp(op.raw, seen.raw)) {
    return { opId: op.opId, result: 'rejected', code: 'id_reuse', field: 'id', detail: null }
  }
  return told(op.opId, seen.outcome) ?? { opId: op.opId, result: 'duplicate' }
}

/** Plans a batch in the order of the device. Everything it needs of the database is in `known`. */
export function planPush(ops: readonly ReadOp[], known: Known): Plan {
  const draft = new Draft(known)
  const first = new Map<string, ReadOp>()
  const fresh: ReadOp[] = []
  for (const op of ops) {
    if (first.has(op.opId)) continue
    first.set(op.opId, op)
    const seen = known.seen.get(op.opId)
    if (!seen || (seen.outcome.kind === 'blocked' && isSameOp(op.raw, seen.raw))) fresh.push(op)
  }
  const outcomes = settle(fresh, draft)
  const taken: string[] = []
  const results: OpResult[] = []
  for (const op of ops) {
    const result = resultOf(op, first.get(op.opId) ?? op, outcomes, known)
    if (result !== null) results.push(result)
    const isOpen = result?.result === 'blocked' || result?.result === 'retry'
    if (!isOpen && op.named && first.get(op.opId) === op) taken.push(op.opId)
  }
  const kept = fresh.filter((op) => op.named && op.read.kind !== 'later')
  return {
    effects: draft.effects,
    outcomes: kept.flatMap((op) => {
      const outcome = outcomes.get(op)
      return outcome ? [{ op, outcome }] : []
    }),
    taken,
    results,
  }
}

function resultOf(
  op: ReadOp,
  first: ReadOp,
  outcomes: ReadonlyMap<ReadOp, Outcome>,
  known: Known,
): OpResult | null {
  if (op.read.kind === 'later') return { opId: op.opId, result: 'retry' }
  const outcome = outcomes.get(op)
  if (outcome) return told(op.opId, outcome)
  const seen = known.seen.get(op.opId)
  if (seen) return toldAgain(op, seen)
  // The same id twice in one batch: a twin, or another op under a used id.
  const again = outcomes.get(first)
  return again ? toldAgain(op, { raw: first.raw, outcome: again }) : null
}
