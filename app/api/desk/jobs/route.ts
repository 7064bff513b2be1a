import { readBoard } from '@/db/queries/desk-board'
import { allowedActor } from '@/lib/auth/allowed'
import { systemClock } from '@/lib/ports/clock'
import { may } from '@/lib/shop/permissions'
import { problemAnswer } from '@/lib/sync/server/problems'

/** GET /api/desk/jobs: the dispatcher's board. `?whose=own`: a mechanic's own jobs. */
export async function GET(request: Request): Promise<Response> {
  const found = await allowedActor(request, 'desk.see')
  if (!found.ok) return problemAnswer(found.problem)
  const { shopId, personId, roles } = found.value
  const own = new URL(request.url).searchParams.get('whose') === 'own'
  if (!own && !may(roles, 'job.seeAll')) return problemAnswer({ kind: 'forbidden' })
  const whose = own ? ({ kind: 'own', personId } as const) : ({ kind: 'all' } as const)
  const board = await readBoard(shopId, whose, systemClock.now())
  return Response.json(board, { headers: { 'cache-control': 'no-store' } })
}
