import type { Writes } from './commit'
import type { LetGoRecord, OutboxRecord } from './phone-db'

/**
 * Letting go of what is stuck (P16): the record leaves the outbox and is kept, sealed as it was, in a
 * store of its own, from which it goes into every exported file. Nobody is asked to send it any more.
 */
export function letGoWrites(
  records: readonly OutboxRecord[],
  nowMs: number,
): Pick<Writes, 'letGo' | 'dropOutbox'> {
  return {
    letGo: records.map((record): LetGoRecord => ({ ...record, state: 'letGo', letGoAt: nowMs })),
    dropOutbox: records.map((record) => record.dseq),
  }
}
