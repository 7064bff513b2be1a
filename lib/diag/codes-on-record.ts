import type { LogEntry } from '@/lib/model/log-entry'
import { living } from './case'

/**
 * True when a living entry takes a code down, or says why they could not be read: only then may the codes of
 * a machine be cleared (rule R11).
 */
export const codesOnRecord = (entries: readonly LogEntry[]): boolean =>
  living(entries).some(({ body }) => body.kind === 'code' || body.kind === 'codesUnreadable')
