import { sha256Hex } from '@/lib/model/id'
import { fail, ok, type Result } from '@/lib/model/result'
import { TUS_VERSION, UPLOAD_HEADERS, UPLOAD_PATH } from '@/lib/sync/protocol/upload'
import type { Standing } from './photo-upload'
import { type HttpProblem, problemAnswer } from './problems'

/** Reads and answers the requests of an upload as tus 1.0.0 has them, with our signature over each. */

const NUMBER = /^(0|[1-9]\d{0,9})$/
const CHECKSUM = /^sha256 ([A-Za-z0-9+/]{43}=)$/
const METADATA = /^sha256 ([A-Za-z0-9+/]+={0,2})$/

const numberOf = (headers: Headers, name: string): number | null => {
  const text = headers.get(name) ?? ''
  return NUMBER.test(text) ? Number(text) : null
}

/** Which file is to be begun, and how many bytes it has; `wrongVersion` or `badRequest`. */
export function readCreation(
  headers: Headers,
): Result<{ hash: string; size: number }, HttpProblem> {
  if (headers.get(UPLOAD_HEADERS.version) !== TUS_VERSION) return fail({ kind: 'wrongVersion' })
  const size = numberOf(headers, UPLOAD_HEADERS.length)
  const named = METADATA.exec(headers.get(UPLOAD_HEADERS.metadata) ?? '')?.[1]
  const hash = Buffer.from(named ?? '', 'base64').toString('latin1')
  if (!size || !sha256Hex.safeParse(hash).success) return fail({ kind: 'badRequest' })
  return ok({ hash, size })
}

/** Where a chunk stands and its base64 SHA-256; `wrongVersion` or `badRequest`. */
export function readChunkHead(
  headers: Headers,
): Result<{ offset: number; sum: string }, HttpProblem> {
  if (headers.get(UPLOAD_HEADERS.version) !== TUS_VERSION) return fail({ kind: 'wrongVersion' })
  const offset = numberOf(headers, UPLOAD_HEADERS.offset)
  const sum = CHECKSUM.exec(headers.get(UPLOAD_HEADERS.checksum) ?? '')?.[1]
  const isChunk = headers.get('content-type') === 'application/offset+octet-stream'
  if (offset === null || sum === undefined || !isChunk) return fail({ kind: 'badRequest' })
  return ok({ offset, sum })
}

/** Says where an upload stands. `status` is 201, 200 or 204 as the method has it. */
export function standingAnswer(hash: string, at: Standing, status: 200 | 201 | 204): Response {
  const headers = new Headers({
    [UPLOAD_HEADERS.version]: TUS_VERSION,
    [UPLOAD_HEADERS.offset]: String(at.offset),
    [UPLOAD_HEADERS.length]: String(at.size),
    'cache-control': 'no-store',
  })
  if (at.stored) headers.set(UPLOAD_HEADERS.stored, hash)
  if (at.expiresAt !== null) headers.set('upload-expires', new Date(at.expiresAt).toUTCString())
  if (status === 201) headers.set('location', `${UPLOAD_PATH}/${hash}`)
  return new Response(null, { status, headers })
}

/** A refusal in words, with its kind in a header as well: HEAD has no body. */
export function uploadRefusal(problem: HttpProblem): Response {
  const answer = problemAnswer(problem)
  answer.headers.set(UPLOAD_HEADERS.version, TUS_VERSION)
  answer.headers.set(UPLOAD_HEADERS.problem, problem.kind)
  return answer
}

/** What this address can do (tus OPTIONS). */
export const uploadAbilities = (mostBytes: number): Response =>
  new Response(null, {
    status: 204,
    headers: {
      [UPLOAD_HEADERS.version]: TUS_VERSION,
      'tus-version': TUS_VERSION,
      'tus-extension': 'creation,expiration,checksum',
      'tus-checksum-algorithm': 'sha256',
      'tus-max-size': String(mostBytes),
    },
  })
