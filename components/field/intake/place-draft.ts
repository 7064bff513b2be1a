import type { Point } from '@/lib/diag/distance'
import { parsePlace } from '@/lib/diag/place-text'
import type { Place } from '@/lib/model/place'
import type { Instant } from '@/lib/model/time'
import type { IntakeDraft } from './intake-draft'

type PlacePart = Pick<IntakeDraft, 'place' | 'placeText' | 'lastFix'>

const typedPlace = (point: Point, text: string, at: Instant): Place => ({
  latitude: point.latitude,
  longitude: point.longitude,
  source: 'typed',
  accuracyMetres: null,
  at,
  asTyped: text.trim(),
  words: null,
})

/** After a fix: it is the position, and remembered for when something is typed over it. */
export const afterFix = (place: Place): PlacePart => ({ place, placeText: '', lastFix: place })

/**
 * After typing: what can be read is the position, an emptied box gives back the last fix, or no position
 * where there was none. What cannot be read yet leaves the position as it is; the step is then not done.
 */
export function afterTyping(
  draft: Pick<IntakeDraft, 'place' | 'lastFix'>,
  text: string,
  at: Instant,
): PlacePart {
  const lastFix = draft.lastFix ?? null
  if (text.trim() === '') return { place: lastFix, placeText: text, lastFix }
  const read = parsePlace(text)
  const place = read.ok ? typedPlace(read.value, text, at) : draft.place
  return { place, placeText: text, lastFix }
}

/** Without a position: nothing typed and no fix remembered. */
export const NO_PLACE: PlacePart = { place: null, placeText: '', lastFix: null }
