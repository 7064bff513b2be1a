import { describe, expect, test } from 'vitest'
import { afterChunk, afterCut, chunkOf } from '@/lib/sync/client/photo-pace'

const KB = 1024

describe('how much goes at once', () => {
  const next = (kbits: number, chunkBytes: number) =>
    afterChunk({ chunkBytes }, { bytes: chunkBytes, ms: (chunkBytes * 8) / kbits })

  test('[PH3] 32 to 64 kB below 100 kbit/s, growing to 1 MB on a good line', () => {
    expect(next(20, 64 * KB)).toBe(32 * KB)
    expect(next(50, 64 * KB)).toBeGreaterThan(60_000)
    expect(next(50, 64 * KB)).toBeLessThanOrEqual(64 * KB)
    expect(next(99, 1024 * KB)).toBe(64 * KB)
    expect(next(101, 64 * KB)).toBeGreaterThanOrEqual(64 * KB)
    let chunk = chunkOf({ chunkBytes: null })
    const sizes = Array.from({ length: 6 }, () => {
      chunk = next(20_000, chunk)
      return chunk / KB
    })
    expect(sizes).toEqual([128, 256, 512, 1024, 1024, 1024])
    // A middling line grows no further than ten seconds' worth.
    expect(next(400, 512 * KB)).toBe(500_000)
  })

  test('[PH3] a cut under way shrinks it, a line that was never there does not', () => {
    expect(afterCut({ chunkBytes: 1024 * KB }, 5_000)).toBe(32 * KB)
    expect(afterCut({ chunkBytes: 1024 * KB }, 20)).toBe(1024 * KB)
  })
})
