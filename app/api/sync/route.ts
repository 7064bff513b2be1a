import { actorOfRequest, dropSession } from '@/lib/auth/actor'
import { senderOf } from '@/lib/auth/device'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { ALLOWANCES, inSlot, spend } from '@/lib/sync/server/allowance'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'
import type { Claim } from '@/lib/sync/server/signed-request'
import { type Answer, exchange, openPush, readPush } from '@/lib/sync/server/sync'

/** The order to empty a phone; a session on it that is this person's or nobody's any more goes with it. */
async function wiping(request: Request, claim: Claim, told: Answer): Promise<Response> {
  const who = await actorOfRequest(request)
  const answer = jsonAnswer(told)
  if (who !== null && who.personId !== claim.personId) return answer
  for (const [name, value] of dropSession()) answer.headers.append(name, value)
  return answer
}

/** One exchange with a phone: ops and cursor in, results, rows and the next cursor out (P3). */
export const POST = (request: Request) =>
  answered(async () => {
    const packed = await openPush(request)
    if (!packed.ok) return problemAnswer(packed.problem)
    const [device, signedIn] = await Promise.all([
      senderOf(packed.value.claim),
      actorOfRequest(request),
    ])
    if (!device.ok) return problemAnswer(device.problem)
    const now = systemClock.now()
    const wait = spend(ALLOWANCES.sync, device.value.deviceId, now)
    if (wait !== null) return problemAnswer({ kind: 'tooMany', retryAfterSeconds: wait })
    const { claim } = packed.value
    const answer = await inSlot(async () => {
      const message = await readPush(packed.value)
      if (!message.ok) return problemAnswer(message.problem)
      const session = message.value.pull ? signedIn : null
      const parts = { device: device.value, session, message: message.value, dseq: claim.dseq }
      const told = await exchange({ ...parts, now, newId: uuidv7.next })
      return told.order === 'wipe' ? await wiping(request, claim, told) : jsonAnswer(told)
    })
    return answer ?? problemAnswer({ kind: 'busy', retryAfterSeconds: 5 })
  })

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
