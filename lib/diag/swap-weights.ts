/**
 * What the steps of a swap (fit, refit, fit) leave open: after the good part went in and the fault went, the outcome
 * is "gone once" or "gone and back"; the old part back decides between them; the new part repeats.
 */
import type { LogBody } from '@/lib/model/log-entry'

type SwapBody = Extract<LogBody, { kind: 'swap' }>

/** Weights over [no change, gone once, gone and back]. */
export type SwapWeights = readonly [number, number, number]

/** Before any step: every outcome is open. */
export const ALL_OPEN: SwapWeights = [1, 1, 1]

/** What the steps of one swap say so far, from what was said before them; null: nothing yet. */
export function swapWeights(
  steps: readonly Pick<SwapBody, 'step' | 'faultPresent'>[],
  before: SwapWeights | null = null,
): SwapWeights | null {
  let weights = before
  for (const { step, faultPresent } of steps)
    if (faultPresent !== null) weights = AFTER[step](weights, faultPresent)
  return weights
}

const afterSpare = (present: boolean): SwapWeights => (present ? [1, 0, 0] : [0, 1, 1])

const AFTER: Record<
  SwapBody['step'],
  (before: SwapWeights | null, present: boolean) => SwapWeights | null
> = {
  // A new round after a cure only repeats what is known; after "no change" it starts afresh.
  spareFitted: (before, present) =>
    before === null || before[0] === 1 ? afterSpare(present) : afterNew(before, present),
  oldRefitted: (before, present) => {
    if (before === null || before[0] === 1) return before
    return present ? [0, 0, 1] : [0, 1, 0]
  },
  newFitted: afterNew,
}

/** A new part that does not cure undoes "gone and back"; alone it counts like a first fitting. */
function afterNew(before: SwapWeights | null, present: boolean): SwapWeights {
  if (before === null) return afterSpare(present)
  if (!present) return before
  return before[2] === 1 && before[1] === 0 ? [0, 1, 0] : [1, 0, 0]
}
