import { actorOfRequest } from '@/lib/auth/actor'
import { senderOf } from '@/lib/auth/device'
import { systemClock } from '@/lib/ports/clock'
import { shopFiles } from '@/lib/ports/files'
import { ALLOWANCES, spend } from '@/lib/sync/server/allowance'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { readCapped } from '@/lib/sync/server/body'
import { photoAnswer, sizeOf } from '@/lib/sync/server/photo-answer'
import { MAX_PHOTO_BYTES, readPhoto, readPhotoClaim, takePhoto } from '@/lib/sync/server/photos'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'
import { keepFile, quarantineOf } from '@/lib/sync/server/quarantine-files'

type Context = { params: Promise<{ hash: string }> }

/** Takes a file's bytes at once under their SHA-256, signed like a push: phones of protocol 1 (P13). */
export const PUT = (request: Request, { params }: Context) =>
  answered(async () => {
    const { hash } = await params
    const claim = readPhotoClaim(request.headers, hash)
    if (!claim) return problemAnswer({ kind: 'badSignature' })
    const device = await senderOf(claim)
    if (!device.ok) return problemAnswer(device.problem)
    const now = systemClock.now()
    const wait = spend(ALLOWANCES.photo, device.value.deviceId, now)
    if (wait !== null) return problemAnswer({ kind: 'tooMany', retryAfterSeconds: wait })
    const body = await readCapped(request, MAX_PHOTO_BYTES)
    if (!body.ok) return problemAnswer(body.problem)
    const delivery = { device: device.value, hash, bytes: body.value, files: shopFiles(), now }
    const quarantine = quarantineOf(device.value)
    const kept = quarantine
      ? await keepFile({ ...delivery, ...quarantine })
      : await takePhoto(delivery)
    return kept.ok ? jsonAnswer(kept.value) : problemAnswer(kept.problem)
  })

/** Shows a photo (`?size=thumb|show`), or plays a voice note, to whoever is signed in and may see its job. */
export const GET = (request: Request, { params }: Context) =>
  answered(async () => {
    const actor = await actorOfRequest(request)
    if (!actor) return problemAnswer({ kind: 'signIn' })
    const wanted = { hash: (await params).hash, size: sizeOf(request.url) }
    const photo = await readPhoto(actor, wanted, shopFiles())
    return photo.ok
      ? photoAnswer(photo.value, request.headers.get('range'))
      : problemAnswer(photo.problem)
  })

export const { POST, PATCH, DELETE } = refusing('GET, PUT')
