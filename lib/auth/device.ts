import { createPublicKey, type KeyObject, verify } from 'node:crypto'
import { asShop } from '@/db/client'
import { findDevice } from '@/db/queries/devices'
import { findActor } from '@/db/queries/people'
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

/** A phone whose signature was checked, with the person it belongs to and today's roles. */
export type SignedDevice = { actor: Actor; deviceId: Id }

export type DeviceProblem = {
  kind: 'unknownDevice' | 'badSignature' | 'deviceRevoked' | 'noMembership'
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
 * with SHA-256 over the claim's text. A phone of another person or shop is as unknown as any.
 */
export async function deviceOf(claim: SignedClaim): Promise<Result<SignedDevice, DeviceProblem>> {
  const { device, actor } = await asShop(claim.shopId, async (tx) => ({
    device: await findDevice(tx, claim.deviceId),
    actor: await findActor(tx, claim.personId),
  }))
  if (!device || device.personId !== claim.personId) return fail({ kind: 'unknownDevice' })
  const signed = { key: keyOf(device.publicKey), dsaEncoding: 'ieee-p1363' } as const
  if (!verify('sha256', Buffer.from(claim.text), signed, claim.signature)) {
    return fail({ kind: 'badSignature' })
  }
  if (device.revokedAt !== null) return fail({ kind: 'deviceRevoked' })
  return actor ? ok({ actor, deviceId: device.id }) : fail({ kind: 'noMembership' })
}
