import { allowedActor } from '@/lib/auth/allowed'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { readDeskBook } from '@/lib/sync/server/book/desk-book'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/** GET /api/desk/codebook: the owner's list of versions, the draft, and what was withdrawn. */
export const GET = (request: Request) =>
  answered(async () => {
    const found = await allowedActor(request, 'book.publish')
    if (!found.ok) return problemAnswer(found.problem)
    return jsonAnswer(await readDeskBook(found.value.shopId))
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
