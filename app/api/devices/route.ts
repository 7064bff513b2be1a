import { actorOfRequest } from '@/lib/auth/actor'
import { isDeviceKey } from '@/lib/auth/device'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { may } from '@/lib/shop/permissions'
import { ALLOWANCES, spend } from '@/lib/sync/server/allowance'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { enrol, readEnrolment } from '@/lib/sync/server/enrol'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/** Makes the phone of whoever is signed in known to the shop. */
export const POST = (request: Request) =>
  answered(async () => {
    const actor = await actorOfRequest(request)
    if (!actor) return problemAnswer({ kind: 'signIn' })
    if (!may(actor.roles, 'field.see')) return problemAnswer({ kind: 'forbidden' })
    const now = systemClock.now()
    const wait = spend(ALLOWANCES.enrol, actor.personId, now)
    if (wait !== null) return problemAnswer({ kind: 'tooMany', retryAfterSeconds: wait })
    const asked = await readEnrolment(request)
    if (!asked.ok) return problemAnswer(asked.problem)
    if (!isDeviceKey(asked.value.publicKey)) return problemAnswer({ kind: 'badKey' })
    const done = await enrol(actor, asked.value, { now, newId: uuidv7.next })
    return done.ok ? jsonAnswer(done.value) : problemAnswer(done.problem)
  })

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
