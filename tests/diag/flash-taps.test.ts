import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readTaps, type Tap } from '@/lib/diag/flash-taps'

/** Taps of a pattern: gaps within a digit, between digits and between repeats in ms, from flash to flash. */
type Beat = { within: number; digit: number; pause: number }
const SLOW: Beat = { within: 800, digit: 2000, pause: 5000 }

/** `jitter` moves the i-th gap by a share of it. */
function tapsOf(
  digits: readonly number[],
  repeats: number,
  beat: Beat,
  jitter: (i: number) => number = () => 0,
): Tap[] {
  const gaps: number[] = []
  for (let r = 0; r < repeats; r++)
    for (const [d, count] of digits.entries()) {
      for (let i = 1; i < count; i++) gaps.push(beat.within)
      gaps.push(d === digits.length - 1 ? beat.pause : beat.digit)
    }
  let at = 0
  const taps: Tap[] = [{ onMs: 0, offMs: null }]
  for (const [i, gap] of gaps.slice(0, -1).entries()) {
    at += gap * (1 + jitter(i))
    taps.push({ onMs: at, offMs: null })
  }
  return taps
}
const hold = (taps: Tap[], ms: number): Tap[] =>
  taps.map((tap) => ({ ...tap, offMs: tap.onMs + ms }))

describe('[R11] a flash code from taps', () => {
  it('[A6] 2-4 tapped through two repeats is 2-4', () => {
    expect(readTaps(tapsOf([2, 4], 2, SLOW))).toEqual({
      ok: true,
      value: { pattern: '2-4', repeats: 2, flashes: 'alike' },
    })
  })
  it('[A6] any pattern of two or three digits, at any speed, by a thumb 15 of 100 off, is read as it was', () => {
    const some = fc.record({
      digits: fc
        .array(fc.integer({ min: 1, max: 9 }), { minLength: 2, maxLength: 3 })
        .filter((d) => d.some((n) => n > 1)),
      repeats: fc.integer({ min: 2, max: 4 }),
      within: fc.integer({ min: 150, max: 1500 }),
      digit: fc.double({ min: 2.4, max: 4, noNaN: true }),
      pause: fc.double({ min: 2.4, max: 4, noNaN: true }),
      jitter: fc.array(fc.double({ min: -0.15, max: 0.15, noNaN: true }), {
        minLength: 120,
        maxLength: 120,
      }),
    })
    fc.assert(
      fc.property(some, ({ digits, repeats, within, digit, pause, jitter }) => {
        const beat = { within, digit: within * digit, pause: within * digit * pause }
        const got = readTaps(tapsOf(digits, repeats, beat, (i) => jitter[i] ?? 0))
        expect(got).toEqual({
          ok: true,
          value: { pattern: digits.join('-'), repeats, flashes: 'alike' },
        })
      }),
      { seed: 31, numRuns: 800 },
    )
  })
  it('[A6] a slower lamp changes nothing: every time ten times as long is the same answer', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 50, max: 3000 }), { minLength: 3, maxLength: 20 }),
        (gaps) => {
          const at = (scale: number) => {
            let ms = 0
            return [0, ...gaps.map((gap) => (ms += gap * scale))].map((onMs) => ({
              onMs,
              offMs: null,
            }))
          }
          expect(readTaps(at(10))).toEqual(readTaps(at(1)))
        },
      ),
      { seed: 32 },
    )
  })
  it('[A6] begun in the middle and left before the end, the whole repeats between still tell', () => {
    const taps = tapsOf([3, 2], 4, SLOW)
    expect(readTaps(taps.slice(2, -1))).toEqual({
      ok: true,
      value: { pattern: '3-2', repeats: 2, flashes: 'alike' },
    })
  })
  it('[A6] one repeat is not enough, and it says so with what it saw', () => {
    expect(readTaps(tapsOf([2, 4], 1, SLOW))).toEqual({
      ok: false,
      problem: { kind: 'needsSecondRepeat', groups: ['2', '4'] },
    })
  })
  it('[A6] repeats that differ are refused, each as it was seen', () => {
    const odd = tapsOf([2, 4, 2, 3, 2, 5], 1, SLOW).map((tap) => {
      // Digits of one long code, with a pause put in after every second one.
      const late = (tap.onMs > 5_500 ? 3000 : 0) + (tap.onMs > 12_000 ? 3000 : 0)
      return { ...tap, onMs: tap.onMs + late }
    })
    expect(readTaps(odd)).toMatchObject({
      ok: false,
      problem: { kind: 'repeatsDiffer', groups: ['2-4', '2-3', '2-5'] },
    })
  })
  it('[A6] n flashes and a pause are n or n ones: bare taps answer both, held ones tell by the flash', () => {
    const bare = tapsOf([2], 3, SLOW)
    expect(readTaps(bare)).toEqual({
      ok: false,
      problem: { kind: 'twoWays', readings: ['2', '1-1'] },
    })
    expect(readTaps(hold(bare, 400))).toMatchObject({ ok: true, value: { pattern: '2' } })
    const ones = tapsOf([1, 1], 3, SLOW)
    expect(readTaps(hold(ones, 400))).toMatchObject({ ok: true, value: { pattern: '1-1' } })
    expect(readTaps(tapsOf([7], 2, SLOW))).toMatchObject({ ok: true, value: { pattern: '7' } })
  })
  it('[A6] long and short flashes part the digits where the gaps do not', () => {
    const lit = [1000, 1000, 300, 300, 300]
    const dark = [500, 500, 500, 500, 3500]
    let onMs = 0
    const taps = [...lit, ...lit].map((ms, i) => {
      const tap = { onMs, offMs: onMs + ms }
      onMs += ms + (dark[i % 5] ?? 0)
      return tap
    })
    expect(readTaps(taps)).toEqual({
      ok: true,
      value: { pattern: '2-3', repeats: 2, flashes: 'longAndShort' },
    })
  })
  it('[A6] steady blinking has no pause; too few, out of order and impossible taps are named', () => {
    const steady = [0, 500, 1000, 1500, 2000].map((onMs) => ({ onMs, offMs: null }))
    expect(readTaps(steady)).toEqual({ ok: false, problem: { kind: 'noPause' } })
    expect(readTaps(steady.slice(0, 3))).toMatchObject({
      problem: { kind: 'tooFewTaps', needed: 4 },
    })
    expect(readTaps([])).toMatchObject({ problem: { kind: 'tooFewTaps' } })
    expect(readTaps([...steady, { onMs: 100, offMs: null }])).toMatchObject({
      problem: { kind: 'outOfOrder', tap: 6 },
    })
    expect(readTaps([{ onMs: 5, offMs: 5 }])).toMatchObject({
      problem: { kind: 'outOfOrder', tap: 1 },
    })
    expect(readTaps([{ onMs: Number.NaN, offMs: null }])).toMatchObject({
      problem: { kind: 'notANumber', field: 'tap.1.onMs' },
    })
  })
})
