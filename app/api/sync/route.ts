import { actorOfRequest } from '@/lib/auth/actor'
import { deviceOf } from '@/lib/auth/device'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { ALLOWANCES, inSlot, spend } from '@/lib/sync/server/allowance'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'
import { exchange, openPush, readPush } from '@/lib/sync/server/sync'

/** One exchange with a phone: ops and cursor in, results, rows and the next cursor out (P3). */
export const POST = (request: Request) =>
  answered(async () => {
    const packed = await openPush(request)
    if (!packed.ok) return problemAnswer(packed.problem)
    const device = await deviceOf(packed.value.claim)
    if (!device.ok) return problemAnswer(device.problem)
    const now = systemClock.now()
    const wait = spend(ALLOWANCES.sync, device.value.deviceId, now)
    if (wait !== null) return problemAnswer({ kind: 'tooMany', retryAfterSeconds: wait })
    const { claim } = packed.value
    const answer = await inSlot(async () => {
      const message = await readPush(packed.value)
      if (!message.ok) return problemAnswer(message.problem)
      const session = message.value.pull ? await actorOfRequest(request) : null
      const parts = { device: device.value, session, message: message.value, dseq: claim.dseq }
      return jsonAnswer(await exchange({ ...parts, now, newId: uuidv7.next }))
    })
    return answer ?? problemAnswer({ kind: 'busy', retryAfterSeconds: 5 })
  })

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
