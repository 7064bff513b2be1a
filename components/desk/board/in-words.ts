import type { BoardJob } from '@/lib/model/desk'
import { whenWords } from '../../field/when-words'
import { counted } from '../../field/words'

/**
 * What of a job is at the shop. It knows which photos and voice notes are missing, because their entries
 * name them; which entries still lie on a phone it does not know, so it never says that all is in.
 */
export function inWords(
  { photosMissing, heardAt }: Pick<BoardJob, 'photosMissing' | 'heardAt'>,
  { zone, now }: { zone: string; now: number | null },
): string {
  if (heardAt === null) return 'nothing written yet'
  const last = `last entry in ${whenWords(heardAt, zone, now)}`
  return photosMissing > 0
    ? `${last}, ${counted(photosMissing, 'photo or voice note', 'photos or voice notes')} on the phone`
    : `${last}, no photo or voice note missing`
}
