import { actorOfRequest, dropSession, sessionIdOf } from '@/lib/auth/actor'
import { heardKey, senderOf } from '@/lib/auth/device'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { ALLOWANCES, inSlot, spend } from '@/lib/sync/server/allowance'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'
import type { Claim } from '@/lib/sync/server/signed-request'
import { type Answer, exchange, openPush, readPush, seenAtOnce } from '@/lib/sync/server/sync'

/** The order to empty a phone; a session on it that is this person's or nobody's any more goes with it. */
async function wiping(request: Request, claim: Claim, told: Answer): Promise<Response> {
  const who = await actorOfRequest(request)
  const answer = jsonAnswer(told)
  if (who !== null && who.personId !== claim.personId) return answer
  for (const [name, value] of dropSession()) answer.headers.append(name, value)
  return answer
}

/**
 * One exchange with a phone: ops and cursor in, results, rows and the next cursor out (P3). Nothing is
 * unpacked before the signature was checked, and that of a phone heard lately needs no question to the
 * database: then who it is, and what else an exchange begins with, is asked in one statement.
 */
export const POST = (request: Request) =>
  answered(async () => {
    const packed = await openPush(request)
    if (!packed.ok) return problemAnswer(packed.problem)
    const { claim } = packed.value
    const { dseq } = claim
    const now = systemClock.now()
    const signedBy = heardKey(claim)
    const asked = { sessionId: await sessionIdOf(request), now, signedBy }
    const known = signedBy === null ? await senderOf(claim, { ...asked, seen: null }) : null
    if (known?.ok === false) return problemAnswer(known.problem)
    const wait = spend(ALLOWANCES.sync, claim.deviceId, now)
    if (wait !== null) return problemAnswer({ kind: 'tooMany', retryAfterSeconds: wait })
    const answer = await inSlot(async () => {
      const read = await readPush(packed.value)
      if (!read.ok) return problemAnswer(read.problem)
      const message = read.value
      const seen = seenAtOnce({ message, dseq, now })
      const device = known ?? (await senderOf(claim, { ...asked, seen }))
      if (!device.ok) return problemAnswer(device.problem)
      const told = await exchange({ device: device.value, message, dseq, now, newId: uuidv7.next })
      return told.order === 'wipe' ? await wiping(request, claim, told) : jsonAnswer(told)
    })
    return answer ?? problemAnswer({ kind: 'busy', retryAfterSeconds: 5 })
  })

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
