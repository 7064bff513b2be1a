import { allowedActor } from '@/lib/auth/allowed'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { readWithdrawable } from '@/lib/sync/server/book/withdrawable'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/** GET /api/desk/codebook/withdrawals: what of the newest version may be withdrawn (R23). */
export const GET = (request: Request) =>
  answered(async () => {
    const found = await allowedActor(request, 'book.publish')
    if (!found.ok) return problemAnswer(found.problem)
    return jsonAnswer({ items: await readWithdrawable(found.value.shopId) })
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
