'use client'

import { useSilent } from '@/components/store/use-silent'
import { useStamp } from '@/components/store/use-stamp'
import { Key } from '@/components/ui/key'
import { clockTime, dayOf } from '../times'
import { counted } from '../words'

/**
 * Says once, on a store that begins anew, that a phone of the same person fell silent with unsent work
 * (P22). Whether that was this very phone, cleared to the last word, nobody can know but its person.
 */
export function SilentNotice() {
  const { silent, read } = useSilent()
  const { zone } = useStamp()
  if (silent === null) {
    return null
  }
  const which = silent.phones === 1 ? 'A phone of yours' : `${silent.phones} phones of yours`
  return (
    <section
      role="alert"
      aria-label="Unsent work elsewhere"
      className="safe-sides grid gap-2 border-y-2 border-nogo py-3"
    >
      <p className="font-bold text-nogo">
        {which} last reached the shop on {dayOf(silent.lastAt, zone)} at{' '}
        {clockTime(silent.lastAt, zone)} and still held {unsentWords(silent)} then.
      </p>
      <p>
        If you have it, open this app on it where there is signal. If it is this very phone and the
        browser has cleared everything, that work is gone, and so is what was recorded after: write
        it again and tell the shop.
      </p>
      <div>
        <Key small onClick={read}>
          I have read it
        </Key>
      </div>
    </section>
  )
}

/** "3 records and 2 photos or voice notes". */
function unsentWords({ ops, photos }: { ops: number; photos: number }): string {
  const parts = [
    ops > 0 ? counted(ops, 'record') : null,
    photos > 0 ? counted(photos, 'photo or voice note', 'photos or voice notes') : null,
  ]
  return parts.filter((part) => part !== null).join(' and ')
}
