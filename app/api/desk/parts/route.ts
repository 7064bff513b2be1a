import { readParts } from '@/db/queries/desk-parts'
import { allowedActor } from '@/lib/auth/allowed'
import { systemClock } from '@/lib/ports/clock'
import { problemAnswer } from '@/lib/sync/server/problems'

/** GET /api/desk/parts: every part line that waits, and lately done ones. */
export async function GET(request: Request): Promise<Response> {
  const found = await allowedActor(request, 'part.see')
  if (!found.ok) return problemAnswer(found.problem)
  const parts = await readParts(found.value.shopId, systemClock.now())
  return Response.json(parts, { headers: { 'cache-control': 'no-store' } })
}
