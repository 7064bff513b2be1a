import { allowedActor } from '@/lib/auth/allowed'
import { takeUnmerge } from '@/lib/sync/server/merge-request'
import { refusing } from '@/lib/sync/server/problems'

type Context = { params: Promise<{ id: string }> }

/** POST /api/desk/jobs/[id]/unmerge: this job stands for itself again (R13). */
export async function POST(request: Request, { params }: Context): Promise<Response> {
  const actor = await allowedActor(request, 'job.merge')
  return takeUnmerge({ actor, entity: 'job', named: (await params).id })
}

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
