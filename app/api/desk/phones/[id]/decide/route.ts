import { allowedActor } from '@/lib/auth/allowed'
import { decideForm } from '@/lib/model/phones'
import { systemClock } from '@/lib/ports/clock'
import { shopFiles } from '@/lib/ports/files'
import { uuidv7 } from '@/lib/ports/ids'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'

import { problemAnswer, refusing } from '@/lib/sync/server/problems'
import { decide } from '@/lib/sync/server/quarantine-form'
import { readForm } from '@/lib/sync/server/read-form'

type Context = { params: Promise<{ id: string }> }

/** POST /api/desk/phones/[id]/decide: the owner accepts or refuses what a phone left in quarantine. */
export const POST = (request: Request, { params }: Context) =>
  answered(async () => {
    const found = await allowedActor(request, 'device.revoke')
    if (!found.ok) return problemAnswer(found.problem)
    const form = await readForm(request, { phoneId: (await params).id }, decideForm)
    if (!form.ok) return problemAnswer(form.problem)
    const with_ = { files: shopFiles(), now: systemClock.now(), newId: uuidv7.next }
    const done = await decide(found.value, form.value, with_)
    if (done.ok) return jsonAnswer({ decided: done.value })
    return problemAnswer(done.problem)
  })

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
