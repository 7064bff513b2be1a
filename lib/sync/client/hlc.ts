import { hlcAt, hlcMs } from '@/lib/sync/protocol/hlc'

/** `last` moved up to a time another clock showed, so that later stamps sort after what was seen. */
export function receiveHlc(last: string, seenMs: number): string {
  return Math.floor(seenMs) > hlcMs(last) ? hlcAt(seenMs) : last
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
