import type { LogBody, LogEntry } from '@/lib/model/log-entry'

/** Lines of a job log for tests: one a minute, each with its own id. */
let count = 0
export const entry = (body: LogBody, supersedes: string | null = null): LogEntry => {
  count += 1
  const at = new Date(Date.UTC(2026, 10, 24, 18, count)).toISOString()
  return {
    id: `01980000-0000-7000-9000-${String(count).padStart(12, '0')}`,
    jobId: '01980000-0000-7000-8000-000000000901',
    supersedes,
    happenedAt: at,
    writtenAt: at,
    zone: 'Etc/GMT+6',
    authorId: '01980000-0000-7000-8000-000000000101',
    deviceId: '01980000-0000-7000-8000-000000000801',
    engineVersion: '1',
    bookVersion: 1,
    body,
  }
}
