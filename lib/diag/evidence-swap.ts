/**
 * Swap evidence from its steps (fit, refit, fit): after the good part went in and the fault went, the outcome
 * is "gone once" or "gone and back", so both count together until the old part has been back in; then it is
 * one of them. The repeat with the new part is the same comparison once more and is not counted twice.
 * Several faults at once: the one nearest to "no change" speaks, for the good part cures only its own.
 */
import type { LogEntry } from '@/lib/model/log-entry'
import { type Evidence, nothing, type Sight, tableOf } from './evidence-table'
import { tableFactor, turned } from './factor'

type SwapBody = Extract<LogEntry['body'], { kind: 'swap' }>

/** Weights over [no change, gone once, gone and back]. */
export type SwapWeights = readonly [number, number, number]

/** What the steps of one swap say so far; null: nothing yet. */
export function swapWeights(
  steps: readonly Pick<SwapBody, 'step' | 'faultPresent'>[],
): SwapWeights | null {
  let weights: SwapWeights | null = null
  for (const { step, faultPresent } of steps)
    if (faultPresent !== null) weights = AFTER[step](weights, faultPresent)
  return weights
}

const afterSpare = (present: boolean): SwapWeights => (present ? [1, 0, 0] : [0, 1, 1])

const AFTER: Record<
  SwapBody['step'],
  (before: SwapWeights | null, present: boolean) => SwapWeights | null
> = {
  spareFitted: (_, present) => afterSpare(present),
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

/**
 * The evidence of one step: what the swap says after it over what it said before, P(now | S) / P(before | S),
 * so that the steps multiply to the whole and each shows its own share.
 */
export function swapEvidence({ c, place }: Sight, entry: LogEntry, body: SwapBody): Evidence {
  const swap = c.index.swaps.get(body.swapId)
  const label = `${swap?.name ?? body.swapId}: ${stepWords(body)}`
  const steps = c.entries.flatMap((e) =>
    e.body.kind === 'swap' && e.body.swapId === body.swapId ? [{ id: e.id, body: e.body }] : [],
  )
  const upTo = steps.findIndex((s) => s.id === entry.id)
  const before = swapWeights(steps.slice(0, upTo).map((s) => s.body)) ?? [1, 1, 1]
  const now = swapWeights(steps.slice(0, upTo + 1).map((s) => s.body)) ?? [1, 1, 1]
  if (swap === undefined || now.every((w, k) => w === before[k]))
    return nothing(entry, 'swap', label)
  const table = turned(tableOf(place, swap))
  const after = tableFactor(table, [...now].reverse())
  const prior = tableFactor(table, [...before].reverse())
  const factor = {
    scope: after.scope,
    at: (present: readonly number[]) => after.at(present) / prior.at(present),
  }
  return { ...nothing(entry, 'swap', label), factor }
}

function stepWords({ step, faultPresent }: SwapBody): string {
  const part = {
    spareFitted: 'good part in',
    oldRefitted: 'old part back',
    newFitted: 'new part in',
  }
  const what = faultPresent === null ? 'not tried' : faultPresent ? 'fault there' : 'fault gone'
  return `${part[step]}, ${what}`
}
