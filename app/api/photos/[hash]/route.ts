import { actorOfRequest } from '@/lib/auth/actor'
import { deviceOf } from '@/lib/auth/device'
import { systemClock } from '@/lib/ports/clock'
import { shopFiles } from '@/lib/ports/files'
import { ALLOWANCES, spend } from '@/lib/sync/server/allowance'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { readCapped } from '@/lib/sync/server/body'
import { MAX_PHOTO_BYTES, readPhoto, readPhotoClaim, takePhoto } from '@/lib/sync/server/photos'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

type Context = { params: Promise<{ hash: string }> }

/** Takes a picture's bytes under their SHA-256, signed by a phone like a push. */
export const PUT = (request: Request, { params }: Context) =>
  answered(async () => {
    const { hash } = await params
    const claim = readPhotoClaim(request.headers, hash)
    if (!claim) return problemAnswer({ kind: 'badSignature' })
    const device = await deviceOf(claim)
    if (!device.ok) return problemAnswer(device.problem)
    const now = systemClock.now()
    const wait = spend(ALLOWANCES.photo, device.value.deviceId, now)
    if (wait !== null) return problemAnswer({ kind: 'tooMany', retryAfterSeconds: wait })
    const body = await readCapped(request, MAX_PHOTO_BYTES)
    if (!body.ok) return problemAnswer(body.problem)
    const delivery = { device: device.value, hash, bytes: body.value, files: shopFiles(), now }
    const kept = await takePhoto(delivery)
    return kept.ok ? jsonAnswer(kept.value) : problemAnswer(kept.problem)
  })

/** Shows a picture to whoever is signed in and may see its job. */
export const GET = (request: Request, { params }: Context) =>
  answered(async () => {
    const actor = await actorOfRequest(request)
    if (!actor) return problemAnswer({ kind: 'signIn' })
    const photo = await readPhoto(actor, (await params).hash, shopFiles())
    if (!photo.ok) return problemAnswer(photo.problem)
    const { bytes, mime } = photo.value
    const headers = {
      'content-type': mime,
      'x-content-type-options': 'nosniff',
      'cache-control': 'private, max-age=31536000, immutable',
      'content-security-policy': "default-src 'none'; sandbox",
      'content-disposition': 'inline',
    }
    return new Response(bytes, { headers })
  })

export const { POST, PATCH, DELETE } = refusing('GET, PUT')
