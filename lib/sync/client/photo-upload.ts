import type { Result } from '@/lib/model/result'
import type { Answer, NetworkProblem } from '@/lib/ports/network'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { HEADERS } from '@/lib/sync/protocol/device'
import {
  CHECKSUM_MISMATCH,
  TUS_VERSION,
  UPLOAD_HEADERS,
  UPLOAD_PATH,
  type UploadAct,
  uploadText,
} from '@/lib/sync/protocol/upload'
import { base64, type Sender, signText } from './envelope'
import { type Reply, readReply, refusal } from './reply'

/**
 * What the shop says of an upload: `stored` when it has the whole file verified, `at` where it stands,
 * `mismatch` when it stands elsewhere, `gone` when it must be begun anew; else what an answer to
 * anything may say.
 */
export type UploadReply =
  | { kind: 'stored' }
  | { kind: 'at'; offset: number }
  | { kind: 'mismatch' }
  | { kind: 'gone' }
  | Exclude<Reply, { kind: 'ours' }>

const ascii = (text: string) => base64(new TextEncoder().encode(text))

/** Begins the upload of a file, or hears where the one under way stands. */
export async function beginUpload(
  ports: SyncPorts,
  sender: Sender,
  { hash, size }: { hash: string; size: number },
): Promise<UploadReply> {
  const headers = {
    ...(await signed(sender, { act: 'create', hash, at: size, chunk: '-' })),
    [UPLOAD_HEADERS.length]: String(size),
    [UPLOAD_HEADERS.metadata]: `sha256 ${ascii(hash)}`,
  }
  const sent = await ports.network.send({ method: 'POST', path: UPLOAD_PATH, headers })
  return readUpload(sent, hash, ports.clock.now())
}

/** Asks where an upload stands. */
export async function askUpload(
  ports: SyncPorts,
  sender: Sender,
  hash: string,
): Promise<UploadReply> {
  const headers = await signed(sender, { act: 'ask', hash, at: 0, chunk: '-' })
  const path = `${UPLOAD_PATH}/${hash}`
  const sent = await ports.network.send({ method: 'HEAD', path, headers })
  return readUpload(sent, hash, ports.clock.now())
}

/** Sends one chunk of a file, with its check sum. */
export async function sendChunk(
  ports: SyncPorts,
  sender: Sender,
  { hash, offset, chunk }: { hash: string; offset: number; chunk: Uint8Array<ArrayBuffer> },
): Promise<UploadReply> {
  const sum = base64(new Uint8Array(await crypto.subtle.digest('SHA-256', chunk)))
  const headers = {
    ...(await signed(sender, { act: 'chunk', hash, at: offset, chunk: sum })),
    'content-type': 'application/offset+octet-stream',
    [UPLOAD_HEADERS.offset]: String(offset),
    [UPLOAD_HEADERS.checksum]: `sha256 ${sum}`,
  }
  const path = `${UPLOAD_PATH}/${hash}`
  const sent = await ports.network.send({ method: 'PATCH', path, headers, body: chunk })
  return readUpload(sent, hash, ports.clock.now())
}

async function signed(
  sender: Sender,
  of: { act: UploadAct; hash: string; at: number; chunk: string },
): Promise<Record<string, string>> {
  const { shopId: shop, personId: person, deviceId: device } = sender
  return {
    [UPLOAD_HEADERS.version]: TUS_VERSION,
    [HEADERS.shop]: shop,
    [HEADERS.person]: person,
    [HEADERS.device]: device,
    [HEADERS.signature]: await signText(sender, uploadText({ shop, person, device, ...of })),
  }
}

/** Reads an answer. One that does not speak tus is not the shop's, whatever its status says (P17). */
export function readUpload(
  sent: Result<Answer, NetworkProblem>,
  hash: string,
  nowMs: number,
): UploadReply {
  if (!sent.ok) return { kind: 'unreachable' }
  const { status, header } = sent.value
  if (header(UPLOAD_HEADERS.version) !== TUS_VERSION) return notOfUploads(sent, nowMs)
  if (status < 300) return standing(header, hash)
  if (status === 404 || status === 410) return { kind: 'gone' }
  const problem = header(UPLOAD_HEADERS.problem) ?? 'unknown'
  if (status === 409 && problem === 'wrongOffset') return { kind: 'mismatch' }
  if (status === CHECKSUM_MISMATCH) return { kind: 'later', afterMs: null }
  if (status === 413 || status === 408 || status === 429 || status >= 500) {
    return notOfUploads(sent, nowMs)
  }
  return refusal(status, problem)
}

function standing(header: Answer['header'], hash: string): UploadReply {
  if (header(UPLOAD_HEADERS.stored) === hash) return { kind: 'stored' }
  const offset = header(UPLOAD_HEADERS.offset) ?? ''
  return /^\d{1,10}$/.test(offset)
    ? { kind: 'at', offset: Number(offset) }
    : { kind: 'unreachable' }
}

function notOfUploads(sent: Result<Answer, NetworkProblem>, nowMs: number): UploadReply {
  const reply = readReply(sent, nowMs)
  if (reply.kind === 'ours') return { kind: 'unreachable' }
  // A server that does not know uploads yet is no reason to set anything aside.
  return reply.kind === 'never' ? { kind: 'later', afterMs: null } : reply
}
