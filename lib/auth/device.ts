import { createPublicKey, type KeyObject, verify } from 'node:crypto'
import { asShop } from '@/db/client'
import { standOf } from '@/db/queries/device-stand'
import { type Device, findSender } from '@/db/queries/devices'
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
 * A phone whose signature was checked, with the person it belongs to. `quarantine`: why what it sends is kept apart from every job (R22);
 * its actor then has the roles as they were when the phone was revoked or the membership ended.
 */
export type SignedSender = {
  actor: Actor
  deviceId: Id
  device: Device
  quarantine: Quarantine | null
}

export type DeviceProblem = {
  kind: 'unknownDevice' | 'badSignature' | 'noMembership'
}

type PublicJwk = { kty: 'EC'; crv: 'P-256'; x: string; y: string }

const MAX_KEYS = 1000
const keys = new Map<string, KeyObject>()

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

/**
 * Turns a signed claim into the phone and the person behind it, without any session (P18): ECDSA P-256
 * with SHA-256 over the claim's text. A phone of another person or shop is as unknown as any. A revoked
 * phone, and that of somebody who left, answers with `quarantine`: it may hand over and do nothing else.
 */
export async function senderOf(claim: SignedClaim): Promise<Result<SignedSender, DeviceProblem>> {
  const found = await asShop(claim.shopId, (tx) => findSender(tx, claim.deviceId))
  if (found?.device.personId !== claim.personId) return fail({ kind: 'unknownDevice' })
  const { device } = found
  const signed = { key: keyOf(device.publicKey), dsaEncoding: 'ieee-p1363' } as const
  if (!verify('sha256', Buffer.from(claim.text), signed, claim.signature)) {
    return fail({ kind: 'badSignature' })
  }
  const stand = standOf(found)
  if (!stand) return fail({ kind: 'noMembership' })
  return ok({ ...stand, deviceId: device.id, device })
}
