import type { Belief } from '@/lib/diag/belief'

/** What the engine says of the list as a whole. */
export const NOTICE_WORDS: Record<Belief['notices'][number], string> = {
  moreThanOneLikely: 'More than one fault is likely.',
  maybeNotInList: 'The fault may not be in this list.',
}
