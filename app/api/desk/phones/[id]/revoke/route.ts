import { allowedActor } from '@/lib/auth/allowed'
import { revokeForm } from '@/lib/model/phones'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'

import { problemAnswer, refusing } from '@/lib/sync/server/problems'
import { readForm } from '@/lib/sync/server/read-form'
import { revokePhone } from '@/lib/sync/server/revoke'

type Context = { params: Promise<{ id: string }> }

/** POST /api/desk/phones/[id]/revoke: the owner takes a phone out for good. */
export const POST = (request: Request, { params }: Context) =>
  answered(async () => {
    const found = await allowedActor(request, 'device.revoke')
    if (!found.ok) return problemAnswer(found.problem)
    const form = await readForm(request, { phoneId: (await params).id }, revokeForm)
    if (!form.ok) return problemAnswer(form.problem)
    const with_ = { now: systemClock.now(), newId: uuidv7.next }
    const done = await revokePhone(found.value, form.value, with_)
    return done.ok ? jsonAnswer({}) : problemAnswer(done.problem)
  })

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
