import { asShop } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { findPhoto } from '@/db/queries/photos'
import { fail, ok, type Result } from '@/lib/model/result'
import { MAX_OPS, type OpResult } from '@/lib/sync/protocol/message'
import type { ImportAnswer, ImportOutcome, UnsentBody } from '@/lib/sync/protocol/unsent-file'
import {
  type Became,
  type Bringing,
  headOf,
  type Listed,
  type ListedOp,
  type ListedPhoto,
  lookAtOps,
  settled,
} from './import-list'
import { putAside } from './import-quarantine'
import { takePhoto } from './photos'
import { takePush } from './push'
import { type CheckedFile, checkFile, type FileProblem } from './unsent-file'

/**
 * Takes what a phone could not send, from the file it made (IM2): the same way as a push of that phone,
 * under the roles its person has today, so what came already changes nothing. Refused is refused item by
 * item and stays in the file. What was done is in the audit trail under the name of who brought it.
 */
export async function importFile(with_: Bringing): Promise<Result<ImportAnswer, FileProblem>> {
  const checked = await checkFile(with_.desk, with_.text)
  if (!checked.ok) return fail(checked.problem)
  const file = checked.value
  const { quarantine } = file
  const answer: ImportAnswer = {
    person: { id: file.actor.personId, name: file.actor.name },
    device: { id: file.device.id, name: file.device.name },
    madeAt: file.madeAt,
    quarantine,
    applied: with_.apply,
    ...(quarantine === null
      ? await takeIn(file, with_)
      : await putAside({ ...file, quarantine }, with_)),
  }
  if (with_.apply) await keepTrail(answer, with_)
  return ok(answer)
}

async function takeIn(file: CheckedFile, with_: Bringing): Promise<Listed> {
  const became = with_.apply ? await takeOps(file, with_) : await lookAtOps(file)
  const ops = file.body.ops.map((held, index): ListedOp => {
    const head = headOf(held.op, index)
    const now = held.state === 'letGo' ? LET_GO : (became.get(head.opId) ?? settled('later'))
    return { ...head, since: held.since, heldAs: held.state, ...now }
  })
  return { ops, photos: await takePhotos(file, with_) }
}

/** Pushes the ops in the phone's order; blocked ones once more, as their parents may have come after them. */
async function takeOps(
  { actor, device, body }: CheckedFile,
  { now, newId }: Bringing,
): Promise<Map<string, Became>> {
  const sender = { actor, deviceId: device.id, at: new Date(now).toISOString(), newId }
  const became = new Map<string, Became>()
  const push = async (ops: readonly unknown[]) => {
    for (let first = 0; first < ops.length; first += MAX_OPS) {
      const answer = await takePush(ops.slice(first, first + MAX_OPS), sender)
      for (const opId of answer.taken) became.set(opId, settled('taken'))
      for (const result of answer.results) became.set(result.opId, outcomeOf(result))
    }
  }
  const ops = body.ops.filter((held) => held.state !== 'letGo').map((held) => held.op)
  await push(ops)
  const blocked = ops.filter((op, at) => became.get(headOf(op, at).opId)?.outcome === 'blocked')
  await push(blocked)
  return became
}

/** Given up by its own person: it is shown, and not taken behind their back. */
const LET_GO: Became = { outcome: 'refused', code: 'letGo', detail: null }

function outcomeOf(result: OpResult): Became {
  switch (result.result) {
    case 'duplicate':
      return settled('already')
    case 'merged':
      return settled('taken')
    case 'rejected':
      return { outcome: 'refused', code: result.code, detail: result.detail }
    case 'blocked':
      return { outcome: 'blocked', code: result.on, detail: null }
    case 'retry':
      return settled('later')
  }
}

async function takePhotos(file: CheckedFile, with_: Bringing): Promise<ListedPhoto[]> {
  const listed: ListedPhoto[] = []
  for (const photo of file.body.photos) listed.push(await takeOnePhoto(file, photo, with_))
  return listed
}

async function takeOnePhoto(
  { actor, device }: CheckedFile,
  photo: UnsentBody['photos'][number],
  { apply, files, now }: Bringing,
): Promise<ListedPhoto> {
  const { hash, jobId, since } = photo
  const bytes = photo.base64 === null ? null : Buffer.from(photo.base64, 'base64')
  const row = { hash, jobId, since, bytes: bytes?.length ?? 0, code: null }
  const known = await asShop(actor.shopId, (tx) => findPhoto(tx, hash))
  if (known) return { ...row, outcome: 'already' }
  if (bytes === null) return { ...row, outcome: 'refused', code: 'bytesGone' }
  if (!apply) return { ...row, outcome: 'new' }
  const from = { actor, deviceId: device.id }
  const kept = await takePhoto({ device: from, hash, bytes, files, now })
  return kept.ok
    ? { ...row, outcome: 'taken' }
    : { ...row, outcome: 'refused', code: kept.problem.kind }
}

async function keepTrail(answer: ImportAnswer, { desk, now, newId }: Bringing): Promise<void> {
  const count = (of: readonly { outcome: ImportOutcome }[], outcome: ImportOutcome) =>
    of.filter((one) => one.outcome === outcome).length
  const entry = {
    id: newId(),
    jobId: null,
    at: new Date(now).toISOString(),
    actorId: desk.personId,
    deviceId: null,
    action: 'unsent.imported',
    entity: 'device',
    entityId: answer.device.id,
    detail: {
      fileMadeAt: answer.madeAt,
      records: answer.ops.length,
      taken: count(answer.ops, 'taken'),
      quarantined: count(answer.ops, 'quarantined'),
      already: count(answer.ops, 'already'),
      refused: count(answer.ops, 'refused'),
      photos: answer.photos.length,
      photosTaken: count(answer.photos, 'taken'),
    },
  }
  await asShop(desk.shopId, (tx) => appendAudit(tx, [entry]))
}
