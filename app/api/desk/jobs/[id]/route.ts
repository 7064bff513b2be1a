import { readDeskJob } from '@/db/queries/desk-job'
import { allowedActor } from '@/lib/auth/allowed'
import { id as idSchema } from '@/lib/model/id'
import { may } from '@/lib/shop/permissions'
import { problemAnswer } from '@/lib/sync/server/problems'

type Context = { params: Promise<{ id: string }> }

/** GET /api/desk/jobs/[id]: one job. Unknown, another shop's and not one's own answer the same 404. */
export async function GET(request: Request, { params }: Context): Promise<Response> {
  const found = await allowedActor(request, 'desk.see')
  if (!found.ok) return problemAnswer(found.problem)
  const { shopId, personId, roles } = found.value
  const jobId = idSchema.safeParse((await params).id)
  const whose = may(roles, 'job.seeAll')
    ? ({ kind: 'all' } as const)
    : ({ kind: 'own', personId } as const)
  const job = jobId.success ? await readDeskJob(shopId, jobId.data, whose) : null
  if (!job) return problemAnswer({ kind: 'notFound' })
  return Response.json(job, { headers: { 'cache-control': 'no-store' } })
}
