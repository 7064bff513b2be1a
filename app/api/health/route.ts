import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { pingDatabase } from '@/db/queries/health'
import { answered, jsonAnswer } from '@/lib/sync/server/answer'
import { refusing } from '@/lib/sync/server/problems'

const buildId = (): Promise<string> =>
  readFile(join(process.cwd(), '.next', 'BUILD_ID'), 'utf8').then(
    (text) => text.trim(),
    () => 'development',
  )

export const dynamic = 'force-dynamic'

/** Whether this server can work: its database answers. Says which build it runs. */
export const GET = () =>
  answered(async () => {
    await pingDatabase()
    return jsonAnswer({ ok: true, build: await buildId() })
  })

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
