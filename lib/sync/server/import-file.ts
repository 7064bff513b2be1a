import { asShop } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { findPhoto } from '@/db/queries/photos'
import { findOps, type StoredOp } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { Result } from '@/lib/model/result'
import { fail, ok } from '@/lib/model/result'
import type { Files } from '@/lib/ports/files'
import { MAX_OPS, type OpResult } from '@/lib/sync/protocol/message'
import type { ImportAnswer, ImportOutcome, UnsentBody } from '@/lib/sync/protocol/unsent-file'
import { takePhoto } from './photos'
import { takePush } from './push'
import { type CheckedFile, checkFile, type FileProblem } from './unsent-file'

/** Who brings a file of unsent work to the desk, and whether it is only to be looked at. */
export type Bringing = {
  desk: Actor
  text: string
  apply: boolean
  files: Files
  now: number
  newId: () => Id
}

type ListedOp = ImportAnswer['ops'][number]
type ListedPhoto = ImportAnswer['photos'][number]
type Became = Pick<ListedOp, 'outcome' | 'code' | 'detail'>

/**
 * Takes what a phone could not send, from the file it made (IM2): the same way as a push of that phone,
 * under the roles its person has today, so what came already changes nothing. Refused is refused item by
 * item and stays in the file. What was done is in the audit trail under the name of who brought it.
 */
export async function importFile(with_: Bringing): Promise<Result<ImportAnswer, FileProblem>> {
  const checked = await checkFile(with_.desk, with_.text)
  if (!checked.ok) return fail(checked.problem)
  const file = checked.value
  const became = with_.apply ? await takeOps(file, with_) : await lookAtOps(file)
  const ops = file.body.ops.map((held, index): ListedOp => {
    const head = headOf(held.op, index)
    const now = held.state === 'letGo' ? LET_GO : (became.get(head.opId) ?? settled('later'))
    return { ...head, since: held.since, heldAs: held.state, ...now }
  })
  const photos = await takePhotos(file, with_)
  const answer: ImportAnswer = {
    person: { id: file.actor.personId, name: file.actor.name },
    device: { id: file.device.id, name: file.device.name },
    madeAt: file.madeAt,
    applied: with_.apply,
    ops,
    photos,
  }
  if (with_.apply) await keepTrail(answer, with_)
  return ok(answer)
}

/** What an op says of itself, for the list; nothing of it is believed before it was judged. */
function headOf(op: unknown, index: number): Pick<ListedOp, 'opId' | 'kind' | 'entry' | 'jobId'> {
  const said = (typeof op === 'object' && op !== null ? op : {}) as Record<string, unknown>
  const body = (said.fields as { body?: { kind?: unknown } } | undefined)?.body
  const text = (value: unknown) => (typeof value === 'string' ? value.slice(0, 64) : null)
  return {
    opId: text(said.id) ?? `#${index}`,
    kind: text(said.kind) ?? 'unknown',
    entry: text(body?.kind),
    jobId: text(said.jobId),
  }
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

const settled = (outcome: ImportOutcome): Became => ({ outcome, code: null, detail: null })

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

/** What the shop knows of each op without taking any. */
async function lookAtOps({ actor, body }: CheckedFile): Promise<Map<string, Became>> {
  const ids = body.ops.map((held, index) => headOf(held.op, index).opId)
  const known = await asShop(actor.shopId, (tx) => findOps(tx, ids))
  return new Map(ids.map((opId) => [opId, knownAs(known.get(opId))]))
}

function knownAs(op: StoredOp | undefined): Became {
  if (op === undefined || op.outcome === 'quarantined') return settled('new')
  if (op.outcome === 'rejected') return { outcome: 'refused', code: op.code, detail: op.detail }
  if (op.outcome === 'blocked') return { outcome: 'blocked', code: op.blockedOn, detail: null }
  return settled('already')
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
      already: count(answer.ops, 'already'),
      refused: count(answer.ops, 'refused'),
      photos: answer.photos.length,
      photosTaken: count(answer.photos, 'taken'),
    },
  }
  await asShop(desk.shopId, (tx) => appendAudit(tx, [entry]))
}
