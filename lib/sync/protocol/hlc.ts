/**
 * Hybrid logical clock as text that sorts (sync.md 3.4): 12 hex digits of ms since 1970, 4 of a counter.
 * A stamp given out is always later than every stamp given out before, whatever the phone's clock does.
 */
export const FIRST_HLC = '000000000000-0000'

const MAX_COUNT = 0xffff

const print = (ms: number, count: number) =>
  `${ms.toString(16).padStart(12, '0')}-${count.toString(16).padStart(4, '0')}`

/** The time of a stamp, ms since 1970. */
export const hlcMs = (hlc: string): number => Number.parseInt(hlc.slice(0, 12), 16)

const countOf = (hlc: string) => Number.parseInt(hlc.slice(13), 16)

/** The first stamp of a time (ms since 1970). */
export const hlcAt = (ms: number): string => print(Math.max(0, Math.floor(ms)), 0)

/** The stamp after `last` at `nowMs` (ms since 1970, corrected): max(last, now), counted up within a ms. */
export function nextHlc(last: string, nowMs: number): string {
  const now = Math.max(0, Math.floor(nowMs))
  if (now > hlcMs(last)) return print(now, 0)
  const count = countOf(last) + 1
  return count > MAX_COUNT ? print(hlcMs(last) + 1, 0) : print(hlcMs(last), count)
}
