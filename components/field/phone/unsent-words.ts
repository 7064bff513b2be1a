import type { UnsentView } from '@/components/store/use-unsent'
import { WARN_SHARE } from '@/lib/sync/client/room'
import { size, span } from '../times'
import { counted } from '../words'

/** Bytes of a photo as this app keeps it, about: for "room for so many" (a choice). */
const PHOTO_BYTES = 600_000
const MOST_SAID = 999

type LetGo = Pick<UnsentView, 'letGoCount' | 'filesLetGo'>

/** How much its person gave up sending: the shop never got it. */
export const letGoOf = ({ letGoCount, filesLetGo }: LetGo): number => letGoCount + filesLetGo

/** "7 not sent". */
export const titleOf = (of: Pick<UnsentView, 'counted' | 'count'> & LetGo): string =>
  !of.counted
    ? 'Counting'
    : of.count > 0
      ? `${of.count} not sent`
      : letGoOf(of) === 0
        ? 'All sent'
        : 'Nothing waits'

/**
 * How things stand, in one or two sentences. `sendsClosed`: the browser sends also with the app closed;
 * elsewhere it must be open to send (P20).
 */
export function standing(unsent: UnsentView, sendsClosed: boolean): string {
  if (!unsent.counted) {
    return 'Counting what this phone holds.'
  }
  if (unsent.count === 0) {
    return letGoOf(unsent) === 0
      ? 'Everything you recorded here is at the shop.'
      : `Everything you recorded here is at the shop, but for ${counted(letGoOf(unsent), 'thing')} let go.`
  }
  if (unsent.sending !== null) {
    const { done, total } = unsent.sending
    return `Sending: ${done} of ${total} taken by the shop, ${size(unsent.bytes)} to go. All of it stays saved on this phone until then.`
  }
  const held = unsent.items.filter(({ state }) => state === 'stuck' || state === 'blocked').length
  if (held > 0 && held === unsent.items.length) {
    return 'All of it is saved on this phone. None of it goes by itself: see below what each needs.'
  }
  const rest =
    held === 0 ? '' : ' What is stuck, or waits for what is stuck, stays until you see to it.'
  return sendsClosed
    ? `All of it is saved on this phone. With signal it goes by itself, also with this closed.${rest}`
    : `All of it is saved on this phone. With signal and this open, it goes by itself. Closed, it does not: it opens to send.${rest}`
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
