import type { SwapBody, SwapProgress, SwapStep } from '@/lib/diag/swap-progress'

/** Headings and answers of the three steps; answers in the order of their keys. */
export const STEP_WORDS: Record<
  SwapStep,
  { title: (part: string) => string; ask: string; there: string; gone: string }
> = {
  spareFitted: {
    title: (part) => `1. Fit the known-good ${part}`,
    ask: 'Start it as the fault came before. The fault is:',
    there: 'Still there',
    gone: 'Gone',
  },
  oldRefitted: {
    title: (part) => `2. Refit the old ${part}`,
    ask: 'Start it again the same way. The fault is:',
    there: 'Back',
    gone: 'Not back',
  },
  newFitted: {
    title: (part) => `3. Fit the new ${part}`,
    ask: 'Start it once more. The fault is:',
    there: 'Still there',
    gone: 'Gone',
  },
}

/** One done step in a few words: `Old part refitted: fault back`. */
export function doneWords(body: SwapBody): string {
  const { step, faultPresent } = body
  const words = STEP_WORDS[step]
  if (faultPresent === null) return step === 'oldRefitted' ? 'Old part not refitted' : 'Not tried'
  return `Fault ${(faultPresent ? words.there : words.gone).toLowerCase()}`
}

/** What the swap says so far, in one plain sentence; null while there is nothing to say. */
export function swapSays(progress: SwapProgress, part: string): string | null {
  const { done, noChange, swappedBack } = progress
  if (done.length === 0) return null
  if (noChange)
    return `The good ${part} did not cure it. Something else is at fault; refit or keep the old ${part}.`
  const old = done.find((one) => one.body.step === 'oldRefitted')
  if (swappedBack === 'notYet')
    return 'Gone with the good part once. A plug pushed home can do that too: refit the old one to prove it.'
  if (swappedBack === 'notDone')
    return 'Not swapped back: it went with one swap alone, so the part is likely but not proved.'
  return old?.body.faultPresent === true
    ? `Swapped back and confirmed: the fault follows the old ${part}.`
    : `The fault stayed away with the old ${part} too: moving the plug may have cured it.`
}
