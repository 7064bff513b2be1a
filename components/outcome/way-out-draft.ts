import type { SaidByHand } from '@/lib/diag/way-out'
import type { Id } from '@/lib/model/id'
import type { JobMachineState, PeopleState, WayOut } from '@/lib/model/job'
import type { LeftBehindLine } from '@/lib/shop/way-out-states'

/** A way out half decided, kept to the keystroke (rule R8). */
export type WayOutDraft = {
  way: WayOut | null
  said: SaidByHand[]
  machine: JobMachineState | null
  people: PeopleState | null
  reasons: string
  /** What a machine left behind demands (rule R2). */
  left: Record<LeftBehindLine, string>
}
export const FRESH_WAY_OUT: WayOutDraft = {
  way: null,
  said: [],
  machine: null,
  people: null,
  reasons: '',
  left: { key: '', tap: '', secured: '', land: '', fetch: '' },
}
export const wayOutDraftKey = (jobId: Id): string => `wayout:${jobId}`
