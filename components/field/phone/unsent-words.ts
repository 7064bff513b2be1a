import type { UnsentView } from '@/components/store/use-unsent'
import { WARN_SHARE } from '@/lib/sync/client/room'
import { size, span } from '../times'
import { counted } from '../words'

/** Bytes of a photo as this app keeps it, about: for "room for so many" (a choice). */
const PHOTO_BYTES = 600_000
const MOST_SAID = 999

/** "7 not sent". */
export const titleOf = ({
  counted: known,
  count,
}: Pick<UnsentView, 'counted' | 'count'>): string =>
  !known ? 'Counting' : count === 0 ? 'All sent' : `${count} not sent`

/**
 * How things stand, in one or two sentences. `sendsClosed`: the browser sends also with the app closed;
 * elsewhere it must be open to send (P20).
 */
export function standing(unsent: UnsentView, sendsClosed: boolean): string {
  if (!unsent.counted) {
    return 'Counting what this phone holds.'
  }
  if (unsent.count === 0) {
    return 'Everything recorded on this phone is at the shop.'
  }
  if (unsent.sending !== null) {
    const { done, total } = unsent.sending
    return `Sending: ${done} of ${total} taken by the shop, ${size(unsent.bytes)} to go. All of it stays saved on this phone until then.`
  }
  return sendsClosed
    ? 'All of it is saved on this phone. With signal it goes by itself, also with this closed.'
    : 'All of it is saved on this phone. With signal and this open, it goes by itself. Closed, it does not: it opens to send.'
}

/** "Not sending for 17 min: the phone has a network, but the shop does not answer." */
export function stalledWords(stalled: NonNullable<UnsentView['stalled']>, now: number): string {
  return `Not sending for ${span(now - Date.parse(stalled.sinceAt))}: ${stalled.why}. Everything is kept.`
}

export const NEED_WORDS: Record<NonNullable<UnsentView['needs']>, string> = {
  signIn: 'The shop asks you to sign in again. Unsent work is kept and still goes out.',
  updateApp:
    'The shop needs a newer version of this app. Load it with signal; unsent work is kept.',
  refused:
    'The shop does not take work from this phone at the moment. Everything is kept here. Call the shop.',
  room: 'The phone has no room for what the shop sends. Unsent work still goes out. Delete something else on the phone.',
}

/** What is said of the room: whether it is kept, and how much is left. */
export function storageWords(
  unsent: Pick<UnsentView, 'storageKept' | 'freeBytes' | 'quotaShare'>,
): string {
  const kept =
    unsent.storageKept === true
      ? 'Storage is kept: the phone will not clear it.'
      : unsent.storageKept === null
        ? 'Storage: the phone was not asked yet.'
        : 'Storage is not promised: a phone short of room may clear it. Put the app on the home screen, and send soon.'
  if (unsent.freeBytes === null) {
    return kept
  }
  const photos = Math.floor(unsent.freeBytes / PHOTO_BYTES)
  return photos > MOST_SAID
    ? `${kept} Room for more than ${MOST_SAID} photos.`
    : `${kept} Room for about ${counted(photos, 'photo')}.`
}

/** True when the person should be warned of the room (P21). */
export const isNearlyFull = ({ quotaShare }: Pick<UnsentView, 'quotaShare'>): boolean =>
  quotaShare !== null && quotaShare >= WARN_SHARE
