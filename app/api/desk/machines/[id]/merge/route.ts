import { allowedActor } from '@/lib/auth/allowed'
import { takeMerge } from '@/lib/sync/server/merge-request'
import { refusing } from '@/lib/sync/server/problems'

type Context = { params: Promise<{ id: string }> }

/** POST /api/desk/machines/[id]/merge with `{into}`: this machine goes on as that one (R13). */
export async function POST(request: Request, { params }: Context): Promise<Response> {
  const actor = await allowedActor(request, 'job.merge')
  return takeMerge(request, { actor, entity: 'machine', named: (await params).id })
}

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
