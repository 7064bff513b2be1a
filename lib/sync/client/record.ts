import type { Id } from '@/lib/model/id'
import { AppError } from '@/lib/model/result'
import { MAX_OP_BYTES } from '@/lib/sync/protocol/message'
import { type Op, type OpInput, op as opShape } from '@/lib/sync/protocol/op'
import { applyOpLocally, rowsTouched, type Touched } from './apply-op'
import { commit, noWrites, type Writes } from './commit'
import { type Core, opPlace } from './core'
import { isFull, withRoom } from './free-room'
import { letGoWrites } from './let-go-writes'
import { type OutboxRecord, type PhotoRecord, type RowRecord, readMeta, rowKey } from './phone-db'
import { type Sealed, sealBytes, sealJson } from './seal'
import { stampOps } from './stamp'
import type { NewPhoto } from './views'
import { isWiped } from './wipe'

/** What one call keeps together. */
export type Recorded = {
  ops: readonly OpInput[]
  /** An id for each op, made before, so that a second try keeps them. */
  ids: readonly Id[]
  deviceId: Id
  nowMs: number
  photos: readonly NewPhoto[]
  clearDrafts: readonly string[]
  /** A refused record that these take the place of: it is let go in the same transaction. */
  insteadOf?: OutboxRecord
}

/**
 * Keeps ops with the rows they change, their photos and the drafts they finish, all in one transaction
 * (P1): after a kill at any moment either all of it is there or none. Throws AppError `badRecord` when
 * an op has not the shape the shop takes, `recordTooBig`, and when the phone has no room `noRoomForPhoto`
 * (the same record without a photo may fit) or `storeFull`; drafts then stay.
 */
export async function record(core: Core, of: Recorded): Promise<void> {
  const photos = await Promise.all(of.photos.map((photo) => sealPhoto(core, photo, of.nowMs)))
  core.step('photosSealed')
  try {
    await withRoom(core, () => commit(core, () => prepare(core, of, photos)))
  } catch (cause) {
    if (!isFull(cause)) throw cause
    throw new AppError(photos.length > 0 ? 'noRoomForPhoto' : 'storeFull', { cause })
  }
  core.step('kept')
}

async function prepare(core: Core, of: Recorded, photos: SealedPhoto[]): Promise<Writes | null> {
  // Written already, though the word of it was lost with the connection.
  const [firstId] = of.ids
  if (firstId !== undefined && (await core.db.outbox.where('opId').equals(firstId).count()) > 0) {
    return null
  }
  core.step('isNew')
  if (await isWiped(core.db)) throw new AppError('storeWiped')
  core.step('isOpen')
  const { ops, counter } = await stampOps({
    db: core.db,
    inputs: of.ops,
    ids: of.ids,
    deviceId: of.deviceId,
    nowMs: of.nowMs,
  })
  core.step('stamped')
  const checked = ops.map(checkedOp)
  return {
    ...noWrites(),
    ...(of.insteadOf === undefined ? {} : letGoWrites([of.insteadOf], of.nowMs)),
    outbox: await Promise.all(checked.map((op) => sealOp(core, op, of.nowMs))),
    rows: await changedRows(core, checked),
    photos: photos.map(({ about }) => about),
    photoBytes: photos.map(({ about, bytes }) => ({ hash: about.hash, bytes })),
    dropDrafts: [...of.clearDrafts],
    meta: { stamp: counter },
  }
}

function checkedOp(stamped: Op): Op {
  const read = opShape.safeParse(stamped)
  if (!read.success) {
    const fields = read.error.issues.map((issue) => issue.path.join('.'))
    throw new AppError('badRecord', { context: { kind: stamped.kind, fields }, cause: read.error })
  }
  return read.data
}

async function sealOp(core: Core, op: Op, nowMs: number): Promise<OutboxRecord> {
  const sealed = await sealJson(core.keys.outbox, opPlace(op.dseq, op.id), op)
  if (sealed.byteLength > MAX_OP_BYTES) throw new AppError('recordTooBig')
  core.step('opSealed')
  core.cache.keepOp(op)
  return {
    dseq: op.dseq,
    opId: op.id,
    kind: op.kind,
    jobId: op.jobId,
    entityId: op.entityId,
    since: nowMs,
    bytes: sealed.byteLength,
    state: 'waiting',
    reason: null,
    detail: null,
    unsettled: 0,
    takenAt: null,
    op: sealed,
  }
}

type SealedPhoto = { about: PhotoRecord; bytes: Sealed }

async function sealPhoto(core: Core, photo: NewPhoto, nowMs: number): Promise<SealedPhoto> {
  const { hash, jobId, mime, bytes, thumb } = photo
  const { store } = core.keys
  const small = thumb === undefined ? null : await sealBytes(store, thumbPlace(hash), thumb)
  core.step('thumbSealed')
  const about: PhotoRecord = {
    hash,
    jobId,
    mime,
    size: bytes.byteLength,
    since: nowMs,
    state: 'waiting',
    reason: null,
    uploaded: null,
    sentAt: null,
    thumb: small,
  }
  return { about, bytes: await sealBytes(store, photoPlace(hash), bytes) }
}

/** The place a photo is sealed for. */
export const photoPlace = (hash: string) => `photo/${hash}`
/** The place the small copy of a photo is sealed for. */
export const thumbPlace = (hash: string) => `thumb/${hash}`

/** Every row the ops change, as it is after all of them. */
async function changedRows(core: Core, ops: Op[]): Promise<Omit<RowRecord, 'turn'>[]> {
  const touched = new Map<string, { at: Touched; ops: Op[] }>()
  for (const op of ops) {
    for (const at of rowsTouched(op)) {
      const key = rowKey(at.entity, at.id)
      const entry = touched.get(key) ?? { at, ops: [] }
      entry.ops.push(op)
      touched.set(key, entry)
    }
  }
  const gen = (await readMeta(core.db, 'gen')) ?? 0
  core.step('generation')
  const held = await core.db.row.bulkGet([...touched.keys()])
  core.step('rowsHeld')
  const rows = await Promise.all(
    [...touched].map(([key, entry], index) =>
      changedRow(core, { key, ...entry, held: held[index], gen }),
    ),
  )
  return rows.filter((row) => row !== null)
}

async function changedRow(
  core: Core,
  of: { key: string; at: Touched; ops: Op[]; held: RowRecord | undefined; gen: number },
): Promise<Omit<RowRecord, 'turn'> | null> {
  const { key, at, held } = of
  const before = held && (await core.cache.row(core.keys, held))
  core.step('rowOpened')
  const who = { personId: core.personId }
  const after = of.ops.reduce((row, op) => applyOpLocally(row, at, op, who), before)
  if (after === undefined || after === before) return null
  const body = await sealJson(core.keys.store, key, after)
  core.step('rowSealed')
  return {
    key,
    entity: at.entity,
    id: at.id,
    jobId: held?.jobId ?? at.jobId,
    ...(held?.mergedInto === undefined ? {} : { mergedInto: held.mergedInto }),
    ...(held?.told === undefined ? {} : { told: held.told }),
    seq: held?.seq ?? null,
    gen: held?.gen ?? of.gen,
    base: held?.base ?? null,
    body,
  }
}
