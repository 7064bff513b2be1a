import { gunzip, gunzipSync } from 'node:zlib'
import { fail, ok, type Result } from '@/lib/model/result'
import { MAX_INFLATED_BYTES } from '@/lib/sync/protocol/message'
import type { HttpProblem } from './problems'

/** Most bytes of a push as sent, before it is unpacked (P14; a choice: 20 full batches of sync.md B2). */
export const MAX_RAW_BYTES = 512 * 1024

/**
 * Reads a body and counts while reading, so that no more than `cap` bytes are ever held.
 * Answers `tooLarge` past the cap and `badRequest` when the line breaks on the way.
 */
export async function readCapped(
  request: Request,
  cap: number,
): Promise<Result<Buffer, HttpProblem>> {
  const said = request.headers.get('content-length')
  if (said !== null && Number(said) > cap) return fail({ kind: 'tooLarge' })
  if (!request.body) return ok(Buffer.alloc(0))
  // The server itself hands on no more than was announced, so that such a body need not be counted.
  if (said !== null) return await readWhole(request, cap)
  const reader: ReadableStreamDefaultReader<Uint8Array> = request.body.getReader()
  const parts: Uint8Array[] = []
  let bytes = 0
  try {
    for (let read = await reader.read(); !read.done; read = await reader.read()) {
      bytes += read.value.byteLength
      if (bytes > cap) {
        await reader.cancel()
        return fail({ kind: 'tooLarge' })
      }
      parts.push(read.value)
    }
  } catch {
    return fail({ kind: 'badRequest' })
  }
  return ok(Buffer.concat(parts))
}

async function readWhole(request: Request, cap: number): Promise<Result<Buffer, HttpProblem>> {
  try {
    const body = Buffer.from(await request.arrayBuffer())
    return body.byteLength > cap ? fail({ kind: 'tooLarge' }) : ok(body)
  } catch {
    return fail({ kind: 'badRequest' })
  }
}

/** A body this small is unpacked sooner than another thread has taken it up (a choice). */
const SMALL_BYTES = 2 * 1024

async function unpack(raw: Buffer): Promise<Buffer> {
  if (raw.byteLength <= SMALL_BYTES) {
    return gunzipSync(raw, { maxOutputLength: MAX_INFLATED_BYTES })
  }
  return await new Promise((resolve, reject) =>
    gunzip(raw, { maxOutputLength: MAX_INFLATED_BYTES }, (error, out) =>
      error ? reject(error) : resolve(out),
    ),
  )
}

/** Node's code for output past maxOutputLength. */
const isTooLarge = (error: unknown): boolean =>
  error instanceof Error && 'code' in error && error.code === 'ERR_BUFFER_TOO_LARGE'

/**
 * The JSON value of a body, unpacked when `encoding` is gzip (P14).
 * Answers `tooLarge` past 8 MB unpacked, `badGzip` for cut or flipped bytes, `badJson` for the rest.
 */
export async function readJson(
  raw: Buffer,
  encoding: string | null,
): Promise<Result<unknown, HttpProblem>> {
  let text: Buffer
  try {
    if (encoding === 'gzip') text = await unpack(raw)
    else if (encoding === null || encoding === 'identity') text = raw
    else return fail({ kind: 'badRequest' })
  } catch (error) {
    return fail({ kind: isTooLarge(error) ? 'tooLarge' : 'badGzip' })
  }
  try {
    return ok(JSON.parse(text.toString('utf8')))
  } catch {
    return fail({ kind: 'badJson' })
  }
}
