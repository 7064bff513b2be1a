/**
 * Swap evidence from its steps (fit, refit, fit): after the good part went in and the fault went, the outcome
 * is "gone once" or "gone and back", so both count together until the old part has been back in; then it is
 * one of them. The repeat with the new part is the same comparison once more and is not counted twice.
 * Several faults at once: the one nearest to "no change" speaks, for the good part cures only its own.
 */
import type { LogEntry } from '@/lib/model/log-entry'
import { type Evidence, nothing, type Sight, tableOf } from './evidence-table'
import { tableFactor } from './factor'
import { turned } from './outcome-table'

type SwapBody = Extract<LogEntry['body'], { kind: 'swap' }>

/** The slot that the steps of one swap share: the newest says all that the swap says so far. */
export const swapSlot = (swapId: string): string => `swap ${swapId}`

/** The evidence of one step: what the swap says after it, in the place of what it said before. */
export function swapEvidence({ c, place, log }: Sight, entry: LogEntry, body: SwapBody): Evidence {
  const swap = c.index.swaps.get(body.swapId)
  const label = `${swap?.name ?? body.swapId}: ${stepWords(body)}`
  const step = log.swapSteps.get(entry.id)
  if (swap === undefined || step === undefined || !step.moves) return nothing(entry, 'swap', label)
  const table = turned(tableOf(place, swap))
  const factor = table.rows.size === 0 ? null : tableFactor(table, [...step.now].reverse())
  return { ...nothing(entry, 'swap', label), factor, slot: swapSlot(body.swapId) }
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
