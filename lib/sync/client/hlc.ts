/**
 * Hybrid logical clock as text that sorts (sync.md 3.4): 12 hex digits of ms since 1970, 4 of a counter.
 * A stamp given out is always later than every stamp given out before, whatever the phone's clock does.
 */
export const FIRST_HLC = '000000000000-0000'

const MAX_COUNT = 0xffff

const print = (ms: number, count: number) =>
  `${ms.toString(16).padStart(12, '0')}-${count.toString(16).padStart(4, '0')}`

const msOf = (hlc: string) => Number.parseInt(hlc.slice(0, 12), 16)
const countOf = (hlc: string) => Number.parseInt(hlc.slice(13), 16)

/** The stamp after `last` at `nowMs` (ms since 1970, corrected): max(last, now), counted up within a ms. */
export function nextHlc(last: string, nowMs: number): string {
  const now = Math.max(0, Math.floor(nowMs))
  if (now > msOf(last)) return print(now, 0)
  const count = countOf(last) + 1
  return count > MAX_COUNT ? print(msOf(last) + 1, 0) : print(msOf(last), count)
}

/** `last` moved up to a time another clock showed, so that later stamps sort after what was seen. */
export function receiveHlc(last: string, seenMs: number): string {
  const seen = Math.max(0, Math.floor(seenMs))
  return seen > msOf(last) ? print(seen, 0) : last
}

/**
 * Shop's clock less the phone's, ms. The true offset lies within half the round trip of the measured
 * one; a held offset inside that span is kept, so that a slow line does not make the clock swing.
 */
export function measureOffset(of: {
  held: number | undefined
  sentMs: number
  receivedMs: number
  serverMs: number
}): number {
  const measured = of.serverMs - (of.sentMs + of.receivedMs) / 2
  const halfTrip = Math.max(0, of.receivedMs - of.sentMs) / 2
  if (of.held !== undefined && Math.abs(of.held - measured) <= halfTrip) return of.held
  return Math.round(measured)
}
