import { MAX_CHUNK_BYTES } from '@/lib/sync/protocol/upload'

/**
 * How much of a photo goes at once (PH3): 32 to 64 kB on a slow line, so that a record waits some ten
 * seconds at most and a cut costs little; up to 1 MB on a good one. Judged by the last chunk alone.
 */
export type Pace = { chunkBytes: number | null }

const LEAST = 32 * 1024
const FIRST = 64 * 1024
/** Below this a line is slow (PH3): 100 kbit/s, in bytes per ms. */
const SLOW = 100_000 / 8 / 1000
/** A chunk should be over within this (64 kB at 50 kbit/s take 10.5 s). */
const TARGET_MS = 10_000
/** A try that failed sooner met no line at all (a choice, as for records). */
const UNDER_WAY_MS = 2_000

/** The next chunk, in bytes; of a line nothing is known of, the first. */
export const chunkOf = (pace: Pace): number => pace.chunkBytes ?? FIRST

/** The next chunk after one of `bytes` took `ms`. */
export function afterChunk(pace: Pace, { bytes, ms }: { bytes: number; ms: number }): number {
  const perMs = bytes / Math.max(1, ms)
  const inTime = Math.round(perMs * TARGET_MS)
  if (perMs < SLOW) return Math.min(FIRST, Math.max(LEAST, inTime))
  return Math.max(FIRST, Math.min(MAX_CHUNK_BYTES, chunkOf(pace) * 2, inTime))
}

/** The next chunk after one was cut: the least, unless the line was never there. */
export const afterCut = (pace: Pace, ms: number): number =>
  ms < UNDER_WAY_MS ? chunkOf(pace) : LEAST
