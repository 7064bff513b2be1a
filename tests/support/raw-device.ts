import { createHash, generateKeyPairSync, type KeyObject, sign } from 'node:crypto'
import { gzipSync } from 'node:zlib'
import { v7 } from 'uuid'
import { HEADERS, signedText } from '@/lib/sync/protocol/device'
import { type Cursor, PROTOCOL, type SyncRequest } from '@/lib/sync/protocol/message'
import { OP_SCHEMA, type Op, type OpInput } from '@/lib/sync/protocol/op'
import {
  TUS_VERSION,
  UPLOAD_HEADERS,
  UPLOAD_PATH,
  type UploadAct,
  uploadText,
} from '@/lib/sync/protocol/upload'

export type RawOwner = { shopId: string; personId: string }
export type PublicKey = { kty: 'EC'; crv: 'P-256'; x: string; y: string }
export type PushOptions = Partial<SyncRequest> & {
  cookie?: string | null
  headers?: Record<string, string>
}

/**
 * A phone without a store: a key, a sequence and a clock. It makes ops and signed requests exactly as
 * the protocol says and hands them out, so that a test can cut, repeat, twist or hold them back.
 */
export class RawDevice {
  id: string = v7()
  readonly owner: RawOwner
  readonly publicKey: PublicKey
  readonly #key: KeyObject
  dseq = 0
  cursor: Cursor | null = null
  /** How far this device's clock is ahead of the machine's, in ms. */
  skewMs = 0

  constructor(owner: RawOwner) {
    this.owner = owner
    const pair = generateKeyPairSync('ec', { namedCurve: 'P-256' })
    this.#key = pair.privateKey
    this.publicKey = pair.publicKey.export({ format: 'jwk' }) as PublicKey
  }

  now(): string {
    return new Date(Date.now() + this.skewMs).toISOString()
  }

  /** Stamps one op with the device's next number. */
  op(input: OpInput & { entityId?: string; jobId?: string | null }): Op {
    this.dseq += 1
    const fields = input.fields as { id?: string; jobId?: string }
    const ms = (Date.now() + this.skewMs).toString(16).padStart(12, '0')
    return {
      id: v7(),
      dev: this.id,
      dseq: this.dseq,
      hlc: `${ms}-${(this.dseq % 0xffff).toString(16).padStart(4, '0')}`,
      entityId: input.entityId ?? fields.id ?? '',
      jobId: input.jobId ?? fields.jobId ?? null,
      base: null,
      schema: OP_SCHEMA,
      kind: input.kind,
      fields: input.fields,
    } as Op
  }

  /** The headers that sign these bytes. */
  signature(body: Uint8Array, dseq: string, owner: RawOwner = this.owner): Record<string, string> {
    const bodyHash = createHash('sha256').update(body).digest('base64url')
    const of = { shop: owner.shopId, person: owner.personId, device: this.id, dseq, bodyHash }
    const signature = sign('sha256', Buffer.from(signedText(of)), {
      key: this.#key,
      dsaEncoding: 'ieee-p1363',
    })
    return {
      [HEADERS.shop]: of.shop,
      [HEADERS.person]: of.person,
      [HEADERS.device]: of.device,
      [HEADERS.dseq]: dseq,
      [HEADERS.signature]: signature.toString('base64url'),
    }
  }

  /** A POST /api/sync with these ops. `pull` is on when a cookie is given. */
  push(ops: unknown[], options: PushOptions = {}): Request {
    const { cookie = null, headers = {}, ...parts } = options
    const message = {
      protocol: PROTOCOL,
      schema: OP_SCHEMA,
      clientTime: this.now(),
      ops,
      cursor: this.cursor,
      pull: cookie !== null,
      ...parts,
    }
    return this.send(
      gzipSync(JSON.stringify(message)),
      { ...(cookie ? { cookie } : {}), ...headers },
      ops,
    )
  }

  /** A POST /api/sync of any bytes, rightly signed. */
  send(body: Uint8Array, headers: Record<string, string> = {}, ops: unknown[] = []): Request {
    const numbers = ops.flatMap((op) => {
      const dseq = (op as { dseq?: unknown } | null)?.dseq
      return typeof dseq === 'number' && dseq > 0 ? [dseq] : []
    })
    const dseq = numbers.length > 0 ? `${Math.min(...numbers)}-${Math.max(...numbers)}` : '-'
    return new Request('http://shop.invalid/api/sync', {
      method: 'POST',
      body: Uint8Array.from(body),
      headers: { 'content-encoding': 'gzip', ...this.signature(body, dseq), ...headers },
    })
  }

  /** A PUT /api/photos/[hash] of these bytes under that hash. */
  photo(bytes: Uint8Array, hash: string, mime = 'image/jpeg'): Request {
    return new Request(`http://shop.invalid/api/photos/${hash}`, {
      method: 'PUT',
      body: Uint8Array.from(bytes),
      headers: { 'content-type': mime, ...this.signature(bytes, '-') },
    })
  }

  /** The headers that sign one request of an upload. */
  uploadSignature(
    act: UploadAct,
    of: { hash: string; at: number; chunk: string },
    owner = this.owner,
  ) {
    const { shopId: shop, personId: person } = owner
    const text = uploadText({ shop, person, device: this.id, act, ...of })
    const key = { key: this.#key, dsaEncoding: 'ieee-p1363' } as const
    return {
      [UPLOAD_HEADERS.version]: TUS_VERSION,
      [HEADERS.shop]: shop,
      [HEADERS.person]: person,
      [HEADERS.device]: this.id,
      [HEADERS.signature]: sign('sha256', Buffer.from(text), key).toString('base64url'),
    }
  }

  /** POST /api/photos/tus: begins an upload of this hash and size. */
  beginUpload(hash: string, size: number, headers: Record<string, string> = {}): Request {
    return new Request(`http://shop.invalid${UPLOAD_PATH}`, {
      method: 'POST',
      headers: {
        ...this.uploadSignature('create', { hash, at: size, chunk: '-' }),
        [UPLOAD_HEADERS.length]: String(size),
        [UPLOAD_HEADERS.metadata]: `sha256 ${Buffer.from(hash).toString('base64')}`,
        ...headers,
      },
    })
  }

  /** HEAD /api/photos/tus/[hash]: asks where an upload stands. */
  askUpload(hash: string): Request {
    return new Request(`http://shop.invalid${UPLOAD_PATH}/${hash}`, {
      method: 'HEAD',
      headers: this.uploadSignature('ask', { hash, at: 0, chunk: '-' }),
    })
  }

  /** PATCH /api/photos/tus/[hash]: one chunk; `sent` twists what goes over the line. */
  chunk(
    hash: string,
    at: { offset: number; chunk: Uint8Array; sent?: BodyInit },
    headers: Record<string, string> = {},
  ): Request {
    const sum = createHash('sha256').update(at.chunk).digest('base64')
    return new Request(`http://shop.invalid${UPLOAD_PATH}/${hash}`, {
      method: 'PATCH',
      body: at.sent ?? Uint8Array.from(at.chunk),
      duplex: 'half',
      headers: {
        ...this.uploadSignature('chunk', { hash, at: at.offset, chunk: sum }),
        'content-type': 'application/offset+octet-stream',
        [UPLOAD_HEADERS.offset]: String(at.offset),
        [UPLOAD_HEADERS.checksum]: `sha256 ${sum}`,
        ...headers,
      },
    } as RequestInit)
  }
}
