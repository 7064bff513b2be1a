import { type Actor, actor } from '@/lib/model/person'
import type { ShopLine } from '@/lib/ports/shop-line'

/** Who is signed in, or null: nobody, or the shop cannot be asked. */
export async function readActor(line: ShopLine): Promise<Actor | null> {
  const answer = await line.getJson('/api/me')
  if (!answer.ok) return null
  const { actor: who } = answer.value as { actor?: unknown }
  const read = actor.safeParse(who ?? answer.value)
  return read.success ? read.data : null
}
