import type { LogEntry, SWAP_STEPS } from '@/lib/model/log-entry'

/** A step of a swap: spare fitted, old part refitted, new part fitted. */
export type SwapStep = (typeof SWAP_STEPS)[number]
/** What the log keeps of one step. */
export type SwapBody = Extract<LogEntry['body'], { kind: 'swap' }>
/** A step that was done, with its entry. */
export type DoneStep = { entry: LogEntry; body: SwapBody }

/** Where one swap stands in its present round. */
export type SwapProgress = {
  /** Steps of the present round, in the order they were done. */
  done: DoneStep[]
  /** The step that is open now; null when nothing is left to do. */
  next: SwapStep | null
  /** The spare did not cure it, so the rest of the order proves nothing more. */
  noChange: boolean
  /** Said in words on the screen and in the report. */
  swappedBack: 'yes' | 'notDone' | 'notYet'
}

/**
 * How far a swap has come (F5), from the living entries of the log in their order. Steps are locked in order:
 * good part in, old part back (or plainly not done), new part in. A new "good part in" begins a new round.
 * Entries of other swaps do not count.
 */
export function swapProgress(swapId: string, entries: readonly LogEntry[]): SwapProgress {
  const all = entries.flatMap((entry) =>
    entry.body.kind === 'swap' && entry.body.swapId === swapId ? [{ entry, body: entry.body }] : [],
  )
  const start = all.findLastIndex((one) => one.body.step === 'spareFitted')
  const done = start < 0 ? [] : all.slice(start)
  const spare = done.find((one) => one.body.step === 'spareFitted')
  const old = done.find((one) => one.body.step === 'oldRefitted')
  const fresh = done.find((one) => one.body.step === 'newFitted')
  const noChange = spare?.body.faultPresent === true
  return {
    done,
    noChange,
    next: nextOf({ spare, old, fresh, noChange }),
    swappedBack: old === undefined ? 'notYet' : old.body.faultPresent === null ? 'notDone' : 'yes',
  }
}

type Found = {
  spare: DoneStep | undefined
  old: DoneStep | undefined
  fresh: DoneStep | undefined
  noChange: boolean
}

function nextOf({ spare, old, fresh, noChange }: Found): SwapStep | null {
  if (spare === undefined) return 'spareFitted'
  if (noChange) return null
  if (old === undefined) return 'oldRefitted'
  return fresh === undefined ? 'newFitted' : null
}
