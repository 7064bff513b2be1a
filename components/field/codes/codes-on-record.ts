import { living } from '@/lib/diag/case'
import type { LogEntry } from '@/lib/model/log-entry'

/** True when a code was taken down, or it was said why not: only then may they be cleared (rule R11). */
export const codesOnRecord = (entries: readonly LogEntry[]): boolean =>
  living(entries).some(({ body }) => body.kind === 'code' || body.kind === 'codesUnreadable')
