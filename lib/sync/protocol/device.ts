import * as z from 'zod/mini'
import { id } from '@/lib/model/id'

/** Most stores that a phone remembers: one for each person and shop on it. */
export const MOST_KEEPSAKES = 16

/**
 * What a phone remembers of a store outside of it, so that an emptied store is told from a new one (P22).
 * Nothing in it is about a person or a job.
 */
export const keepsake = z.strictObject({
  deviceId: id,
  /** The last number given out, how many records and files were unsent, and the day of the last record. */
  dseq: z.int().check(z.minimum(0), z.maximum(1_000_000_000)),
  unsent: z.int().check(z.minimum(0), z.maximum(1_000_000)),
  day: z.string().check(z.regex(/^\d{4}-\d{2}-\d{2}$/)),
  /** Unsent records that its person deleted on purpose with the store, when that is why it is gone. */
  deleted: z.nullable(z.int().check(z.minimum(0), z.maximum(1_000_000))),
})
export type Keepsake = z.infer<typeof keepsake>

/**
 * POST /api/devices: tells the shop the public half of a phone's key. Needs a session; sent as often as
 * the phone likes: the same key of the same person answers the same device (P18).
 */
export const enrolRequest = z.object({
  /** The id the phone made for itself (UUIDv7); the answer's id is the one that counts. */
  deviceId: id,
  publicKey: z.object({
    kty: z.literal('EC'),
    crv: z.literal('P-256'),
    x: z.string(),
    y: z.string(),
  }),
  /** What kind of phone it calls itself, for the list of phones at the desk. */
  words: z.string().check(z.maxLength(120)),
  /** What this phone remembers of stores that are gone from it (P22); left out when there is nothing. */
  kept: z.optional(z.array(keepsake).check(z.maxLength(MOST_KEEPSAKES))),
})
export type EnrolRequest = z.infer<typeof enrolRequest>

export const enrolAnswer = z.object({ deviceId: id, serverTime: z.string() })
export type EnrolAnswer = z.infer<typeof enrolAnswer>

/** Names of the headers that carry and sign a push or a photo (message.ts). */
export const HEADERS = {
  shop: 'x-farbench-shop',
  person: 'x-farbench-person',
  device: 'x-farbench-device',
  dseq: 'x-farbench-dseq',
  signature: 'x-farbench-signature',
} as const

/**
 * The text a device signs (ECDSA P-256, SHA-256, raw r||s, base64url): who, which device, which op numbers
 * (`first-last`, or `-` for a pull or a photo), and the base64url SHA-256 of the body exactly as sent.
 */
export function signedText(of: {
  shop: string
  person: string
  device: string
  dseq: string
  bodyHash: string
}): string {
  return [of.shop, of.person, of.device, of.dseq, of.bodyHash].join('\n')
}
