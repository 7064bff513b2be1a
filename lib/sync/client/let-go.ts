import type { Id } from '@/lib/model/id'
import type { Op } from '@/lib/sync/protocol/op'
import { rowsTouched } from './apply-op'
import { commit, noWrites } from './commit'
import type { Core } from './core'
import { letGoWrites } from './let-go-writes'
import { readMeta, rowKey, writeMeta } from './phone-db'
import { readOverlay, rebasedRow } from './rebase'

/** Lets a stuck record go and takes it off the rows it lay on. Anything but a stuck one stays. `nowMs` in ms. */
export async function letRecordGo(core: Core, opId: Id, nowMs: number): Promise<void> {
  await commit(core, async () => {
    const record = await core.db.outbox.where('opId').equals(opId).first()
    if (record?.state !== 'stuck') return null
    const op = await core.cache.op(core.keys.outbox, record)
    const writes = { ...noWrites(), ...letGoWrites([record], nowMs) }
    const overlay = await readOverlay(core, [{ ...record, state: 'done' }])
    for (const at of rowsTouched(op)) {
      const held = await core.db.row.get(rowKey(at.entity, at.id))
      if (held === undefined) continue
      const row = await rebasedRow(core, held.key, held, overlay)
      if (row === null) writes.dropRows.push(held.key)
      else writes.rows.push(row)
    }
    const hash = fileOf(op)
    const photo = hash === null ? undefined : await core.db.photo.get(hash)
    if (photo !== undefined && photo.state !== 'sent') {
      writes.photos.push({ ...photo, state: 'stuck', reason: 'entryLetGo' })
    }
    core.cache.forgetOps([opId])
    return writes
  })
}

/** The photo or voice note that an entry names. */
function fileOf(op: Op): string | null {
  if (op.kind !== 'log.add') return null
  const { body } = op.fields
  if (body.kind === 'photo') return body.photo.hash
  return body.kind === 'voice' ? body.voice.hash : null
}

/**
 * Lets the bytes of a stuck photo or voice note go; the one way in which unsent bytes are deleted. Nothing
 * here can tell that they are anywhere else: the screen asks the person for it first. It stays counted.
 */
export async function letPhotoGo(core: Core, hash: string): Promise<void> {
  const { db } = core
  await db.transaction('rw', [db.photo, db.photoBytes, db.meta], async () => {
    if ((await db.photo.get(hash))?.state !== 'stuck') return
    await db.photo.delete(hash)
    await db.photoBytes.delete(hash)
    await writeMeta(db, 'filesLetGo', ((await readMeta(db, 'filesLetGo')) ?? 0) + 1)
  })
}
