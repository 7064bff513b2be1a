import { createHash } from 'node:crypto'
import { type Id, id } from '@/lib/model/id'
import { HEADERS, signedText } from '@/lib/sync/protocol/device'
import { uploadText } from '@/lib/sync/protocol/upload'

/** What a signed request says of itself, before anybody looked whether it is true (P18). */
export type Claim = {
  shopId: Id
  personId: Id
  deviceId: Id
  /** The op numbers the body holds, or null for none. */
  dseq: { first: number; last: number } | null
  /** The text that was signed, and the raw r||s of 64 bytes. */
  text: string
  signature: Buffer
}

const DSEQ = /^([1-9]\d{0,14})-([1-9]\d{0,14})$/
const SIGNATURE = /^[A-Za-z0-9_-]{86}$/

function dseqOf(text: string): Claim['dseq'] | undefined {
  if (text === '-') return null
  const match = DSEQ.exec(text)
  if (!match) return undefined
  const [first, last] = [Number(match[1]), Number(match[2])]
  return first <= last ? { first, last } : undefined
}

/** The base64url SHA-256 of these bytes, as it stands in the signed text. */
export const bodyHashOf = (body: Uint8Array): string =>
  createHash('sha256').update(body).digest('base64url')

/**
 * Reads the signing headers over a body of this hash; null when one is missing or malformed. Who knows
 * the hash beforehand (a picture's address) need not have the bytes yet, but must compare them later.
 */
export function readClaim(headers: Headers, bodyHash: string): Claim | null {
  const dseqText = headers.get(HEADERS.dseq) ?? ''
  const dseq = dseqOf(dseqText)
  if (dseq === undefined) return null
  return claimOf(headers, dseq, (who) => signedText({ ...who, dseq: dseqText, bodyHash }))
}

/** The claim of one request of an upload; null when a header is missing or malformed (PH2). */
export function readUploadClaim(headers: Headers, of: UploadOf): Claim | null {
  return claimOf(headers, null, (who) => uploadText({ ...who, ...of }))
}

type UploadOf = Omit<Parameters<typeof uploadText>[0], 'shop' | 'person' | 'device'>
type Who = { shop: string; person: string; device: string }

function claimOf(
  headers: Headers,
  dseq: Claim['dseq'],
  textOf: (who: Who) => string,
): Claim | null {
  const shop = headers.get(HEADERS.shop) ?? ''
  const person = headers.get(HEADERS.person) ?? ''
  const device = headers.get(HEADERS.device) ?? ''
  const signature = headers.get(HEADERS.signature) ?? ''
  if (![shop, person, device].every((value) => id.safeParse(value).success)) return null
  if (!SIGNATURE.test(signature)) return null
  return {
    shopId: shop.toLowerCase(),
    personId: person.toLowerCase(),
    deviceId: device.toLowerCase(),
    dseq,
    text: textOf({ shop, person, device }),
    signature: Buffer.from(signature, 'base64url'),
  }
}
