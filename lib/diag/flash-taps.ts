/**
 * A flash code from taps on the beat of the lamp (rules R11, [A6]). Gaps are told apart by each other, never by
 * fixed milliseconds, as every maker flashes at its own speed and every thumb taps at its own: the longest gaps
 * end a repeat, the middle ones a digit, the shortest stand within a digit. Nothing is guessed: two whole repeats
 * must agree, and what could be read in two ways is answered as both. The factor between kinds of gap is a guess.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'

/** One flash in milliseconds since any start: on, and off where the thumb was held as long as the lamp was lit. */
export type Tap = { onMs: number; offMs: number | null }

/** The pattern as it is typed (`2-4`), how many whole repeats agreed, and whether flashes of two lengths made it. */
export type FlashReading = {
  pattern: string
  repeats: number
  flashes: 'alike' | 'longAndShort'
}

/** What is missing. The groups are those that the longest gaps made, as far as they could be read. */
export type FlashProblem =
  | FigureProblem
  | { kind: 'tooFewTaps'; needed: number }
  | { kind: 'outOfOrder'; tap: number }
  | { kind: 'noPause' }
  | { kind: 'needsSecondRepeat'; groups: string[] }
  | { kind: 'repeatsDiffer'; groups: string[] }
  | { kind: 'twoWays'; readings: string[] }

/** Two kinds of gap, or of flash, differ by this factor or more (guess; taps within 15 of 100 stay under it). */
const APART = 1.6
/** Two repeats of the shortest code of two flashes. */
const FEWEST_TAPS = 4
/** A gap up to twice as long as the flash before it stands within a digit (common practice, no source). */
const WITHIN_DIGIT = 2
/** A pattern as it is kept: up to five digits of 1 to 99. */
const MOST_DIGITS = 5
const MOST_FLASHES = 99

/** The code in the taps, in the order tapped, or what is missing. Times from 0; each flash after the one before. */
export function readTaps(taps: readonly Tap[]): Result<FlashReading, FlashProblem> {
  const problem = tapsProblem(taps)
  if (problem !== null) return fail(problem)
  const held = taps.every((tap) => tap.offMs !== null)
  const gaps = taps
    .slice(1)
    .map((tap, i) => tap.onMs - ((held ? taps[i]?.offMs : taps[i]?.onMs) ?? 0))
  const long = held ? longFlashes(taps) : null
  const cuts = cutsOf(gaps)
  if (cuts.length === 0) return fail({ kind: 'noPause' })
  const threeKinds = pairsOf(cuts)
    .map(([digit, pause]) => matchOf(groupsOf({ gaps, digit, pause, long })))
    .find((match) => match !== null)
  const twoKinds = cuts
    .map((pause) => ({ pause, match: matchOf(groupsOf({ gaps, digit: pause, pause, long })) }))
    .find(({ match }) => match !== null)
  // Flashes of two lengths part the digits by themselves; alike ones need the middle gaps.
  if (long !== null && twoKinds?.match) return ok({ ...twoKinds.match, flashes: 'longAndShort' })
  const flashes = long === null ? 'alike' : 'longAndShort'
  if (threeKinds) return ok({ ...threeKinds, flashes })
  if (twoKinds?.match) {
    const { pattern, repeats } = twoKinds.match
    const readings = readingsOf(pattern, gaps, twoKinds.pause, taps)
    const [only, other] = readings
    if (other !== undefined) return fail({ kind: 'twoWays', readings })
    return ok({ pattern: only ?? pattern, repeats, flashes })
  }
  return fail(unmatched(gaps, cuts, long))
}

/** A gap length between two kinds of gap, and the factor they are apart by. */
type Cut = { ms: number; factor: number }

/** Where sorted gaps jump by the factor or more, widest jump first. */
function cutsOf(lengths: readonly number[]): Cut[] {
  const sorted = lengths.toSorted((a, b) => a - b)
  return sorted
    .slice(1)
    .map((next, i) => {
      const before = Math.max(1, sorted[i] ?? 1)
      return { ms: Math.sqrt(before * Math.max(1, next)), factor: Math.max(1, next) / before }
    })
    .filter(({ factor }) => factor >= APART)
    .sort((a, b) => b.factor - a.factor)
}

/** Every pair of cuts, shorter one first, the pair whose lesser jump is widest first. */
function pairsOf(cuts: readonly Cut[]): [Cut, Cut][] {
  return cuts
    .flatMap((a) => cuts.filter((b) => b.ms > a.ms).map((b): [Cut, Cut] => [a, b]))
    .sort((x, y) => lesser(y) - lesser(x))
}
const lesser = ([a, b]: [Cut, Cut]): number => Math.min(a.factor, b.factor)

/** Which flashes are long ones; null when all are alike. */
function longFlashes(taps: readonly Tap[]): boolean[] | null {
  const lengths = taps.map((tap) => (tap.offMs ?? tap.onMs) - tap.onMs)
  const [cut] = cutsOf(lengths)
  return cut === undefined ? null : lengths.map((ms) => ms > cut.ms)
}

type Grouping = { gaps: readonly number[]; digit: Cut; pause: Cut; long: readonly boolean[] | null }

/** The flashes counted into digits and repeats; a change of flash length begins a digit too. */
function groupsOf({ gaps, digit, pause, long }: Grouping): number[][] {
  const groups: number[][] = [[1]]
  for (const [i, gap] of gaps.entries()) {
    const group = groups.at(-1)
    if (gap > pause.ms || group === undefined) groups.push([1])
    else if (gap > digit.ms || (long !== null && long[i] !== long[i + 1])) group.push(1)
    else group.push((group.pop() ?? 0) + 1)
  }
  return groups
}

/** The pattern of two or more equal groups; only the first and the last group may be cut short. */
function matchOf(groups: readonly number[][]): { pattern: string; repeats: number } | null {
  const texts = groups.map((group) => group.join('-'))
  const pattern = texts.find((text, i) => texts.indexOf(text) < i)
  const digits = groups[texts.indexOf(pattern ?? '')]
  if (pattern === undefined || digits === undefined || !isPattern(digits)) return null
  const [first, last] = [groups[0] ?? [], groups.at(-1) ?? []]
  const whole = texts.slice(1, -1).every((text) => text === pattern)
  const fits = endsLike(first, digits) && endsLike(last.toReversed(), digits.toReversed())
  return whole && fits
    ? { pattern, repeats: texts.filter((text) => text === pattern).length }
    : null
}

const isPattern = (digits: readonly number[]): boolean =>
  digits.length <= MOST_DIGITS && digits.every((digit) => digit <= MOST_FLASHES)

/** True when a group that began late is the end of the pattern, its first digit perhaps cut. */
function endsLike(group: readonly number[], pattern: readonly number[]): boolean {
  const tail = pattern.slice(-group.length)
  return (
    group.length <= pattern.length &&
    group.every((digit, i) => (i === 0 ? digit <= (tail[i] ?? 0) : digit === tail[i]))
  )
}

/**
 * With two kinds of gap only, n flashes between pauses are one digit n, or n digits of 1. Held taps tell by the
 * length of the flash; bare taps cannot, and answer both.
 */
function readingsOf(
  pattern: string,
  gaps: readonly number[],
  pause: Cut,
  taps: readonly Tap[],
): string[] {
  const flashes = Number(pattern)
  if (!Number.isInteger(flashes) || flashes > MOST_DIGITS || flashes < 2) return [pattern]
  const ones = Array(flashes).fill(1).join('-')
  const lit = middleOf(taps.flatMap(({ onMs, offMs }) => (offMs === null ? [] : [offMs - onMs])))
  if (lit === null || taps.some((tap) => tap.offMs === null)) return [pattern, ones]
  const short = middleOf(gaps.filter((gap) => gap <= pause.ms)) ?? 0
  return short <= WITHIN_DIGIT * lit ? [pattern] : [ones]
}

function middleOf(numbers: readonly number[]): number | null {
  return numbers.toSorted((a, b) => a - b)[Math.floor(numbers.length / 2)] ?? null
}

/** With no agreeing repeats: what the longest gaps made of it, and whether a second repeat is all that lacks. */
function unmatched(
  gaps: readonly number[],
  cuts: readonly Cut[],
  long: readonly boolean[] | null,
): FlashProblem {
  const [widest] = cuts
  const [digit, pause] = pairsOf(cuts)[0] ?? [widest, widest]
  if (digit === undefined || pause === undefined) return { kind: 'noPause' }
  const groups = groupsOf({ gaps, digit, pause, long }).map((g) => g.join('-'))
  return { kind: groups.length > 2 ? 'repeatsDiffer' : 'needsSecondRepeat', groups }
}

function tapsProblem(taps: readonly Tap[]): FlashProblem | null {
  for (const [i, { onMs, offMs }] of taps.entries()) {
    const before = taps[i - 1]
    const field = `tap.${i + 1}`
    const problem = unfit({
      [`${field}.onMs`]: [onMs, 0, Number.MAX_SAFE_INTEGER],
      [`${field}.offMs`]: [offMs ?? onMs, 0, Number.MAX_SAFE_INTEGER],
    })
    if (problem !== null) return problem
    const early = before !== undefined && onMs <= (before.offMs ?? before.onMs)
    if (early || (offMs !== null && offMs <= onMs)) return { kind: 'outOfOrder', tap: i + 1 }
  }
  return taps.length < FEWEST_TAPS ? { kind: 'tooFewTaps', needed: FEWEST_TAPS } : null
}
