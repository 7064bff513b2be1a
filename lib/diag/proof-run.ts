/**
 * What a proof run proves (F7). Bounds are one-sided Clopper-Pearson (1934): the largest fault share at
 * which seeing this few faults still has chance 1 - confidence; found by bisection on the exact binomial.
 */
import { binomialCdf, clopperPearson, MOST_COUNTED, poissonInterval } from './exact-intervals'
import { mustFit } from './figure-bounds'

/** Counts up to the largest whole number that is exact; callers have parsed them, else AppError. */
const COUNT = [0, Number.MAX_SAFE_INTEGER] as const
/** One-sided confidence: above one half, under 1. */
const CONFIDENCE = [0.500001, 0.999999] as const
const SHARE = [0, 1] as const

/** Upper bound on the share of starts that could still fail after `starts` clean ones; 1 with no starts. */
export function boundAfterClean(starts: number, confidence = 0.95): number {
  mustFit({ starts: [starts, ...COUNT], confidence: [confidence, ...CONFIDENCE] })
  return starts === 0 ? 1 : -Math.expm1(Math.log(1 - confidence) / starts)
}

/**
 * Upper bound on the share that fails after `faults` in `trials` (whole counts), one-sided; 1 when every trial
 * failed. Above 10,000 faults both counts are divided alike and rounded to the safe side, right to 1 of 1,000.
 */
export function upperBound(faults: number, trials: number, confidence = 0.95): number {
  mustFit({ faults: [faults, ...COUNT], trials: [trials, ...COUNT] })
  if (faults === 0) return boundAfterClean(trials, confidence)
  const fewer = Math.max(1, faults / MOST_COUNTED)
  const [some, of] = [Math.ceil(faults / fewer), Math.floor(trials / fewer)]
  return some >= of ? 1 : clopperPearson(some, of, 2 * confidence - 1).high
}

/** The rule of three: after n clean trials up to 3/n could still fail, about 95 % (common practice); at most 1. */
export function ruleOfThree(n: number): number {
  mustFit({ n: [n, ...COUNT] })
  return n === 0 ? 1 : Math.min(1, 3 / n)
}

/** Clean starts needed before the bound falls to `share` (0 to 1) or below. Infinite for a share of 0, 0 for 1. */
export function cleanStartsFor(share: number, confidence = 0.95): number {
  mustFit({ share: [share, ...SHARE], confidence: [confidence, ...CONFIDENCE] })
  if (share === 1) return 0
  // The hair of 1e-9 keeps a bound met exactly from asking one start more.
  return Math.max(1, Math.ceil(Math.log(1 - confidence) / Math.log1p(-share) - 1e-9))
}

/** The share of starts (0 to 1) to get under before a machine goes back out: 10 of 100 (common practice, no source). */
export const WANTED_SHARE = 0.1

/** What a count of starts bounds, in shares of starts from 0 to 1. */
export type ProofBound = {
  /** The exact bound; null without a start. */
  exact: number | null
  /** The rule of three; null without a start and once a fault came, for it speaks of clean runs only. */
  ruleOfThree: number | null
  /** Clean starts still wanted to get under 10 of 100; 0 when it is under; null once a fault came. */
  more: number | null
}

/** One-sided 95 % bound on what could still fail after these starts, of which `faults` showed the fault. */
export function proofBound({ starts, faults }: { starts: number; faults: number }): ProofBound {
  const wanted = cleanStartsFor(WANTED_SHARE)
  if (starts === 0) return { exact: null, ruleOfThree: null, more: wanted }
  if (faults > 0) return { exact: upperBound(faults, starts), ruleOfThree: null, more: null }
  return {
    exact: boundAfterClean(starts),
    ruleOfThree: ruleOfThree(starts),
    more: Math.max(0, wanted - starts),
  }
}

const MINUTES = [0, 1e9] as const
const RATE = [0, 1e6] as const

/**
 * Chance that an intermittent fault is still there after `minutes` (0 to 1e9) without it: p e^(-rt) / (p e^(-rt) +
 * 1 - p), p the chance before (0 to 1), r its rate per minute (0 to 1e6) under the condition (docs/spec/diag.md,
 * Belief). What is certain stays certain. A cold run of a fault that comes when hot is not to be counted in.
 */
export function chanceLeft(before: number, ratePerMinute: number, minutes: number): number {
  mustFit({
    before: [before, ...SHARE],
    ratePerMinute: [ratePerMinute, ...RATE],
    minutes: [minutes, ...MINUTES],
  })
  if (before === 1) return 1
  const unseen = before * Math.exp(-ratePerMinute * minutes)
  return unseen / (unseen + 1 - before)
}

/** Whole clean minutes needed until that chance is `target` or less; 0 when it already is, infinite at rate 0. */
export function minutesFor(before: number, ratePerMinute: number, target: number): number {
  mustFit({
    before: [before, ...SHARE],
    ratePerMinute: [ratePerMinute, ...RATE],
    target: [target, ...SHARE],
  })
  if (before <= target) return 0
  if (ratePerMinute === 0 || target === 0) return Number.POSITIVE_INFINITY
  const ratio = (before * (1 - target)) / (target * (1 - before))
  return Math.ceil(Math.log(ratio) / ratePerMinute - 1e-9)
}

/**
 * Upper bound, one-sided, on how often a minute a fault shows that came `faults` times (whole, 0 to 10,000) in
 * `minutes` under its condition: Garwood (1936). Infinite without a minute.
 */
export function rateBound(faults: number, minutes: number, confidence = 0.95): number {
  mustFit({ minutes: [minutes, ...MINUTES], confidence: [confidence, ...CONFIDENCE] })
  const { high } = poissonInterval(faults, 2 * confidence - 1)
  return minutes === 0 ? Number.POSITIVE_INFINITY : high / minutes
}

/** Whole clean minutes needed before that bound falls to `ratePerMinute` or below: ln(1 / (1 - confidence)) / rate. */
export function cleanMinutesFor(ratePerMinute: number, confidence = 0.95): number {
  mustFit({ ratePerMinute: [ratePerMinute, ...RATE], confidence: [confidence, ...CONFIDENCE] })
  return Math.ceil(-Math.log(1 - confidence) / ratePerMinute - 1e-9)
}

/** Chance of at most `faults` faults in `trials` at a true share (0 to 1); the figure behind the bounds. */
export const chanceOfAtMost = (faults: number, trials: number, share: number): number =>
  binomialCdf(faults, trials, share)
