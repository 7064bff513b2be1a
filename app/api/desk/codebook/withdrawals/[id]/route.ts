import { allowedActor } from '@/lib/auth/allowed'
import { id } from '@/lib/model/id'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { changedJobs } from '@/lib/sync/server/book/changed-jobs'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

type Context = { params: Promise<{ id: string }> }

/** GET /api/desk/codebook/withdrawals/[id]: every job whose verdict the withdrawal changes (R23). */
export const GET = (request: Request, { params }: Context) =>
  answered(async () => {
    const found = await allowedActor(request, 'book.publish')
    if (!found.ok) return problemAnswer(found.problem)
    const named = id.safeParse((await params).id)
    const jobs = named.success ? await changedJobs(found.value.shopId, named.data) : undefined
    return jobs === undefined ? problemAnswer({ kind: 'notFound' }) : jsonAnswer({ jobs })
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
