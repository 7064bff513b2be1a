import { asShop } from '@/db/client'
import { findPhoto } from '@/db/queries/photos'
import { type Quarantine, quarantinedTexts } from '@/db/queries/quarantine'
import { MAX_OPS } from '@/lib/sync/protocol/message'
import type { UnsentBody } from '@/lib/sync/protocol/unsent-file'
import {
  type Bringing,
  headOf,
  type Listed,
  type ListedOp,
  type ListedPhoto,
  lookAtOps,
  settled,
} from './import-list'
import { takeIntoQuarantine } from './quarantine'
import { isInQuarantine, keepFile } from './quarantine-files'
import type { CheckedFile } from './unsent-file'

type AsideFile = CheckedFile & { quarantine: Quarantine }

/**
 * Puts the file of a phone that may not write any more into its quarantine (IM4), as if the phone had sent
 * it: everything in it, also what its person let go, as the owner decides on each. Nothing touches a job.
 */
export async function putAside(file: AsideFile, with_: Bringing): Promise<Listed> {
  const ops = await listOps(file)
  if (with_.apply) await keepOps(file, with_)
  const now = with_.apply ? asKept : (op: ListedOp) => op
  const photos: ListedPhoto[] = []
  for (const photo of file.body.photos) photos.push(await putPhotoAside(file, photo, with_))
  return { ops: ops.map(now), photos }
}

const asKept = (op: ListedOp): ListedOp =>
  op.outcome === 'new' ? { ...op, ...settled('quarantined') } : op

/** Each record with what the shop knows of it, settled or in quarantine. */
async function listOps(file: AsideFile): Promise<ListedOp[]> {
  const { actor, body } = file
  const known = await lookAtOps(file)
  const heads = body.ops.map((held, index) => headOf(held.op, index))
  const aside = await asShop(actor.shopId, (tx) =>
    quarantinedTexts(
      tx,
      heads.map((head) => head.opId),
    ),
  )
  return heads.map((head, index) => {
    const { since, state } = body.ops[index] ?? { since: file.madeAt, state: 'waiting' as const }
    const here = aside.has(head.opId) ? settled('already') : known.get(head.opId)
    // What waited for its parent is not settled: it goes into quarantine like the rest.
    const now = here === undefined || here.outcome === 'blocked' ? settled('new') : here
    return { ...head, since, heldAs: state, ...now }
  })
}

async function keepOps(file: AsideFile, { now, newId }: Bringing): Promise<void> {
  const { actor, device, quarantine: why, body } = file
  const sender = { actor, deviceId: device.id, why, at: new Date(now).toISOString(), newId }
  const ops = body.ops.map((held) => held.op)
  for (let first = 0; first < ops.length; first += MAX_OPS) {
    await takeIntoQuarantine(ops.slice(first, first + MAX_OPS), sender)
  }
}

async function putPhotoAside(
  file: AsideFile,
  photo: UnsentBody['photos'][number],
  { apply, files, now, newId }: Bringing,
): Promise<ListedPhoto> {
  const { actor, device, quarantine: why } = file
  const { hash, jobId, since } = photo
  const bytes = photo.base64 === null ? null : Buffer.from(photo.base64, 'base64')
  const row = { hash, jobId, since, bytes: bytes?.length ?? 0, code: null }
  const of = { device: { actor, deviceId: device.id }, hash, files, now, why, newId }
  const known = await asShop(actor.shopId, (tx) => findPhoto(tx, hash))
  if (known || (await isInQuarantine(of)) === 'here') return { ...row, outcome: 'already' }
  if (bytes === null) return { ...row, outcome: 'refused', code: 'bytesGone' }
  if (!apply) return { ...row, outcome: 'new' }
  const kept = await keepFile({ ...of, bytes })
  return kept.ok
    ? { ...row, outcome: 'quarantined' }
    : { ...row, outcome: 'refused', code: kept.problem.kind }
}
