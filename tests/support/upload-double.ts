import { createHash } from 'node:crypto'
import { TUS_VERSION, UPLOAD_HEADERS, type UploadAct } from '@/lib/sync/protocol/upload'

/** One request of an upload, as its signature covers it. */
export type UploadRequest = { act: UploadAct; hash: string; at: number; chunk: string }

const HEX = /^[0-9a-f]{64}$/

/** Reads what a request of an upload asks. */
export function readUploadRequest(path: string, method: string, headers: Headers): UploadRequest {
  const said = (name: string) => headers.get(name) ?? ''
  if (method === 'POST') {
    const named = said(UPLOAD_HEADERS.metadata).replace(/^sha256 /, '')
    const hash = Buffer.from(named, 'base64').toString('latin1')
    return { act: 'create', hash, at: Number(said(UPLOAD_HEADERS.length)), chunk: '-' }
  }
  const hash = path.split('/').at(-1) ?? ''
  if (method === 'HEAD') return { act: 'ask', hash, at: 0, chunk: '-' }
  const chunk = said(UPLOAD_HEADERS.checksum).replace(/^sha256 /, '')
  return { act: 'chunk', hash, at: Number(said(UPLOAD_HEADERS.offset)), chunk }
}

const answer = (status: number, headers: Record<string, string>) =>
  new Response(null, { status, headers: { [UPLOAD_HEADERS.version]: TUS_VERSION, ...headers } })
const refusal = (status: number, kind: string) => answer(status, { [UPLOAD_HEADERS.problem]: kind })

/** The shop's side of uploads, in memory and with none of our server's code. */
export class UploadDouble {
  readonly photos = new Map<string, Uint8Array>()
  readonly #staged = new Map<string, { size: number; bytes: Buffer }>()
  /** Every chunk that was taken, as [offset, length]. */
  readonly chunks: [number, number][] = []

  /** As after thirty days, or a disk that was lost: what is not whole is gone. */
  forgetStaged(): void {
    this.#staged.clear()
  }

  /** Takes away bytes that were said to be there. */
  shorten(hash: string, to: number): void {
    const held = this.#staged.get(hash)
    if (held) held.bytes = held.bytes.subarray(0, to)
  }

  take({ act, hash, at, chunk }: UploadRequest, body: Uint8Array): Response {
    if (!HEX.test(hash)) return refusal(400, 'badRequest')
    const whole = this.photos.get(hash)
    if (act !== 'chunk' && whole) return this.#at(hash, whole.length, whole.length)
    if (act === 'create' && !this.#staged.has(hash)) {
      this.#staged.set(hash, { size: at, bytes: Buffer.alloc(0) })
    }
    const held = this.#staged.get(hash)
    if (!held) return refusal(404, 'notBegun')
    if (act === 'chunk') {
      const sum = createHash('sha256').update(body).digest('base64')
      if (sum !== chunk) return refusal(460, 'wrongChunk')
      if (at !== held.bytes.length) return refusal(409, 'wrongOffset')
      held.bytes = Buffer.concat([held.bytes, body])
      this.chunks.push([at, body.length])
    }
    if (held.bytes.length < held.size) return this.#at(hash, held.bytes.length, held.size)
    this.#staged.delete(hash)
    if (createHash('sha256').update(held.bytes).digest('hex') !== hash) {
      return refusal(422, 'wrongHash')
    }
    this.photos.set(hash, held.bytes)
    return this.#at(hash, held.size, held.size)
  }

  #at(hash: string, offset: number, size: number): Response {
    return answer(this.photos.has(hash) ? 200 : 201, {
      [UPLOAD_HEADERS.offset]: String(offset),
      [UPLOAD_HEADERS.length]: String(size),
      ...(this.photos.has(hash) ? { [UPLOAD_HEADERS.stored]: hash } : {}),
    })
  }
}
