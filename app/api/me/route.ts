import { actorOfRequest } from '@/lib/auth/actor'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/** Who the session says is at work. */
export const GET = (request: Request) =>
  answered(async () => {
    const actor = await actorOfRequest(request)
    return actor ? jsonAnswer(actor) : problemAnswer({ kind: 'signIn' })
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
