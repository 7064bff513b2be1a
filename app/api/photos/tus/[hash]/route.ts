import { senderOf as signedBy } from '@/lib/auth/device'
import { systemClock } from '@/lib/ports/clock'
import { shopFiles } from '@/lib/ports/files'
import { MAX_CHUNK_BYTES } from '@/lib/sync/protocol/upload'
import { ALLOWANCES, spend } from '@/lib/sync/server/allowance'
import { answered } from '@/lib/sync/server/answer'
import { readCapped } from '@/lib/sync/server/body'
import { addChunk, askUpload } from '@/lib/sync/server/photo-upload'
import { refusing } from '@/lib/sync/server/problems'
import { quarantineOf } from '@/lib/sync/server/quarantine-files'
import { type Claim, readUploadClaim } from '@/lib/sync/server/signed-request'
import { readChunkHead, standingAnswer, uploadRefusal } from '@/lib/sync/server/upload-request'

type Context = { params: Promise<{ hash: string }> }

/** Who sends, when the signature holds and there is some allowance left. */
async function senderOf(claim: Claim | null) {
  if (!claim) return { refusal: uploadRefusal({ kind: 'badSignature' }) }
  const device = await signedBy(claim)
  if (!device.ok) return { refusal: uploadRefusal(device.problem) }
  const now = systemClock.now()
  const wait = spend(ALLOWANCES.chunk, device.value.deviceId, now)
  if (wait !== null) return { refusal: uploadRefusal({ kind: 'tooMany', retryAfterSeconds: wait }) }
  return { device: device.value, now, quarantine: quarantineOf(device.value) }
}

/** Says where an upload stands (PH2). */
export const HEAD = (request: Request, { params }: Context) =>
  answered(async () => {
    const { hash } = await params
    const of = { act: 'ask', hash, at: 0, chunk: '-' } as const
    const sender = await senderOf(readUploadClaim(request.headers, of))
    if ('refusal' in sender) return sender.refusal
    const at = await askUpload({ ...sender, hash, files: shopFiles() })
    return at.ok ? standingAnswer(hash, at.value, 200) : uploadRefusal(at.problem)
  })

/** Takes a chunk. Its check sum is signed, so nobody unknown gets to send a byte. */
export const PATCH = (request: Request, { params }: Context) =>
  answered(async () => {
    const { hash } = await params
    const head = readChunkHead(request.headers)
    if (!head.ok) return uploadRefusal(head.problem)
    const { offset, sum } = head.value
    const of = { act: 'chunk', hash, at: offset, chunk: sum } as const
    const sender = await senderOf(readUploadClaim(request.headers, of))
    if ('refusal' in sender) return sender.refusal
    const body = await readCapped(request, MAX_CHUNK_BYTES)
    if (!body.ok) return uploadRefusal(body.problem)
    const upload = { ...sender, hash, files: shopFiles() }
    const at = await addChunk(upload, { offset, chunk: body.value, sum })
    return at.ok ? standingAnswer(hash, at.value, 204) : uploadRefusal(at.problem)
  })

export const { GET, POST, PUT, DELETE } = refusing('HEAD, PATCH')
