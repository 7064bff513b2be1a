import { asShop } from '@/db/client'
import { pullPage } from '@/db/queries/change-log'
import { noteDevice } from '@/db/queries/devices'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import {
  type Cursor,
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
  await noteContact(with_, at)
  return { protocol: PROTOCOL, serverTime: at, ...pushed, pull: await pullFor(with_) }
}

/** What the phone's clock is ahead of ours, in ms; null when it says nothing readable. */
function offsetOf(clientTime: string, now: number): number | null {
  const said = Date.parse(clientTime)
  return Number.isFinite(said) ? said - now : null
}

function noteContact({ device, message, dseq, now }: Exchange, at: string): Promise<void> {
  return asShop(device.actor.shopId, (tx) =>
    noteDevice(tx, {
      id: device.deviceId,
      at,
      clockOffsetMs: offsetOf(message.clientTime, now),
      highestDseq: dseq?.last ?? null,
    }),
  )
}

/** A pull needs the session of the very person whose phone asks; anybody else's is no session (P18). */
async function pullFor({ device, session, message }: Exchange): Promise<PullAnswer> {
  if (!message.pull) return { kind: 'notAsked' }
  const { shopId, personId } = device.actor
  if (session?.shopId !== shopId || session.personId !== personId) return { kind: 'signIn' }
  return await asShop(shopId, (tx) =>
    pullPage(tx, {
      actor: device.actor,
      cursor: message.cursor as Cursor | null,
      limit: PAGE_ROWS,
      deviceId: device.deviceId,
    }),
  )
}
