import { generateKeyPairSync } from 'node:crypto'
import type { Id } from '@/lib/model/id'
import type { Job, JobState } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Actor } from '@/lib/model/person'
import { AppError, fail, ok, type Result } from '@/lib/model/result'
import type { Instant } from '@/lib/model/time'
import { asShop, type ShopTx } from '../client'
import { appendAudit } from './audit'
import { lockShop, takeChanges } from './changes'
import { bookItem, versionOfJob } from './code-book'
import type { NotThere } from './desk-writes'
import { findJob, setJobStand } from './jobs'
import { appendLogEntries } from './log-entries'
import { getShop } from './shop'
import { enqueueWork } from './work'

/** What a closing or reopening leaves behind: the state, the line of the job log, and the trail's figures. */
export type Move = { to: JobState; words: string; detail: Record<string, unknown> }
type Input = {
  jobId: Id
  /** The fault named as the cause; its name is looked up in the code book that the job holds. */
  fault: string | null
  stamp: { auditId: Id; entryId: Id; at: Instant; engineVersion: string }
  /** When a job closed now leaves the phones. */
  leaveFieldAt: Instant
}

/**
 * Closes or reopens a job at the desk when `decide` answers how: state, a line in its log, change numbers,
 * audit entry and the task that takes it off the phones, in one transaction under the shop's counter.
 * `decide` gets the job and the name of the fault. `notFound`: no such job, or no such fault in the book.
 */
export function moveJobAtDesk<P>(
  actor: Actor,
  { jobId, fault, stamp, leaveFieldAt }: Input,
  decide: (job: Job, faultName: string | null) => Result<Move, P>,
): Promise<Result<null, P | NotThere>> {
  return asShop(actor.shopId, async (tx) => {
    await lockShop(tx, [jobId])
    const job = await findJob(tx, jobId)
    // By the job's own book: its suspects were listed from that one, and the closing moves it to no other.
    const version = await versionOfJob(tx, jobId)
    const named = fault === null ? null : await bookItem(tx, { kind: 'fault', id: fault, version })
    if (!job || named === undefined) return fail({ kind: 'notFound' as const })
    const decided = decide(job, named?.item.kind === 'fault' ? named.item.name : null)
    if (!decided.ok) return decided
    const { to, words, detail } = decided.value
    const { peopleState, machineState, wayOut } = job
    const stand = { state: to, peopleState, machineState, wayOut }
    await setJobStand(tx, { id: jobId, stand, by: { deviceId: null, at: stamp.at } })
    const entry = await noteAtDesk(tx, actor, { jobId, stamp, words, book: named?.version ?? null })
    await appendLogEntries(tx, { entries: [entry], receivedAt: stamp.at })
    await appendAudit(tx, [
      {
        id: stamp.auditId,
        jobId,
        at: stamp.at,
        actorId: actor.personId,
        deviceId: null,
        action: to === 'closed' ? 'job.close' : 'job.reopen',
        entity: 'job',
        entityId: jobId,
        detail: { from: job.state, to, entryId: stamp.entryId, ...detail },
      },
    ])
    if (to === 'closed') {
      const key = `leaveField:${jobId}`
      await enqueueWork(tx, { task: 'leaveField', payload: {}, key, runAt: leaveFieldAt })
    }
    // Whole: its log, the new entry among it, travels again with the job.
    await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole: true }])
    return ok(null)
  })
}

type Note = { jobId: Id; stamp: Input['stamp']; words: string; book: number | null }

async function noteAtDesk(tx: ShopTx, actor: Actor, note: Note): Promise<LogEntry> {
  const { jobId, stamp, words, book } = note
  const { zone } = await getShop(tx)
  return {
    id: stamp.entryId,
    jobId,
    supersedes: null,
    happenedAt: stamp.at,
    writtenAt: stamp.at,
    zone,
    authorId: actor.personId,
    deviceId: await deskOf(tx, actor.personId, stamp.at),
    engineVersion: stamp.engineVersion,
    bookVersion: book,
    body: { kind: 'note', words },
  }
}

/**
 * Every line of a job log names the device it was written on. A person's desk is one under the person's
 * own id, so that such a line can be told from one of the field; its key signs nothing, as the private
 * half is dropped here.
 */
async function deskOf(tx: ShopTx, personId: Id, at: Instant): Promise<Id> {
  const held = await deskDevice(tx, personId)
  if (held === undefined) await addDesk(tx, personId, at)
  const desk = held ?? (await deskDevice(tx, personId))
  if (desk?.personId !== personId) throw new AppError('deskTaken', { context: { personId } })
  return personId
}

const deskDevice = (tx: ShopTx, personId: Id) =>
  tx
    .selectFrom('device')
    .select('personId')
    .where('shopId', '=', tx.shopId)
    .where('id', '=', personId)
    .executeTakeFirst()

async function addDesk(tx: ShopTx, personId: Id, at: Instant): Promise<void> {
  const { publicKey } = generateKeyPairSync('ec', { namedCurve: 'P-256' })
  await tx
    .insertInto('device')
    .values({
      shopId: tx.shopId,
      id: personId,
      personId,
      name: 'Desk',
      publicKey: JSON.stringify(publicKey.export({ format: 'jwk' })),
      enrolledAt: at,
      lastSeenAt: null,
    })
    .onConflict((on) => on.columns(['shopId', 'id']).doNothing())
    .execute()
}
