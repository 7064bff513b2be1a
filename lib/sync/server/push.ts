import { asShop, type ShopTx } from '@/db/client'
import { lockShop, logStand } from '@/db/queries/changes'
import { linkEntries } from '@/db/queries/log-entries'
import type { OpResult } from '@/lib/sync/protocol/message'
import { applyEvidence, applyPlan, type Sender } from './apply-plan'
import { troubleOf } from './database-trouble'
import type { Known } from './known'
import { loadKnown } from './load-known'
import { addsOnly, isOvertaken, restsOn } from './overtaken'
import { type Plan, planPush } from './plan'
import { type ReadOp, readOp } from './read-ops'

/**
 * Takes a push. All checking is done on what was read without a lock; then the shop's counter is locked,
 * and only if something of what it rests on changed since is the batch planned again on fresh data. So the lock is held for
 * the bulk writes alone, and never across a network wait.
 */
export type PushAnswer = { taken: string[]; results: OpResult[] }

/** Transactions so far, and the log that the phone knows. */
type Spent = { tries: number; log: string | null }

/** How many transactions one push may cost when the database itself refuses ops in it. */
const MAX_TRIES = 64

/**
 * Takes the ops of one signed push in their order; each is settled once, however often it comes (P4).
 * `log`: the epoch of the log that the phone's cursor is of. Where the shop was restored from a backup since,
 * the ops are asked for again: the phone first offers what went with the restoring, and theirs rest on that.
 */
export function takePush(
  ops: readonly unknown[],
  sender: Sender,
  log: string | null = null,
): Promise<PushAnswer> {
  return takeBatch(ops.map(readOp), sender, { tries: 0, log })
}

/** The phone's cursor is of a log from before a restore; never leaves this file. */
class RestoredSince extends Error {}

async function takeBatch(
  ops: readonly ReadOp[],
  sender: Sender,
  spent: Spent,
): Promise<PushAnswer> {
  if (ops.length === 0) return { taken: [], results: [] }
  spent.tries += 1
  if (spent.tries > MAX_TRIES) return laterAnswer(ops)
  try {
    const { taken, results } = await asShop(sender.actor.shopId, (tx) =>
      settle(tx, ops, sender, spent.log),
    )
    return { taken, results }
  } catch (error) {
    if (error instanceof RestoredSince) return laterAnswer(ops)
    const trouble = troubleOf(error)
    if (trouble === 'retry') return laterAnswer(ops)
    if (trouble === 'badData') return takeHalves(ops, sender, spent)
    throw error
  }
}

/** Nothing was taken: the phone asks again later. */
export const laterAnswer = (ops: readonly ReadOp[]): PushAnswer => ({
  taken: [],
  results: ops.map(({ opId }) => ({ opId, result: 'retry' })),
})

/** Finds the op that the database refuses by halving, so that it costs only itself (P5). */
async function takeHalves(
  ops: readonly ReadOp[],
  sender: Sender,
  spent: Spent,
): Promise<PushAnswer> {
  const [only] = ops
  if (ops.length === 1 && only) {
    const detail = 'The shop’s database cannot keep a value of it'
    const result = {
      opId: only.opId,
      result: 'rejected',
      code: 'invalid',
      field: null,
      detail,
    } as const
    // A second refusal of the database can only come from what the op says of itself: then keep nothing.
    const isRefused = only.read.kind === 'refused'
    return isRefused
      ? { taken: [], results: [result] }
      : takeBatch([{ ...only, read: { kind: 'refused', result } }], sender, spent)
  }
  const middle = Math.ceil(ops.length / 2)
  const first = await takeBatch(ops.slice(0, middle), sender, spent)
  const second = await takeBatch(ops.slice(middle), sender, spent)
  return {
    taken: [...first.taken, ...second.taken],
    results: [...first.results, ...second.results],
  }
}

/**
 * Judges ops and writes what becomes of them, all in the caller's transaction: who rolls it back has
 * settled nothing. Locks the shop's counter once something is to be written.
 */
export async function settle(
  tx: ShopTx,
  ops: readonly ReadOp[],
  sender: Sender,
  log: string | null = null,
): Promise<Plan> {
  const { actor, deviceId } = sender
  const nowMs = Date.parse(sender.at)
  const read = (seq: number): Promise<Known> =>
    loadKnown(tx, { actor, deviceId, at: { nowMs, seq }, ops })
  // The counter is read first: as long as it stands there, what is read after it is still so.
  const { epoch, seq: readAt } = await logStand(tx)
  if (log !== null && epoch !== null && log !== epoch) throw new RestoredSince()
  let known = await read(readAt)
  let plan = planPush(ops, known)
  if (plan.outcomes.length === 0) return plan
  // Hashes take longest of all, so the links of mere evidence are made before the lock.
  const isEvidence = addsOnly(ops, plan)
  const { entries, advice } = plan.effects
  let links = isEvidence ? await linkEntries(tx, { entries, receivedAt: sender.at }) : null
  if (links !== null && advice.length === 0) {
    if (await applyEvidence(tx, { plan, known, sender, links, rests: restsOn(ops, known) }))
      return plan
  }
  const lockedAt = await lockShop(
    tx,
    entries.map(({ jobId }) => jobId),
  )
  if (await isOvertaken(tx, { ops, plan, known, lockedAt })) {
    known = await read(lockedAt)
    plan = planPush(ops, known)
    links = null
  }
  await applyPlan(tx, { plan, known, sender, links })
  return plan
}
