import type { DraftKept } from '@/lib/sync/client/drafts'

/** Of the words only the state's own are seen and read out; all stand there, so that nothing moves. */
const WORDS: readonly [DraftKept, string][] = [
  ['nothing', 'Kept on this phone as you type.'],
  ['writing', 'Keeping the draft.'],
  ['kept', 'Draft kept on this phone.'],
]

/**
 * Whether what is half written stands in the phone's store now (rule R8). `data-draft` tells at once;
 * the words wait a moment, so that a write of a few milliseconds does not flicker at each key.
 */
export function DraftSign({ kept }: { kept: DraftKept }) {
  if (kept === 'lost')
    return (
      <p data-draft="lost" role="alert" className="text-second font-bold text-nogo">
        Draft not kept: this phone has no room. Save it now, or delete something else on the phone.
      </p>
    )
  return (
    <p data-draft={kept} className="draft-sign text-second text-ink2">
      {WORDS.map(([state, words]) => (
        <span key={state} data-state={state}>
          {words}
        </span>
      ))}
    </p>
  )
}

/** The state of a draft that goes with another one: the other counts while it is not kept. */
export const keptWith = (draft: DraftKept, other: DraftKept): DraftKept =>
  draft !== 'lost' && (other === 'writing' || other === 'lost') ? other : draft
