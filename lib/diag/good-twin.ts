import type { Id } from '@/lib/model/id'
import type { LogEntry, ReadingBody } from '@/lib/model/log-entry'
import type { Suspect } from './belief'
import { weighsNothing } from './news'

type Read = { id: Id; body: ReadingBody }

/**
 * The last reading of the suspect part and the last one of a known-good part by the same check (rule R17),
 * from the living entries in their order; null until both were taken.
 */
export function twinOf(
  checkId: string,
  entries: readonly LogEntry[],
): { suspect: Read; good: Read } | null {
  const last = (subject: ReadingBody['subject']): Read | null => {
    const found = entries.findLast(
      ({ body }) => body.kind === 'reading' && body.checkId === checkId && body.subject === subject,
    )
    return found?.body.kind === 'reading' ? { id: found.id, body: found.body } : null
  }
  const suspect = last('suspect')
  const good = last('knownGood')
  return suspect === null || good === null ? null : { suspect, good }
}

/** True when the belief takes nothing from an entry for any suspect (F4); also when no suspect names it. */
export function saysNothingOf(
  suspects: readonly {
    why: readonly Pick<Suspect['why'][number], 'entryId' | 'saysNothing' | 'logRatio'>[]
  }[],
  entryId: Id,
): boolean {
  return suspects
    .flatMap((one) => one.why.filter((why) => why.entryId === entryId))
    .every(weighsNothing)
}
