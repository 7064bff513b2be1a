import { proofBound, WANTED_SHARE } from '@/lib/diag/proof-run'
import { of100 } from '../reading-strip/figures'

type ProofCount = { starts: number; faults: number }

/** What the count proves, in one or two plain sentences. */
export function proofSentence(count: ProofCount): string {
  const { starts, faults } = count
  const bound = proofBound(count)
  if (bound.exact === null) return 'No start yet, so nothing is proved.'
  if (faults > 0)
    return `${faults} of ${starts} ${plural(starts, 'restart')} with the fault: up to ${of100(bound.exact)} of 100 starts could fail (one-sided 95 %). The repair is not proved.`
  const three = bound.ruleOfThree === null ? '' : ` The 3/n rule says ${of100(bound.ruleOfThree)}.`
  return `${starts} clean ${plural(starts, 'restart')}: up to ${of100(bound.exact)} of 100 starts could still fail (one-sided 95 %).${three}`
}

/** How many more clean starts are wanted, with where the goal comes from; null when a fault came. */
export function moreSentence(count: ProofCount): string | null {
  const { more } = proofBound(count)
  if (more === null) return null
  if (more === 0) return `That is under ${GOAL}.`
  return `${more} more clean ${plural(more, 'start')} would bring it under ${GOAL}.`
}

const GOAL = `${of100(WANTED_SHARE)} of 100 (the goal is common practice, no source)`

const plural = (n: number, word: string): string => (n === 1 ? word : `${word}s`)

/** `10:05` from milliseconds; hours once there are any. */
export function stopwatch(ms: number): string {
  const seconds = Math.max(0, Math.floor(ms / 1000))
  const two = (n: number) => String(n).padStart(2, '0')
  const hours = Math.floor(seconds / 3600)
  const minutes = Math.floor((seconds % 3600) / 60)
  return hours > 0
    ? `${hours}:${two(minutes)}:${two(seconds % 60)}`
    : `${minutes}:${two(seconds % 60)}`
}
