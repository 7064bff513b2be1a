import { asShop, type ShopTx } from '@/db/client'
import { pullPage } from '@/db/queries/change-log'
import { noteDevice } from '@/db/queries/devices'
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
import { MAX_RAW_BYTES, readCapped, readJson } from './body'
import type { HttpProblem } from './problems'
import { takePush } from './push'
import { bodyHashOf, type Claim, readClaim } from './signed-request'
import { takesProtocol } from './upgrade'

/** A push as it came, still packed, with what it claims about its sender. */
export type PackedPush = { raw: Buffer; encoding: string | null; claim: Claim }

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
  if (message.success) return ok(message.data)
  const tooMany = message.error.issues.some((issue) => issue.code === 'too_big')
  return fail({ kind: tooMany ? 'tooLarge' : 'badJson' })
}

/** Everything one exchange with a phone needs. `session`: who is signed in there, if anybody. */
export type Exchange = {
  device: { actor: Actor; deviceId: Id }
  session: Actor | null
  message: SyncRequest
  dseq: Claim['dseq']
  now: number
  newId: () => Id
}

/** Takes the push, then answers the pull, so that a phone gets its own rows back in the same answer. */
export async function exchange(with_: Exchange): Promise<SyncResponse> {
  const { device, message, now, newId } = with_
  const at = new Date(now).toISOString()
  const pushed = await takePush(message.ops, { ...device, at, newId })
  const pull = await asShop(device.actor.shopId, async (tx) => {
    await noteDevice(tx, contactOf(with_, at))
    return await pullFor(tx, with_)
  })
  return { protocol: PROTOCOL, serverTime: at, ...pushed, pull }
}

/** What the shop notes of a phone that reached it: its clock, and how far its numbers have come (P22). */
function contactOf({ device, message, dseq, now }: Exchange, at: string) {
  const said = Date.parse(message.clientTime)
  return {
    id: device.deviceId,
    at,
    clockOffsetMs: Number.isFinite(said) ? said - now : null,
    highestDseq: dseq?.last ?? null,
  }
}

/** A pull needs the session of the very person whose phone asks; anybody else's is no session (P18). */
async function pullFor(tx: ShopTx, { device, session, message }: Exchange): Promise<PullAnswer> {
  if (!message.pull) return { kind: 'notAsked' }
  const { shopId, personId } = device.actor
  if (session?.shopId !== shopId || session.personId !== personId) return { kind: 'signIn' }
  const { cursor } = message
  return await pullPage(tx, {
    actor: device.actor,
    cursor,
    limit: PAGE_ROWS,
    deviceId: device.deviceId,
  })
}
