import { allowedActor } from '@/lib/auth/allowed'
import { sha256Hex } from '@/lib/model/id'
import { shopFiles } from '@/lib/ports/files'
import { answered } from '@/lib/sync/server/answer'
import { photoAnswer } from '@/lib/sync/server/photo-answer'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'
import { showQuarantined } from '@/lib/sync/server/quarantine-files'

type Context = { params: Promise<{ hash: string }> }

/** GET /api/desk/phones/files/[hash]: a photo or voice note in quarantine, for the owner who decides on it. */
export const GET = (request: Request, { params }: Context) =>
  answered(async () => {
    const found = await allowedActor(request, 'device.revoke')
    if (!found.ok) return problemAnswer(found.problem)
    const hash = sha256Hex.safeParse((await params).hash)
    if (!hash.success) return problemAnswer({ kind: 'notFound' })
    const file = await showQuarantined(found.value.shopId, hash.data, shopFiles())
    if (!file.ok) return problemAnswer(file.problem)
    return photoAnswer(file.value, request.headers.get('range'))
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
