import { allowedActor } from '@/lib/auth/allowed'
import { bookImport } from '@/lib/model/book-desk'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { readCapped, readJson } from '@/lib/sync/server/body'
import { importBook } from '@/lib/sync/server/book/import-book'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/** The largest book that is taken in by file (a choice: many times a whole one). */
const MAX_BYTES = 16 * 1024 * 1024

/** POST /api/desk/codebook/import: takes files as the shop's draft, or says by line what is wrong with them. */
export const POST = (request: Request) =>
  answered(async () => {
    const found = await allowedActor(request, 'book.publish')
    if (!found.ok) return problemAnswer(found.problem)
    const body = await readCapped(request, MAX_BYTES)
    if (!body.ok) return problemAnswer(body.problem)
    const json = await readJson(body.value, null)
    if (!json.ok) return problemAnswer(json.problem)
    const form = bookImport.safeParse(json.value)
    if (!form.success) return problemAnswer({ kind: 'badJson' })
    const hand = { actor: found.value, now: systemClock.now(), newId: uuidv7.next }
    const taken = await importBook(hand, form.data)
    if (taken.ok) return jsonAnswer(taken.value)
    const kind = taken.problem.kind === 'hasDraft' ? 'notAsItStands' : 'forbidden'
    return problemAnswer({ kind })
  })

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
