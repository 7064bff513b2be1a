import { actorOfRequest } from '@/lib/auth/actor'
import { answered } from '@/lib/sync/server/answer'
import { answerBook, bookWanted } from '@/lib/sync/server/code-book'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/**
 * The shop's code book, the newest or `?version=`, whole, or with `?from=HASH` what changed since; 304 when the
 * caller holds it. `?as=manifest`: the hash of every item.
 */
export const GET = (request: Request) =>
  answered(async () => {
    const actor = await actorOfRequest(request)
    if (!actor) return problemAnswer({ kind: 'signIn' })
    return answerBook(actor, bookWanted(request.url), request.headers.get('if-none-match'))
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
