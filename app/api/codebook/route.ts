import { actorOfRequest } from '@/lib/auth/actor'
import { answered } from '@/lib/sync/server/answer'
import { answerBook } from '@/lib/sync/server/code-book'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/** The shop's code book, the newest or `?version=`; 304 when the caller holds it. */
export const GET = (request: Request) =>
  answered(async () => {
    const actor = await actorOfRequest(request)
    if (!actor) return problemAnswer({ kind: 'signIn' })
    const wanted = new URL(request.url).searchParams.get('version')
    return answerBook(actor, wanted, request.headers.get('if-none-match'))
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
