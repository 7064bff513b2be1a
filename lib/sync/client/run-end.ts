import type { Reply } from './reply'
import type { Need } from './views'

/** How a run ended. `wait`: not everything went; try again after a while. `busy`: the shop itself asked to. */
export type RunEnd =
  | { kind: 'done' }
  | { kind: 'unreachable' }
  | { kind: 'wait'; afterMs: number | null; busy?: true }
  | { kind: 'enrol' }
  | { kind: 'need'; need: Exclude<Need, null> }
  /** The shop has taken this phone out and has all that was on it: it empties itself (Q4). */
  | { kind: 'wipe' }

/** How a run ends with an answer that is about the line or about who sends, not about what was sent. */
export function endOf(reply: Exclude<Reply, { kind: 'ours' | 'smaller' | 'never' }>): RunEnd {
  switch (reply.kind) {
    case 'unreachable':
      return { kind: 'unreachable' }
    case 'later':
      return { kind: 'wait', afterMs: reply.afterMs, busy: true }
    case 'enrol':
      return { kind: 'enrol' }
    default:
      return { kind: 'need', need: reply.kind }
  }
}
