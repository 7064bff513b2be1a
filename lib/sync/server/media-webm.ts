import type { Heard } from './media-heard'

/**
 * Reads how long a WebM recording is (EBML: RFC 8794; Matroska: RFC 9559). A browser's recorder writes
 * clusters of unknown size and no duration, so the time stamps of the blocks are read.
 */
const EBML = 0x1a45dfa3
const SEGMENT = 0x18538067
const CLUSTER = 0x1f43b675
const TRACKS = 0x1654ae6b
const TRACK_ENTRY = 0xae
const INFO = 0x1549a966
const BLOCK_GROUP = 0xa0
/** Entered instead of skipped; all of them may be of unknown size in a stream. */
const MASTERS = new Set([EBML, SEGMENT, CLUSTER, TRACKS, TRACK_ENTRY, INFO, BLOCK_GROUP])

const DOC_TYPE = 0x4282
const TIMESTAMP_SCALE = 0x2ad7b1
const TRACK_TYPE = 0x83
const CLUSTER_TIME = 0xe7
const SIMPLE_BLOCK = 0xa3
const BLOCK = 0xa1
const AUDIO = 2
const DEFAULT_SCALE_NS = 1_000_000

/** A variable-size integer at `at`; `keepMark` leaves the length bit in, as ids are written. */
function vint(
  file: Buffer,
  at: number,
  keepMark: boolean,
): { value: number; length: number } | null {
  const first = file[at]
  if (first === undefined || first === 0) return null
  const length = Math.clz32(first) - 23
  if (length > 8 || at + length > file.length) return null
  let value = keepMark ? first : first & (0xff >> length)
  let isUnknown = (first & (0xff >> length)) === 0xff >> length
  for (let i = 1; i < length; i++) {
    const byte = file[at + i] ?? 0
    if (byte !== 0xff) isUnknown = false
    value = value * 256 + byte
  }
  return { value: !keepMark && isUnknown ? Number.POSITIVE_INFINITY : value, length }
}

function unsigned(file: Buffer, from: number, to: number): number {
  let value = 0
  for (let at = from; at < to; at++) value = value * 256 + (file[at] ?? 0)
  return value
}

type Element = { id: number; from: number; to: number }

/** Every element that is no container, in order; null at the end of a broken file. */
function* elements(file: Buffer): Generator<Element | null> {
  let at = 0
  while (at < file.length) {
    const id = vint(file, at, true)
    const size = id && vint(file, at + id.length, false)
    if (!(id && size)) {
      yield null
      return
    }
    const from = at + id.length + size.length
    const to = MASTERS.has(id.value) ? from : from + size.value
    if (to > file.length) {
      yield null
      return
    }
    if (to > from) yield { id: id.value, from, to }
    at = to
  }
}

type Seen = { docType: string; scaleNs: number; cluster: number; last: number; tracks: number[] }

/** What a WebM file holds; null when it is none, broken, or holds more than one track of sound. */
export function readWebm(file: Buffer): Heard | null {
  const seen: Seen = { docType: '', scaleNs: DEFAULT_SCALE_NS, cluster: 0, last: -1, tracks: [] }
  for (const element of elements(file)) {
    if (element === null || !readElement(file, element, seen)) return null
  }
  const isVoice = seen.tracks.length === 1 && seen.tracks[0] === AUDIO
  if (seen.docType !== 'webm' || !isVoice || seen.last < 0) return null
  return { seconds: (seen.last * seen.scaleNs) / 1e9, hasPosition: false }
}

function readElement(file: Buffer, { id, from, to }: Element, seen: Seen): boolean {
  switch (id) {
    case DOC_TYPE:
      seen.docType = file.toString('latin1', from, to)
      return true
    case TIMESTAMP_SCALE:
      seen.scaleNs = unsigned(file, from, to)
      return true
    case TRACK_TYPE:
      seen.tracks.push(unsigned(file, from, to))
      return true
    case CLUSTER_TIME:
      seen.cluster = unsigned(file, from, to)
      return true
    case SIMPLE_BLOCK:
    case BLOCK: {
      const track = vint(file, from, false)
      if (!track || from + track.length + 2 > to) return false
      seen.last = Math.max(seen.last, seen.cluster + file.readInt16BE(from + track.length))
      return true
    }
    default:
      return true
  }
}
