import type { PartLineState } from '@/lib/model/part-request'

/**
 * A part line as a counter (M6): what phones add and take away is summed, in whatever order it arrives. A
 * line counted down to nothing is cancelled, and stands again as asked when it is counted up.
 */
export type CountedLine = {
  state: PartLineState
  quantity: number
  /** The sum asked for, which may pass through nothing; null: the quantity. */
  wanted: number | null
  countedOut: boolean
}

/** States in which the field may still change a line: nothing was ordered for it. */
const OPEN: ReadonlySet<PartLineState> = new Set(['asked', 'identified', 'quoted'])
const MOST = 999

/** True while the field may cancel or count the line; later it is a question to the parts desk (R14). */
export const isOpenLine = (line: CountedLine): boolean => OPEN.has(line.state) || line.countedOut

/** The line after `by` more (or fewer) pieces were asked for; undefined when it is past counting. */
export function countLine<L extends CountedLine>(line: L, by: number): L | undefined {
  if (!isOpenLine(line)) return undefined
  const wanted = (line.wanted ?? line.quantity) + by
  if (wanted < 1) return { ...line, wanted, quantity: 1, state: 'cancelled', countedOut: true }
  const state = line.countedOut ? 'asked' : line.state
  return { ...line, wanted, quantity: Math.min(MOST, wanted), state, countedOut: false }
}

/** The line cancelled; undefined when it is past cancelling. Cancelled twice is cancelled once. */
export function cancelLine<L extends CountedLine>(line: L): L | undefined {
  if (line.state === 'cancelled' && !line.countedOut) return line
  return isOpenLine(line) ? { ...line, state: 'cancelled', countedOut: false } : undefined
}
