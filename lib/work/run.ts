import { Logger, type LogLevel, run, runOnce, type TaskList } from 'graphile-worker'
import { env } from '@/lib/env'
import { systemClock } from '@/lib/ports/clock'
import { type Mail, shopMail } from '@/lib/ports/mail'
import { dropStaged } from './drop-staged'
import { leaveField } from './leave-field'
import { partRequestMail } from './part-request-mail'
import { pruneChanges } from './prune-changes'

/**
 * Runs the tasks that were put into the queue with their cause (db/queries/work.ts). A process of its
 * own, so that a slow mail server never slows an answer to a phone: scripts/work.ts. The queue belongs
 * to the role farbench_work, which sees no shop; the tasks read shops as the app does.
 */
export type WorkParts = { queueUrl: string; mail?: Mail; address?: string }

const CONCURRENCY = 2
const POLL_MS = 2_000
const TOLD: ReadonlySet<string> = new Set<`${LogLevel}`>(['error', 'warning'])

function tasks({ mail = shopMail(), address = env().NEXTAUTH_URL }: WorkParts): TaskList {
  return {
    partRequestMail: (payload) => partRequestMail(payload, { mail, address }),
    dropStaged: () => dropStaged(),
    leaveField: (payload) => leaveField(payload, { now: systemClock.now() }),
    pruneChanges: (payload) => pruneChanges(payload, { now: systemClock.now() }),
  }
}

/** Only trouble is told: a healthy queue is silent. */
const logger = new Logger(() => (level, message) => {
  if (TOLD.has(level)) process.stderr.write(`work: ${message}\n`)
})

const shared = (parts: WorkParts) => ({
  connectionString: parts.queueUrl,
  taskList: tasks(parts),
  concurrency: CONCURRENCY,
  noHandleSignals: true,
  logger,
})

/** Starts to work until `stop`, which lets running tasks finish. `ended` rejects when the queue breaks. */
export async function startWork(
  parts: WorkParts,
): Promise<{ stop: () => Promise<void>; ended: Promise<void> }> {
  const runner = await run({ ...shared(parts), pollInterval: POLL_MS, parsedCronItems: [] })
  return { stop: () => runner.stop(), ended: runner.promise }
}

/** Does what waits now and ends; for tests. */
export const workOnce = (parts: WorkParts): Promise<void> => runOnce(shared(parts))
