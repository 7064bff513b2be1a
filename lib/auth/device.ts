import { createPublicKey, type KeyObject, verify } from 'node:crypto'
import { standOf } from '@/db/queries/device-stand'
import type { Contact, Device } from '@/db/queries/devices'
import { type LogStand, openExchange, type Sender } from '@/db/queries/exchange'
import type { Quarantine } from '@/db/queries/quarantine'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'

/** What a request claims and how it was signed; lib/sync/server/signed-request.ts reads it. */
export type SignedClaim = {
  shopId: Id
  personId: Id
  deviceId: Id
  text: string
  signature: Uint8Array
}

/**
 * A phone whose signature was checked, with the person it belongs to. `quarantine`: why what it sends is kept
 * apart from every job (R22); its actor then has the roles as they were when the phone was revoked or the
 * membership ended. `session`, `stand`, `noted`: as openExchange answered them.
 */
export type SignedSender = Pick<Sender, 'session' | 'noted'> & {
  actor: Actor
  deviceId: Id
  device: Device
  quarantine: Quarantine | null
  stand: LogStand | null
}

export type DeviceProblem = {
  kind: 'unknownDevice' | 'badSignature' | 'noMembership'
}

type PublicJwk = { kty: 'EC'; crv: 'P-256'; x: string; y: string }

const MAX_KEYS = 1000
const keys = new Map<string, KeyObject>()
/** Keys of phones that were heard lately: a phone's key never changes. */
const heard = new Map<Id, { shopId: Id; personId: Id; key: PublicJwk }>()

/** The key as Node checks with it; the last 1,000 are kept ready. */
function keyOf(jwk: PublicJwk): KeyObject {
  const name = `${jwk.x}.${jwk.y}`
  const known = keys.get(name)
  if (known) return known
  const { kty, crv, x, y } = jwk
  const key = createPublicKey({ key: { kty, crv, x, y }, format: 'jwk' })
  if (keys.size >= MAX_KEYS) keys.delete(keys.keys().next().value ?? '')
  keys.set(name, key)
  return key
}

/** True when the JWK is a point of P-256 that signatures can be checked with. */
export function isDeviceKey(jwk: PublicJwk): boolean {
  try {
    return createPublicKey({ key: { ...jwk }, format: 'jwk' }).asymmetricKeyType === 'ec'
  } catch {
    return false
  }
}

const isSameKey = (one: PublicJwk, other: PublicJwk | null): boolean =>
  one.x === other?.x && one.y === other.y

function isSigned(claim: SignedClaim, jwk: PublicJwk): boolean {
  const signed = { key: keyOf(jwk), dsaEncoding: 'ieee-p1363' } as const
  return verify('sha256', Buffer.from(claim.text), signed, claim.signature)
}

/**
 * The key that signed a claim, of a phone that was heard lately of that person and shop; else null. What such
 * a phone sends may be read before the database is asked; whether it may do anything senderOf alone says.
 */
export function heardKey(claim: SignedClaim): PublicJwk | null {
  const known = heard.get(claim.deviceId)
  const isTheirs = known?.shopId === claim.shopId && known.personId === claim.personId
  return isTheirs && isSigned(claim, known.key) ? known.key : null
}

/**
 * Whose session came with the request, if any, what is to be noted of the phone at once, and the key that is
 * known to have signed the claim.
 */
export type Asked = {
  sessionId: Id | null
  now: number
  seen: Contact | null
  signedBy: PublicJwk | null
}
const NOTHING: Asked = { sessionId: null, now: 0, seen: null, signedBy: null }

/**
 * Turns a signed claim into the phone and the person behind it, without any session (P18): ECDSA P-256
 * with SHA-256 over the claim's text. A phone of another person or shop is as unknown as any. A revoked
 * phone, and that of somebody who left, answers with `quarantine`: it may hand over and do nothing else.
 */
export async function senderOf(
  claim: SignedClaim,
  { sessionId, now, seen, signedBy }: Asked = NOTHING,
): Promise<Result<SignedSender, DeviceProblem>> {
  const { shopId, deviceId, personId } = claim
  const at = new Date(now).toISOString()
  const found = await openExchange({ shopId, deviceId, sessionId, now: at, seen })
  if (found?.device.personId !== personId) return fail({ kind: 'unknownDevice' })
  const { device, session, stand, noted } = found
  if (!isSameKey(device.publicKey, signedBy) && !isSigned(claim, device.publicKey))
    return fail({ kind: 'badSignature' })
  if (heard.size >= MAX_KEYS) heard.delete(heard.keys().next().value ?? '')
  heard.set(deviceId, { shopId, personId, key: device.publicKey })
  const who = standOf(found)
  if (!who) return fail({ kind: 'noMembership' })
  return ok({ ...who, deviceId: device.id, device, session, stand, noted })
}
