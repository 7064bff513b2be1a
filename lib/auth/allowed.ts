import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import { type Action, may } from '@/lib/shop/permissions'
import { actorOfRequest } from './actor'

export type NotAllowed = { kind: 'signIn' | 'forbidden' }

/** Answers the actor of a request who may do `action`; `signIn` without a live session. */
export async function allowedActor(
  request: Request,
  action: Action,
): Promise<Result<Actor, NotAllowed>> {
  const actor = await actorOfRequest(request)
  if (!actor) return fail({ kind: 'signIn' })
  return may(actor.roles, action) ? ok(actor) : fail({ kind: 'forbidden' })
}
