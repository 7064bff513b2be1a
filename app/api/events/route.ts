import { actorOfRequest } from '@/lib/auth/actor'
import { allowedActor } from '@/lib/auth/allowed'
import { systemClock } from '@/lib/ports/clock'
import { ALLOWANCES, MAX_STREAMS, spend } from '@/lib/sync/server/allowance'
import { answered } from '@/lib/sync/server/answer'
import { eventHub } from '@/lib/sync/server/event-hub'
import { streamEvents } from '@/lib/sync/server/event-stream'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

export const dynamic = 'force-dynamic'

/** The desk's live line: which rows of the shop changed, as they change. */
export const GET = (request: Request) =>
  answered(async () => {
    const found = await allowedActor(request, 'desk.see')
    if (!found.ok) return problemAnswer(found.problem)
    const actor = found.value
    const wait = spend(ALLOWANCES.stream, actor.personId, systemClock.now())
    if (wait !== null) return problemAnswer({ kind: 'tooMany', retryAfterSeconds: wait })
    const hub = eventHub()
    if (hub.isClosed || hub.size >= MAX_STREAMS)
      return problemAnswer({ kind: 'busy', retryAfterSeconds: 30 })
    const roles = actor.roles.join()
    const isStillGood = async () => (await actorOfRequest(request))?.roles.join() === roles
    const lastEventId = request.headers.get('last-event-id')
    return streamEvents({ hub, actor, lastEventId, signal: request.signal, isStillGood })
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
