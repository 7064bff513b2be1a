import type { ShopTx } from '@/db/client'
import { isTouchedSince } from '@/db/queries/changes'
import type { Evidence } from '@/db/queries/evidence'
import { knownOps } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import type { Known } from './known'
import type { Plan } from './plan'
import type { ReadOp } from './read-ops'

/**
 * Whether a plan still holds once the counter is locked. Plans are made without the lock; in a shop of many
 * phones the counter has mostly moved meanwhile, but by changes that the plan does not depend on. Only of
 * plain evidence is that easy to say: anything else is planned again whenever the shop moved at all.
 */

/** True for ops that add evidence to jobs and change no row that is there. */
const isEvidence = ({ read }: ReadOp): boolean =>
  read.kind !== 'op' || read.op.kind === 'log.add' || read.op.kind === 'advice.keep'

/** True when the plan only adds entries and advice: no job moves, or comes back, by it. */
export function addsOnly(ops: readonly ReadOp[], { effects }: Plan): boolean {
  return ops.every(isEvidence) && effects.changedJobs.size === 0 && effects.steps.length === 0
}

/** True when what was planned has to be planned anew; call it with the counter locked. */
export async function isOvertaken(
  tx: ShopTx,
  of: { ops: readonly ReadOp[]; plan: Plan; known: Known; lockedAt: number },
): Promise<boolean> {
  const { ops, plan, known, lockedAt } = of
  const readAt = known.at.seq
  if (lockedAt !== readAt && !addsOnly(ops, plan)) return true
  if (await hasTwin(tx, ops, known)) return true
  if (lockedAt === readAt) return false
  return await isTouchedSince(tx, { seq: readAt, ...dependsOn(ops, known) })
}

/** True when another request settled one of these ops since they were looked up. */
const hasTwin = async (tx: ShopTx, ops: readonly ReadOp[], known: Known): Promise<boolean> =>
  (await knownOps(tx, unseen(ops, known))).size > 0

const unseen = (ops: readonly ReadOp[], known: Known): string[] =>
  ops.map((op) => op.opId).filter((opId) => !known.seen.has(opId))

/** What must stand as it was read for a plan of plain evidence to hold. */
export const restsOn = (ops: readonly ReadOp[], known: Known): Evidence['rests'] => ({
  ...dependsOn(ops, known),
  opIds: unseen(ops, known),
})

/** The jobs, those that go on for them, and the entries that evidence is judged by; and who writes it. */
function dependsOn(
  ops: readonly ReadOp[],
  known: Known,
): { jobIds: readonly Id[]; entityIds: readonly Id[] } {
  const jobIds = new Set<Id>(known.jobs.keys())
  const entityIds = new Set<Id>([known.actor.personId])
  for (const { read } of ops) {
    if (read.kind !== 'op' || !('jobId' in read.op.fields)) continue
    jobIds.add(read.op.fields.jobId)
    entityIds.add(read.op.fields.id)
    if ('supersedes' in read.op.fields && read.op.fields.supersedes !== null) {
      entityIds.add(read.op.fields.supersedes)
    }
  }
  return { jobIds: [...jobIds], entityIds: [...entityIds] }
}
