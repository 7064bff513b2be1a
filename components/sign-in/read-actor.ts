import { type Actor, actor } from '@/lib/model/person'
import type { ShopLine } from '@/lib/ports/shop-line'

/** Who is signed in, or null: nobody, or the shop cannot be asked. */
export async function readActor(line: ShopLine): Promise<Actor | null> {
  const answer = await line.getJson('/api/me')
  return answer.ok ? actorIn(answer.value) : null
}

/** Whom an answer of `/api/me` names; null when it is none. */
export function actorIn(answer: unknown): Actor | null {
  const { actor: who } = answer as { actor?: unknown }
  const read = actor.safeParse(who ?? answer)
  return read.success ? read.data : null
}
