import type { Id } from '@/lib/model/id'
import { HEADERS, signedText } from '@/lib/sync/protocol/device'
import { type Cursor, MAX_OPS, PROTOCOL, type SyncRequest } from '@/lib/sync/protocol/message'
import { OP_SCHEMA, type Op } from '@/lib/sync/protocol/op'
import { shortOp } from '@/lib/sync/protocol/short'

/** Who sends, from which device. */
export type Sender = { shopId: Id; personId: Id; deviceId: Id; pair: CryptoKeyPair }

export type Bytes = Uint8Array<ArrayBuffer>

/** Most compressed bytes of one request (P15). */
const MAX_BATCH_BYTES = 64 * 1024

const text = new TextEncoder()

/** The headers that sign a body exactly as it is sent (P18). `dseq` is `first-last`, or `-` with no ops. */
export async function signedHeaders(
  sender: Sender,
  dseq: string,
  body: Bytes,
): Promise<Record<string, string>> {
  const bodyHash = await hashOf(body)
  const { shopId: shop, personId: person, deviceId: device } = sender
  return {
    [HEADERS.shop]: shop,
    [HEADERS.person]: person,
    [HEADERS.device]: device,
    [HEADERS.dseq]: dseq,
    [HEADERS.signature]: await signText(
      sender,
      signedText({ shop, person, device, dseq, bodyHash }),
    ),
  }
}

/** SHA-256 in base64url, of bytes or of a text in UTF-8. */
export async function hashOf(of: Bytes | string): Promise<string> {
  const bytes = typeof of === 'string' ? text.encode(of) : of
  return base64url(new Uint8Array(await crypto.subtle.digest('SHA-256', bytes)))
}

/** The sender's signature over a text: ECDSA P-256, raw r||s, base64url. */
export async function signText(sender: Sender, words: string): Promise<string> {
  const signed = await crypto.subtle.sign(
    { name: 'ECDSA', hash: 'SHA-256' },
    sender.pair.privateKey,
    text.encode(words),
  )
  return base64url(new Uint8Array(signed))
}

/** A batch as it goes out: how many of the ops it holds, and the body. */
export type Packed = { count: number; dseq: string; body: Bytes }

/** Packs as many ops from the front as fit in one request: at most `limit`, 500, and 64 KB compressed. */
export async function packRequest(of: {
  sender: Pick<Sender, 'personId' | 'deviceId'>
  ops: readonly Op[]
  limit: number
  cursor: Cursor | null
  pull: boolean
  clientTime: string
  /** What the phone still holds besides the first so many ops; and the id of its store (P22). */
  held?: (sent: number) => NonNullable<SyncRequest['held']>
  canary?: Id | null
  /** The version of the code book held. */
  book?: number | undefined
}): Promise<Packed> {
  const said = { dev: of.sender.deviceId, personId: of.sender.personId }
  const short = of.ops.map((op) => shortOp(op, said))
  let count = Math.min(of.ops.length, of.limit, MAX_OPS)
  for (;;) {
    const ops = of.ops.slice(0, count)
    const request: SyncRequest = {
      protocol: PROTOCOL,
      schema: OP_SCHEMA,
      clientTime: of.clientTime,
      ops: short.slice(0, count),
      cursor: of.cursor,
      pull: of.pull,
      ...(of.held === undefined ? {} : { held: of.held(count) }),
      canary: of.canary ?? null,
      ...(of.book === undefined ? {} : { book: of.book }),
      brief: true,
    }
    const body = await gzip(text.encode(JSON.stringify(request)))
    if (body.byteLength <= MAX_BATCH_BYTES || count <= 1) {
      const numbers = ops.map((op) => op.dseq)
      const dseq = count === 0 ? '-' : `${Math.min(...numbers)}-${Math.max(...numbers)}`
      return { count, dseq, body }
    }
    count = Math.max(1, Math.floor((count * MAX_BATCH_BYTES * 0.9) / body.byteLength))
  }
}

async function gzip(bytes: Bytes): Promise<Bytes> {
  const packed = new Blob([bytes]).stream().pipeThrough(new CompressionStream('gzip'))
  return new Uint8Array(await new Response(packed).arrayBuffer())
}

/** Bytes in base64url without padding (RFC 4648, section 5). */
function base64url(bytes: Uint8Array): string {
  return base64(bytes).replaceAll('+', '-').replaceAll('/', '_').replaceAll('=', '')
}

/** Bytes in base64 with padding (RFC 4648, section 4). */
export function base64(bytes: Uint8Array): string {
  const PIECE = 0x8000
  let binary = ''
  for (let at = 0; at < bytes.length; at += PIECE) {
    binary += String.fromCharCode(...bytes.subarray(at, at + PIECE))
  }
  return btoa(binary)
}
