import type * as z from 'zod/mini'
import type { Actor } from '@/lib/model/person'
import { fail, type Result } from '@/lib/model/result'
import { actorOf } from './actor'

export type ActionProblem = { kind: 'signIn' | 'invalid' }

/**
 * Wraps a server action: identifies the actor by session row, parses what the form sent, then calls
 * `run`. The answer is `run`'s own Result, or `signIn` or `invalid` before it is called. Permission is
 * `run`'s business: it names the action there. Next.js itself refuses posts from another origin.
 */
export function actorAction<S extends z.ZodMiniType, T, P>(
  schema: S,
  run: (actor: Actor, input: z.output<S>) => Promise<Result<T, P>>,
): (input: z.input<S>) => Promise<Result<T, P | ActionProblem>> {
  return async (input) => {
    const actor = await actorOf()
    if (!actor) return fail({ kind: 'signIn' })
    const parsed = schema.safeParse(input)
    if (!parsed.success) return fail({ kind: 'invalid' })
    return run(actor, parsed.data)
  }
}
