import { AppError } from '@/lib/model/result'
import { troubleOf } from './database-trouble'
import { problemAnswer } from './problems'

/** Seconds after which to come back when the database is away or busy. */
const RETRY_SECONDS = 5

/** Answers JSON that no cache keeps. */
export const jsonAnswer = (body: unknown, headers: Record<string, string> = {}): Response =>
  new Response(JSON.stringify(body), {
    headers: { 'content-type': 'application/json', 'cache-control': 'no-store', ...headers },
  })

/**
 * Runs a handler; a database or a file store that is away or busy is `busy`, to be tried again, and no
 * broken server.
 */
export async function answered(handler: () => Promise<Response>): Promise<Response> {
  try {
    return await handler()
  } catch (error) {
    const isAway = error instanceof AppError && error.retry
    const trouble = troubleOf(error)
    if (!isAway && (trouble === 'bug' || trouble === 'badData')) throw error
    return problemAnswer({ kind: 'busy', retryAfterSeconds: RETRY_SECONDS })
  }
}
