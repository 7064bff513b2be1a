import type { Heard } from './media-heard'

/**
 * Reads how long an Ogg Opus recording is (RFC 3533, RFC 7845): the granule of the last page counts
 * samples at 48 kHz, less the pre-skip.
 */
const PAGE_HEAD = 27
/** Bytes of the identification header (RFC 7845, 5.1) at least. */
const OPUS_HEAD = 19
const SAMPLES_PER_SECOND = 48_000

type Page = { serial: number; granule: bigint; from: number; to: number }

/** Every page in order; null at the end of a broken file. */
function* pages(file: Buffer): Generator<Page | null> {
  let at = 0
  while (at < file.length) {
    const from = at + PAGE_HEAD + (file[at + PAGE_HEAD - 1] ?? 0)
    const sizes = file.subarray(at + PAGE_HEAD, from)
    const to = from + sizes.reduce((sum, size) => sum + size, 0)
    const isPage = file.toString('latin1', at, at + 4) === 'OggS' && file[at + 4] === 0
    if (!isPage || from > file.length || to > file.length) {
      yield null
      return
    }
    const granule = file.readBigInt64LE(at + 6)
    yield { serial: file.readUInt32LE(at + 14), granule, from, to }
    at = to
  }
}

/** What an Ogg file holds; null when it is none, broken, or not one stream of Opus. */
export function readOgg(file: Buffer): Heard | null {
  let first: Page | null = null
  let last = 0n
  for (const page of pages(file)) {
    if (page === null) return null
    first ??= page
    if (page.serial !== first.serial) return null
    if (page.granule > last) last = page.granule
  }
  if (first === null || first.to - first.from < OPUS_HEAD || last <= 0n) return null
  if (file.toString('latin1', first.from, first.from + 8) !== 'OpusHead') return null
  const preSkip = file.readUInt16LE(first.from + 10)
  const seconds = Math.max(0, Number(last) - preSkip) / SAMPLES_PER_SECOND
  return { seconds, hasPosition: false }
}
