import { asShop, asShopLightly, type ShopTx } from '@/db/client'
import { evenPage, pullPage } from '@/db/queries/change-log'
import { type Contact, noteDevice } from '@/db/queries/devices'
import type { Sender } from '@/db/queries/exchange'
import type { Quarantine } from '@/db/queries/quarantine'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import {
  PAGE_ROWS,
  PROTOCOL,
  type PullAnswer,
  type SyncRequest,
  type SyncResponse,
  syncRequest,
} from '@/lib/sync/protocol/message'
import { fullOp } from '@/lib/sync/protocol/short'
import { MAX_RAW_BYTES, readCapped, readJson } from './body'
import { foldedPage, foldedPush, type OwnEntries, ownEntries } from './brief'
import { missingNumbers } from './gaps'
import type { HttpProblem } from './problems'
import { type PushAnswer, takePush } from './push'
import { takeIntoQuarantine, wipeOrder } from './quarantine'
import { bodyHashOf, type Claim, readClaim } from './signed-request'
import { noteStoreChange, toldToNewStore } from './store-change'
import { takesProtocol } from './upgrade'

/** A push as it came, still packed, with what it claims about its sender. */
export type PackedPush = { raw: Buffer; encoding: string | null; claim: Claim }

/** Bounds of what is believed of a phone's own count and date. */
const MOST_HELD = 1_000_000
const LAST_DATE_MS = Date.UTC(9999, 0)

/** Reads body and claim of a POST /api/sync; nothing is unpacked before the signature was checked. */
export async function openPush(request: Request): Promise<Result<PackedPush, HttpProblem>> {
  const body = await readCapped(request, MAX_RAW_BYTES)
  if (!body.ok) return body
  const claim = readClaim(request.headers, bodyHashOf(body.value))
  if (!claim) return fail({ kind: 'badSignature' })
  return ok({ raw: body.value, encoding: request.headers.get('content-encoding'), claim })
}

/**
 * Unpacks a push and reads its frame; the ops in it are read one by one later. The versions are looked
 * at before the rest, so that an old or new app hears what to do and not that its message is odd (P13).
 */
export async function readPush(packed: PackedPush): Promise<Result<SyncRequest, HttpProblem>> {
  const json = await readJson(packed.raw, packed.encoding)
  if (!json.ok) return json
  const version = (json.value as { protocol?: unknown } | null)?.protocol
  const taken = takesProtocol(typeof version === 'number' ? version : PROTOCOL)
  if (!taken.ok) return taken
  const message = syncRequest.safeParse(json.value)
  if (message.success) return ok(inFull(message.data, packed.claim))
  const tooMany = message.error.issues.some((issue) => issue.code === 'too_big')
  return fail({ kind: tooMany ? 'tooLarge' : 'badJson' })
}

/** With its ops in full, whatever it left out of them to be brief (lib/sync/protocol/short.ts). */
function inFull(message: SyncRequest, { deviceId, personId }: Claim): SyncRequest {
  if (!isBrief(message)) return message
  const said = { dev: deviceId, personId, schema: message.schema }
  return { ...message, ops: message.ops.map((op) => fullOp(op, said)) }
}

const isBrief = ({ protocol, brief }: SyncRequest): boolean => protocol >= 2 && brief === true

/** A phone whose signature was checked, and how its shop stands with it (lib/auth/device.ts). */
type HeardPhone = Pick<Sender, 'device' | 'session' | 'stand' | 'noted'> & {
  actor: Actor
  deviceId: Id
  quarantine: Quarantine | null
}

/** Everything one exchange with a phone needs; who is signed in there comes with the device, if anybody. */
export type Exchange = {
  device: HeardPhone
  message: SyncRequest
  dseq: Claim['dseq']
  now: number
  newId: () => Id
}

/** What to note of a phone in the very question who it is: of one that sends nothing, nothing waits for it. */
export const seenAtOnce = (of: Pick<Exchange, 'message' | 'dseq' | 'now'>): Contact | null =>
  of.message.ops.length === 0 ? contactOf(of) : null

/** An answer in the words of the phone's own protocol: the one before knows nothing of the newer fields. */
export type Answer = Omit<SyncResponse, 'order' | 'missing' | 'lost' | 'silent'> &
  Partial<Pick<SyncResponse, 'order' | 'missing' | 'lost' | 'silent'>>

/** Takes the push, then answers the pull, so that a phone gets its own rows back in the same answer. */
export async function exchange(with_: Exchange): Promise<Answer> {
  const { device, message, now, newId } = with_
  if (device.quarantine !== null) return await handOver(with_, device.quarantine)
  const at = new Date(now).toISOString()
  const { actor, deviceId } = device
  const pushed = await takePush(message.ops, { actor, deviceId, at, newId }, logKnown(with_))
  const own = isBrief(message) ? ownEntries(message.ops, pushed) : null
  const told = evenAnswer(with_) ?? (await restOfAnswer(with_, own))
  const settled = own === null ? pushed : foldedPush(message.ops, pushed)
  return { protocol: message.protocol, serverTime: at, ...settled, ...told }
}

/** The answer to a phone that sent nothing and has everything, as far as it was told with the sender; else null. */
function evenAnswer({ device, message }: Exchange): Omit<Answer, keyof PushAnswer | Basis> | null {
  const { stand, noted, session, actor } = device
  const { cursor } = message
  const isPlain = noted && device.device.gapsToldAt === null && message.protocol >= 2
  if (!isPlain || stand === null || cursor === null) return null
  if (!message.pull || !isTheirs({ actor, session })) return null
  const pull = evenPage(stand, actor.shopId, cursor)
  return pull && { pull, order: 'none', missing: [], lost: null }
}
type Basis = 'protocol' | 'serverTime' | 'takenNumbers'

/** Notes the phone and reads what is new for it. */
async function restOfAnswer(with_: Exchange, own: OwnEntries | null) {
  const { device, message, dseq, now, newId } = with_
  const { actor, deviceId, noted } = device
  const at = new Date(now).toISOString()
  // Nothing in here was promised to anybody: a note that a crash loses is made again by the next exchange.
  return await asShopLightly(actor.shopId, async (tx) => {
    await noteStoreChange(tx, { device: device.device, canary: message.canary, at, newId })
    if (!noted) await noteDevice(tx, { id: deviceId, ...contactOf(with_) })
    const pull = await pullFor(tx, with_, own)
    if (message.protocol < 2) return { pull }
    const { ops, cursor } = message
    const missing = await missingNumbers(tx, { device: device.device, dseq, ops: ops.length, now })
    const before = cursor === null ? await toldToNewStore(tx, deviceId) : { lost: null }
    return { pull, order: 'none' as const, missing, ...before }
  })
}

/** The same with a phone that may not write any more: it is heard, shown nothing, and in the end emptied. */
async function handOver(with_: Exchange, why: Quarantine): Promise<Answer> {
  const { device, message, now, newId } = with_
  const at = new Date(now).toISOString()
  const { actor, deviceId } = device
  const sender = { actor, deviceId, why, at, newId }
  const pushed = await takeIntoQuarantine(message.ops, sender)
  const order = await asShop(actor.shopId, async (tx) => {
    await noteStoreChange(tx, { device: device.device, canary: message.canary, at, newId })
    await noteDevice(tx, { id: deviceId, ...contactOf(with_) })
    const isTaken = pushed.results.length === 0
    if (message.protocol < 2 || !isTaken) return 'none'
    const { wipeToldAt } = device.device
    return await wipeOrder(tx, { ...sender, wipeToldAt }, message.held)
  })
  const pull: PullAnswer = message.pull ? { kind: 'signIn' } : { kind: 'notAsked' }
  const basis = { protocol: message.protocol, serverTime: at, ...pushed, pull }
  return message.protocol < 2 ? basis : { ...basis, order, missing: [], lost: null }
}

/** What the shop notes of a phone that reached it: its clock, and how far its numbers have come (P22). */
function contactOf({ message, dseq, now }: Pick<Exchange, 'message' | 'dseq' | 'now'>): Contact {
  const said = Date.parse(message.clientTime)
  return {
    at: new Date(now).toISOString(),
    clockOffsetMs: Number.isFinite(said) ? said - now : null,
    highestDseq: dseq?.last ?? null,
    held: heldOf(message),
    canary: message.canary ?? null,
    bookVersion: message.book ?? null,
  }
}

/** What the phone says it still holds, within what can be kept; a date that cannot be read is none. */
function heldOf({ held }: SyncRequest) {
  if (!held) return null
  const oldest = Date.parse(held.oldestAt ?? '')
  const isDate = oldest >= 0 && oldest < LAST_DATE_MS
  const oldestAt = isDate ? new Date(oldest).toISOString() : null
  return {
    ops: Math.min(held.ops, MOST_HELD),
    photos: Math.min(held.photos, MOST_HELD),
    oldestAt,
  }
}

/** A pull needs the session of the very person whose phone asks; anybody else's is no session (P18). */
const isTheirs = ({ actor, session }: Pick<HeardPhone, 'actor' | 'session'>): boolean =>
  session?.shopId === actor.shopId && session.personId === actor.personId

/**
 * The epoch of the log a phone pulls from, when this very answer will tell it of another one (P12). Who
 * cannot pull would not hear of it: their push is taken as it is.
 */
function logKnown(with_: Exchange): string | null {
  const { cursor, pull } = with_.message
  return cursor !== null && pull && isTheirs(with_.device)
    ? (cursor.epoch.split('.')[0] ?? null)
    : null
}

async function pullFor(tx: ShopTx, with_: Exchange, own: OwnEntries | null): Promise<PullAnswer> {
  const { device, message } = with_
  if (!message.pull) return { kind: 'notAsked' }
  if (!isTheirs(device)) return { kind: 'signIn' }
  const { cursor } = message
  const { actor, deviceId } = device
  const asked = { actor, cursor, limit: PAGE_ROWS, deviceId }
  if (own === null) return await pullPage(tx, asked)
  return foldedPage(await pullPage(tx, { ...asked, brief: { own } }), own)
}
