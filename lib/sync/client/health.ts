import type { SendState } from './phone-sender'
import type { Stalled, UnsentItem } from './views'

/** Work as old as this should be at the shop when there is a line (P24). */
const LATE_MS = 15 * 60 * 1000
/** A page that was just opened, or just found signal, gets so long for its first try (a choice). */
const GRACE_MS = 20_000

/** What is known of the line and of the sender's last steps, all in ms by the phone's own clock. */
export type Line = {
  /** The browser says there is a network; it may be wrong, so it is a hint and never an answer (P17). */
  signal: boolean
  /** Since when it says so; the opening of the page at the earliest. */
  signalSinceMs: number
  /** When something last went to the shop from this page. */
  movedMs: number
  nowMs: number
}

/**
 * Whether sending has come to a halt (P24): judged by what has moved, never by what a connection says.
 * Without signal nothing is wrong; what is stuck or waits for another record has a state of its own.
 */
export function stalledOf(
  items: readonly UnsentItem[],
  state: SendState,
  line: Line,
): Stalled | null {
  if (!line.signal && state.reached !== true) return null
  const waiting = items.filter((item) => item.state === 'waiting' || item.state === 'sending')
  const oldest = waiting.map((item) => Date.parse(item.since)).sort((a, b) => a - b)[0]
  if (oldest === undefined) return null
  const haltedMs = Math.max(oldest, line.movedMs)
  const isLate = line.nowMs - haltedMs > LATE_MS
  if (!isLate || line.nowMs - line.signalSinceMs < GRACE_MS) return null
  return { sinceAt: new Date(haltedMs).toISOString(), why: whyOf(state) }
}

function whyOf(state: SendState): string {
  if (state.need !== null) return NEEDS[state.need]
  if (state.running !== null) return 'a call to the shop is under way, but nothing comes back'
  if (state.reached === false) return 'the phone has a network, but the shop does not answer'
  return 'the shop answers, but takes nothing'
}

const NEEDS: Record<NonNullable<SendState['need']>, string> = {
  signIn: 'the shop asks you to sign in',
  updateApp: 'the shop needs a newer version of this app',
  refused: 'the shop does not take work from this phone',
  room: 'the phone has no room for the shop’s answer',
}
