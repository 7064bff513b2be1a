import { createHash } from 'node:crypto'
import { asShop, type ShopTx } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { lockShop } from '@/db/queries/changes'
import { noteWipe } from '@/db/queries/devices'
import {
  keepInQuarantine,
  type Quarantine,
  type QuarantineOp,
  quarantinedTexts,
  quarantineLoad,
} from '@/db/queries/quarantine'
import { findOps } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import type { LogBody } from '@/lib/model/log-entry'
import type { Actor } from '@/lib/model/person'
import type { Instant } from '@/lib/model/time'
import { laterAnswer, type PushAnswer } from './push'
import { isSameOp, type ReadOp, readOp } from './read-ops'

/** A sender who may hand over and do nothing else (R22): a revoked phone, or that of somebody who left. */
export type QuarantineSender = {
  actor: Actor
  deviceId: Id
  why: Quarantine
  at: Instant
  newId: () => Id
}

/**
 * How much of one phone quarantine holds (a choice: some years of a busy mechanic's records). Past it nothing
 * is taken before the owner has decided, so that a phone in wrong hands does not fill the shop.
 */
const MOST_ITEMS = 10_000
const MOST_BYTES = 32 * 1024 * 1024

/**
 * Takes what a revoked phone still sends (Q2): every op is kept as sent, whatever its time, and touches no
 * job before the owner accepts it. Everything is `taken`, so that the phone may empty itself. An op that
 * the shop settled before is not kept again; other bytes under a used id are kept under their own hash. When
 * quarantine is full of this phone, everything is `retry`: it stays on the phone.
 */
export async function takeIntoQuarantine(
  ops: readonly unknown[],
  sender: QuarantineSender,
): Promise<PushAnswer> {
  if (ops.length === 0) return { taken: [], results: [] }
  const read = ops.map(readOp)
  const isTaken = await asShop(sender.actor.shopId, async (tx) => {
    // Twins of one push come one after the other, so that the record says what was kept.
    await lockShop(tx)
    const fresh = await freshOps(tx, read)
    if (fresh.size === 0) return true
    if (await isFull(tx, sender.deviceId)) return false
    await keepInQuarantine(
      tx,
      [...fresh].map(([id, op]) => rowOf(id, op, sender)),
    )
    await appendAudit(tx, [keptEntry(sender, { count: fresh.size })])
    return true
  })
  if (!isTaken) return laterAnswer(read)
  const taken = new Set(read.flatMap((op) => (op.named ? [op.opId] : [])))
  return { taken: [...taken], results: [] }
}

async function isFull(tx: ShopTx, deviceId: Id): Promise<boolean> {
  const { items, bytes } = await quarantineLoad(tx, deviceId)
  return items >= MOST_ITEMS || bytes >= MOST_BYTES
}

/** What is neither settled nor in quarantine yet, by the id it is kept under. */
async function freshOps(tx: ShopTx, read: readonly ReadOp[]): Promise<Map<string, ReadOp>> {
  const ids = read.map((op) => op.opId)
  const settled = await findOps(tx, ids)
  const held = await quarantinedTexts(tx, [...ids, ...read.map((op) => hashOf(op.raw))])
  const fresh = new Map<string, ReadOp>()
  for (const op of read) {
    const before = settled.get(op.opId)
    const final = before !== undefined && before.outcome !== 'blocked' ? before.raw : undefined
    const used = final ?? held.get(op.opId) ?? fresh.get(op.opId)?.raw
    if (used !== undefined && isSameOp(op.raw, used)) continue
    const id = op.named && used === undefined ? op.opId : hashOf(op.raw)
    if (!held.has(id)) fresh.set(id, op)
  }
  return fresh
}

const hashOf = (text: string) => createHash('sha256').update(text).digest('hex')

function rowOf(id: string, op: ReadOp, sender: QuarantineSender): QuarantineOp {
  const { actor, deviceId, why, at } = sender
  const known = op.read.kind === 'op' ? op.read.op : null
  return {
    opId: id,
    deviceId,
    personId: actor.personId,
    roles: [...actor.roles],
    dseq: op.dseq,
    kind: known?.kind ?? op.read.kind,
    entityId: known?.entityId ?? null,
    jobId: known?.jobId ?? null,
    fileHash: known?.kind === 'log.add' ? fileHashOf(known.fields.body) : null,
    raw: op.raw,
    why,
    receivedAt: at,
  }
}

/** The SHA-256 of the file that an entry names; null for none. */
export function fileHashOf(body: LogBody): string | null {
  if (body.kind === 'photo') return body.photo.hash
  if (body.kind === 'voice') return body.voice.hash
  return body.kind === 'code' ? body.context.photo : null
}

const keptEntry = (sender: QuarantineSender, detail: Record<string, unknown>) => ({
  id: sender.newId(),
  jobId: null,
  at: sender.at,
  actorId: sender.actor.personId,
  deviceId: sender.deviceId,
  action: 'quarantine.kept',
  entity: 'device',
  entityId: sender.deviceId,
  detail: { why: sender.why, ...detail },
})

/**
 * Whether the phone is to empty itself now (Q4): it said that nothing is left on it. `held` is what it told;
 * a phone that told nothing keeps everything. The first time is put on record.
 */
export async function wipeOrder(
  tx: ShopTx,
  sender: QuarantineSender & { wipeToldAt: Instant | null },
  held: { ops: number; photos: number } | null | undefined,
): Promise<'none' | 'wipe'> {
  if (!held || held.ops > 0 || held.photos > 0) return 'none'
  if (sender.wipeToldAt === null) {
    await noteWipe(tx, { id: sender.deviceId, at: sender.at })
    await appendAudit(tx, [{ ...keptEntry(sender, {}), action: 'device.wipeTold' }])
  }
  return 'wipe'
}
