import { allowedActor } from '@/lib/auth/allowed'
import { systemClock } from '@/lib/ports/clock'
import { shopFiles } from '@/lib/ports/files'
import { uuidv7 } from '@/lib/ports/ids'
import { MAX_FILE_BYTES } from '@/lib/sync/protocol/unsent-file'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { readCapped } from '@/lib/sync/server/body'
import { importFile } from '@/lib/sync/server/import-file'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/** POST /api/desk/import: looks at a phone's file of unsent work; `?do=take` takes it in (IM1, IM2). */
export const POST = (request: Request) =>
  answered(async () => {
    const found = await allowedActor(request, 'unsent.import')
    if (!found.ok) return problemAnswer(found.problem)
    const body = await readCapped(request, MAX_FILE_BYTES)
    if (!body.ok) return problemAnswer(body.problem)
    const apply = new URL(request.url).searchParams.get('do') === 'take'
    const taken = await importFile({
      desk: found.value,
      text: body.value.toString('utf8'),
      apply,
      files: shopFiles(),
      now: systemClock.now(),
      newId: uuidv7.next,
    })
    return taken.ok ? jsonAnswer(taken.value) : problemAnswer(taken.problem)
  })

export const { GET, PUT, PATCH, DELETE } = refusing('POST')
