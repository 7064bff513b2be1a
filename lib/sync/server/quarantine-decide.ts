import { asShop, type ShopTx } from '@/db/client'
import { appendAudit } from '@/db/queries/audit'
import { lockShop } from '@/db/queries/changes'
import { peopleById } from '@/db/queries/people'
import {
  decideQuarantine,
  FILE_KIND,
  fileItemId,
  findQuarantined,
  opsNaming,
  type QuarantineItem,
  waitingInQuarantine,
} from '@/db/queries/quarantine'
import { saveOps } from '@/db/queries/sync-ops'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { AppError, fail, ok, type Result } from '@/lib/model/result'
import type { Instant } from '@/lib/model/time'
import type { Files } from '@/lib/ports/files'
import type { OpResult } from '@/lib/sync/protocol/message'
import { troubleOf } from './database-trouble'
import { settle } from './push'
import { letFileIn } from './quarantine-files'
import { readOp } from './read-ops'

/** What the owner's word needs: where files lie, when, and ids for the record. */
export type Deciding = { files: Files; now: number; newId: () => Id }

/**
 * What became of one item. `left`: it stays in quarantine, as it would be refused by the rules that every
 * op meets (`code`, with the field or the present state), or waits for another item (`waits`).
 */
export type Decided =
  | { opId: string; is: 'accepted'; file: 'none' | 'in' | 'notHere' | 'refused' }
  | { opId: string; is: 'refused' }
  | { opId: string; is: 'left'; code: string; detail: string | null }
export type DecideProblem = { kind: 'notFound' | 'decidedBefore' | 'busy' }

/** Rolls the transaction back with the reason; never leaves this file. */
class LeftAlone extends Error {
  readonly code: string
  readonly detail: string | null
  constructor(code: string, detail: string | null) {
    super(code)
    this.code = code
    this.detail = detail
  }
}

const wordOf = (owner: Actor, { now }: Deciding) => ({
  by: owner.personId,
  at: new Date(now).toISOString(),
})

/**
 * Accepts one item (Q5): the op is judged and applied now as its person's, with the roles they had; its
 * file is let in with it. What the rules would refuse is said and stays as it was. Accepting twice is
 * accepting once, and brings a file that was not here the first time.
 */
export async function acceptItem(
  owner: Actor,
  opId: string,
  with_: Deciding,
): Promise<Result<Decided, DecideProblem>> {
  const found = await asShop(owner.shopId, (tx) => findQuarantined(tx, opId))
  if (!found) return fail({ kind: 'notFound' })
  if (found.decision === 'refused') return fail({ kind: 'decidedBefore' })
  if (found.kind === FILE_KIND) return ok(await acceptFile(owner, found, with_))
  try {
    if (found.decision === null) await applyAccepted(owner, found, with_)
  } catch (error) {
    if (error instanceof LeftAlone) {
      return ok({ opId, is: 'left', code: error.code, detail: error.detail })
    }
    const trouble = troubleOf(error)
    if (trouble === 'retry') return fail({ kind: 'busy' })
    if (trouble === 'badData') return ok({ opId, is: 'left', code: 'invalid', detail: null })
    throw error
  }
  return ok({ opId, is: 'accepted', file: await fileOf(owner, found, with_) })
}

/** The op, the owner's word and its record, in one transaction: all of it or nothing. */
async function applyAccepted(owner: Actor, item: QuarantineItem, with_: Deciding): Promise<void> {
  const { by, at } = wordOf(owner, with_)
  const { newId } = with_
  const actor = await authorOf(owner.shopId, item)
  const sender = { actor, deviceId: item.deviceId, at, newId }
  await asShop(owner.shopId, async (tx) => {
    const plan = await settle(tx, [readOp(JSON.parse(item.raw), 0)], sender)
    const [result] = plan.results
    if (result && !isTaken(result)) throw leftBy(result)
    await lockShop(tx)
    const word = { opId: item.opId, decision: 'accepted', reason: null, by, at } as const
    if (!(await decideQuarantine(tx, word))) throw new LeftAlone('decidedBefore', null)
    await appendAudit(tx, [recordOf(owner, item, { with_, action: 'quarantine.accepted' })])
  })
}

const isTaken = (result: OpResult) => result.result === 'duplicate' || result.result === 'merged'

function leftBy(result: OpResult): LeftAlone {
  if (result.result === 'rejected') return new LeftAlone(result.code, result.detail ?? result.field)
  if (result.result === 'blocked') return new LeftAlone('waits', result.on)
  return new LeftAlone('later', null)
}

/** The person whose phone sent it, with the roles they had when it was revoked or they left. */
async function authorOf(shopId: Id, item: QuarantineItem): Promise<Actor> {
  const [person] = await asShop(shopId, (tx) => peopleById(tx, [item.personId]))
  const { personId, roles } = item
  return { shopId, personId, roles, name: person?.name ?? null }
}

type FileStand = Extract<Decided, { is: 'accepted' }>['file']

async function fileOf(owner: Actor, item: QuarantineItem, with_: Deciding): Promise<FileStand> {
  if (item.fileHash === null) return 'none'
  const device = { actor: await authorOf(owner.shopId, item), deviceId: item.deviceId }
  const { files, now } = with_
  const taken = await letFileIn({
    device,
    hash: item.fileHash,
    files,
    now,
    by: owner.personId,
  })
  if (taken.ok) return 'in'
  return taken.problem.kind === 'notFound' ? 'notHere' : 'refused'
}

/** A file whose entry was in the log before: it is let in by itself. */
async function acceptFile(owner: Actor, item: QuarantineItem, with_: Deciding): Promise<Decided> {
  const { opId } = item
  const before = item.decision
  const device = { actor: await authorOf(owner.shopId, item), deviceId: item.deviceId }
  const { files, now } = with_
  const hash = item.fileHash ?? ''
  const taken = await letFileIn({ device, hash, files, now, by: owner.personId })
  if (!taken.ok) return { opId, is: 'left', code: taken.problem.kind, detail: null }
  if (before === null) {
    const record = recordOf(owner, item, { with_, action: 'quarantine.accepted' })
    await asShop(owner.shopId, (tx) => appendAudit(tx, [record]))
  }
  return { opId, is: 'accepted', file: 'in' }
}

/**
 * Refuses one item (Q6): it stays as it is, with the reason; the shop then knows the op as refused, however
 * it comes again. A file that only refused ops name is refused with them.
 */
export async function refuseItem(
  owner: Actor,
  { opId, reason }: { opId: string; reason: string },
  with_: Deciding,
): Promise<Result<Decided, DecideProblem>> {
  const { by, at } = wordOf(owner, with_)
  return await asShop(owner.shopId, async (tx) => {
    await lockShop(tx)
    const item = await findQuarantined(tx, opId)
    if (!item) return fail({ kind: 'notFound' as const })
    if (item.decision === 'accepted') return fail({ kind: 'decidedBefore' as const })
    if (item.decision === 'refused') return ok({ opId, is: 'refused' as const })
    await decideQuarantine(tx, { opId, decision: 'refused', reason, by, at })
    if (item.kind !== FILE_KIND) await saveOps(tx, [refusedOp(item, at)])
    await refuseFileOf(tx, item, { reason, by, at })
    await appendAudit(tx, [recordOf(owner, item, { with_, action: 'quarantine.refused' })])
    return ok({ opId, is: 'refused' as const })
  })
}

/** A file that no op names any more but refused ones goes with them. */
async function refuseFileOf(
  tx: ShopTx,
  item: QuarantineItem,
  word: { reason: string; by: Id; at: Instant },
): Promise<void> {
  const { fileHash: hash, personId } = item
  if (item.kind === FILE_KIND || hash === null) return
  const file = await findQuarantined(tx, fileItemId(hash))
  const ops = await opsNaming(tx, { hash, personId })
  if (!file || ops.some((op) => op.decision !== 'refused')) return
  await decideQuarantine(tx, { opId: file.opId, decision: 'refused', ...word })
}

const refusedOp = (item: QuarantineItem, at: Instant) => ({
  opId: item.opId,
  deviceId: item.deviceId,
  dseq: item.dseq,
  personId: item.personId,
  kind: item.kind,
  entityId: item.entityId,
  jobId: item.jobId,
  raw: item.raw,
  outcome: 'rejected' as const,
  code: 'forbidden',
  field: null,
  detail: 'The owner refused it out of the quarantine',
  blockedOn: null,
  loser: null,
  receivedAt: item.receivedAt,
  settledAt: at,
})

const recordOf = (
  owner: Actor,
  item: QuarantineItem,
  { with_, action }: { with_: Deciding; action: string },
) => ({
  id: with_.newId(),
  jobId: null,
  at: new Date(with_.now).toISOString(),
  actorId: owner.personId,
  deviceId: null,
  action,
  entity: 'quarantine',
  entityId: item.opId,
  detail: {
    kind: item.kind,
    jobId: item.jobId,
    personId: item.personId,
    deviceId: item.deviceId,
    file: item.fileHash,
  },
})

/**
 * Accepts everything of a phone that waits, in the order it was made; what waits for something later in the
 * row is tried again for as long as something lands. Answers what became of each.
 */
export async function acceptAll(owner: Actor, deviceId: Id, with_: Deciding): Promise<Decided[]> {
  const done = new Map<string, Decided>()
  for (let landed = true; landed; ) {
    landed = false
    for (const { opId } of await itemsOf(owner, deviceId)) {
      if (isLeftForGood(done.get(opId))) continue
      const decided = await acceptNow(owner, opId, with_)
      landed ||= decided?.is === 'accepted'
      if (decided) done.set(opId, decided)
    }
  }
  return [...done.values()]
}

const isLeftForGood = (decided: Decided | undefined) =>
  decided?.is === 'left' && decided.code !== 'waits'

/** As acceptItem; null for what somebody else decided meanwhile. */
async function acceptNow(owner: Actor, opId: string, with_: Deciding): Promise<Decided | null> {
  const decided = await acceptItem(owner, opId, with_)
  if (decided.ok) return decided.value
  if (decided.problem.kind === 'busy') throw new AppError('busy', { retry: true })
  return null
}

/** Refuses everything of a phone that waits, for one reason. */
export async function refuseAll(
  owner: Actor,
  { deviceId, reason }: { deviceId: Id; reason: string },
  with_: Deciding,
): Promise<Decided[]> {
  const done: Decided[] = []
  for (const { opId } of await itemsOf(owner, deviceId)) {
    const decided = await refuseItem(owner, { opId, reason }, with_)
    if (decided.ok) done.push(decided.value)
  }
  return done
}

/** What waits of a phone; a file whose op waits is decided with it and not by itself. */
async function itemsOf(owner: Actor, deviceId: Id): Promise<QuarantineItem[]> {
  const items = await asShop(owner.shopId, (tx) => waitingInQuarantine(tx, deviceId))
  const named = new Set(items.flatMap((item) => (item.kind === FILE_KIND ? [] : item.fileHash)))
  return items.filter((item) => item.kind !== FILE_KIND || !named.has(item.fileHash))
}
