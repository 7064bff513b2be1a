import { limitsOf } from '@/lib/diag/reading-budget'
import type { ReadingBody } from '@/lib/model/log-entry'
import type { Quantity } from '@/lib/model/meter-profile'
import { asTypedOnScreen, decimalsOf, fixed, shortUnit, spokenUnit, twoDigits } from './figures'
import type { Limits } from './scale'
import { unitLabel } from './unit-words'

export type Verdict = NonNullable<ReadingBody['result']>['verdict']

/** Everything a strip draws and says about one reading; made from a live reading or from a log entry. */
export type StripReading = {
  /** The figure as typed, as the meter showed it; over range the top of the range. */
  shown: string
  /** The unit as typed; the rest is in the quantity's kept unit. */
  unit: string
  overRange: boolean
  quantity: Quantity
  /** The value after the leads and the temperature are taken off, with its expanded uncertainty (k = 2). */
  estimate: number
  expandedU: number
  limits: Limits | null
  verdict: Verdict | null
  /** The step of the display, for decimals. */
  resolution: number
}

const WORDS: Record<Verdict, string> = {
  in: 'IN',
  outLow: 'OUT, LOW',
  outHigh: 'OUT, HIGH',
  tooClose: 'TOO CLOSE TO CALL',
}

/** The verdict as it stands on every screen. */
export const verdictWords = (verdict: Verdict | null): string =>
  verdict === null ? 'NO LIMIT TO JUDGE BY' : WORDS[verdict]

/** The figure as it stands on the screen: `2.2`, over range `> 20`; the unit beside it is the typed one. */
export const shownFigure = ({
  shown,
  overRange,
}: Pick<StripReading, 'shown' | 'overRange'>): string =>
  `${overRange ? '> ' : ''}${asTypedOnScreen(shown)}`

/** A reading of the job log with the verdict it was saved with; null when none was worked out. */
export function stripOfBody(body: ReadingBody): StripReading | null {
  if (body.result === null) return null
  return {
    shown: body.asTyped,
    unit: unitLabel(body.quantity, body.unit),
    overRange: body.overRange,
    quantity: body.quantity,
    estimate: body.result.estimate,
    expandedU: body.result.expandedU,
    limits: limitsOf(body.spec),
    verdict: body.result.verdict,
    resolution: body.meterFunction.resolution,
  }
}

/** How the estimate stands to the nearest limit: `17.6 V under`, `6.2 V clear`, `on the limit`. */
export function distanceWords(reading: StripReading, withUnit = true): string {
  const { limits, estimate, quantity, verdict } = reading
  if (reading.overRange) return 'over the range'
  if (limits === null) return ''
  const places = Math.max(decimalsOf(reading.resolution), 0)
  const gaps = [
    { gap: limits.low === null ? null : estimate - limits.low, out: 'under' },
    { gap: limits.high === null ? null : limits.high - estimate, out: 'over' },
  ].filter((x): x is { gap: number; out: string } => x.gap !== null)
  const nearest = gaps.sort((a, b) => a.gap - b.gap)[0]
  if (nearest === undefined) return ''
  const size = fixed(Math.abs(nearest.gap), places)
  const unit = withUnit ? `${shortUnit(quantity).split(' ')[0] ?? ''} ` : ''
  if (Number(size) === 0) return 'on the limit'
  if (nearest.gap < 0) return `${size} ${unit}${nearest.out}`
  return verdict === 'tooClose' ? `${size} ${unit}inside` : `${size} ${unit}clear`
}

/** Which jaw an undecided reading lies across, for its glyph. */
export function acrossOf(reading: Pick<StripReading, 'estimate' | 'expandedU' | 'limits'>): Across {
  const { estimate, expandedU, limits } = reading
  const hits = (limit: number | null | undefined) =>
    limit !== null && limit !== undefined && Math.abs(limit - estimate) < expandedU
  const low = hits(limits?.low)
  const high = hits(limits?.high)
  return low && high ? 'both' : high ? 'high' : 'low'
}
export type Across = 'low' | 'high' | 'both'

/** The good band in words: `45 to 60`, `12.4 or more`, `0.1 or less`. */
export function bandWords(limits: Limits): string {
  if (limits.low !== null && limits.high !== null)
    return `${plain(limits.low)} to ${plain(limits.high)}`
  if (limits.low !== null) return `${plain(limits.low)} or more`
  return limits.high === null ? 'not known' : `${plain(limits.high)} or less`
}

/** A limit without trailing noise: 0.45000000000000001 shows as 0.45. */
export const plain = (value: number): string =>
  fixed(value, Math.min(decimalsOf(Number(value.toPrecision(6))), 6))

/** The one sentence that says what the picture shows. */
export function stripSentence(reading: StripReading): string {
  const unit = spokenUnit(reading.quantity)
  const u = twoDigits(reading.expandedU)
  const first = reading.overRange
    ? `Over range on the meter, above ${asTypedOnScreen(reading.shown)} ${reading.unit}.`
    : `${fixed(reading.estimate, placesOf(reading))} ${unit}, plus or minus ${u.text}.`
  const band = reading.limits === null ? '' : ` Good band ${bandWords(reading.limits)}.`
  const distance = distanceWords(reading, false)
  const words = sentenceCase(verdictWords(reading.verdict))
  return `${first}${band} ${words}${distance === '' ? '' : `, ${distance}`}.`
}

/** Decimals of the estimate: as fine as the display or as the uncertainty, whichever is finer. */
export const placesOf = (reading: Pick<StripReading, 'resolution' | 'expandedU'>): number =>
  Math.max(decimalsOf(reading.resolution), twoDigits(reading.expandedU).places)

const sentenceCase = (words: string): string =>
  `${words.slice(0, 1)}${words.slice(1).toLowerCase()}`
