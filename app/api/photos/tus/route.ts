import { senderOf } from '@/lib/auth/device'
import { systemClock } from '@/lib/ports/clock'
import { shopFiles } from '@/lib/ports/files'
import { ALLOWANCES, spend } from '@/lib/sync/server/allowance'
import { answered } from '@/lib/sync/server/answer'
import { beginUpload } from '@/lib/sync/server/photo-upload'
import { MAX_PHOTO_BYTES } from '@/lib/sync/server/photos'
import { refusing } from '@/lib/sync/server/problems'
import { quarantineOf } from '@/lib/sync/server/quarantine-files'
import { readUploadClaim } from '@/lib/sync/server/signed-request'
import {
  readCreation,
  standingAnswer,
  uploadAbilities,
  uploadRefusal,
} from '@/lib/sync/server/upload-request'

/** Begins an upload, or says where the one under way stands; signed by a phone (PH2). */
export const POST = (request: Request) =>
  answered(async () => {
    const asked = readCreation(request.headers)
    if (!asked.ok) return uploadRefusal(asked.problem)
    const { hash, size } = asked.value
    const claim = readUploadClaim(request.headers, { act: 'create', hash, at: size, chunk: '-' })
    if (!claim) return uploadRefusal({ kind: 'badSignature' })
    const device = await senderOf(claim)
    if (!device.ok) return uploadRefusal(device.problem)
    const now = systemClock.now()
    const wait = spend(ALLOWANCES.photo, device.value.deviceId, now)
    if (wait !== null) return uploadRefusal({ kind: 'tooMany', retryAfterSeconds: wait })
    const quarantine = quarantineOf(device.value)
    const upload = { device: device.value, hash, files: shopFiles(), now, quarantine }
    const at = await beginUpload(upload, size)
    return at.ok ? standingAnswer(hash, at.value, 201) : uploadRefusal(at.problem)
  })

export const OPTIONS = () => uploadAbilities(MAX_PHOTO_BYTES)

export const { GET, PUT, PATCH, DELETE } = refusing('POST, OPTIONS')
