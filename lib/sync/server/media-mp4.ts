import type { Heard } from './media-heard'

/**
 * Reads how long an MP4 recording is (ISO/IEC 14496-12): from `mvhd`, or, where a recorder wrote it in
 * fragments, from the sample durations of every `trun`. One track of sound and no other; the boxes that
 * can tell a place (`loci` of 3GPP TS 26.244, and the widespread user data box `(C)xyz`, from memory)
 * are looked for.
 */
const CONTAINERS = new Set(['moov', 'trak', 'mdia', 'mvex', 'moof', 'traf', 'udta'])
const PLACES = new Set(['loci', '\u00a9xyz'])
const MOST_DEPTH = 8

type Seen = {
  isMp4: boolean
  handlers: string[]
  movieSeconds: number
  timescale: number
  defaultDuration: number
  fragmentDefault: number
  fragmentUnits: number
  hasPosition: boolean
}

/** What an MP4 file holds; null when it is none, broken, or holds more than one track of sound. */
export function readMp4(file: Buffer): Heard | null {
  const seen: Seen = {
    isMp4: file.toString('latin1', 4, 8) === 'ftyp',
    handlers: [],
    movieSeconds: 0,
    timescale: 0,
    defaultDuration: 0,
    fragmentDefault: 0,
    fragmentUnits: 0,
    hasPosition: false,
  }
  try {
    if (!seen.isMp4 || !walk(file, { from: 0, to: file.length, depth: 0 }, seen)) return null
  } catch (cause) {
    // A box that says it is longer than it is.
    if (cause instanceof RangeError) return null
    throw cause
  }
  if (seen.handlers.length !== 1 || seen.handlers[0] !== 'soun') return null
  const fragments = seen.timescale > 0 ? seen.fragmentUnits / seen.timescale : 0
  const seconds = Math.max(seen.movieSeconds, fragments)
  return seconds > 0 ? { seconds, hasPosition: seen.hasPosition } : null
}

type Span = { from: number; to: number; depth: number }

/** Reads every box of the span; false when one reaches beyond it. */
function walk(file: Buffer, span: Span, seen: Seen): boolean {
  if (span.depth > MOST_DEPTH) return false
  let at = span.from
  while (at + 8 <= span.to) {
    const name = file.toString('latin1', at + 4, at + 8)
    const { from, to } = extent(file, at, span.to)
    if (to < from || to > span.to) return false
    if (PLACES.has(name)) seen.hasPosition = true
    if (!CONTAINERS.has(name)) readBox(file, { name, from }, seen)
    else if (!walk(file, { from, to, depth: span.depth + 1 }, seen)) return false
    at = to
  }
  return at === span.to || span.depth > 0
}

/** Where a box's contents begin and end: size 1 stands for 64 bits after the name, 0 for up to the end. */
function extent(file: Buffer, at: number, end: number): { from: number; to: number } {
  const size = file.readUInt32BE(at)
  if (size === 1) return { from: at + 16, to: at + Number(file.readBigUInt64BE(at + 8)) }
  return { from: at + 8, to: size === 0 ? end : at + size }
}

function readBox(file: Buffer, { name, from }: { name: string; from: number }, seen: Seen): void {
  const isLong = file[from] === 1
  switch (name) {
    case 'hdlr':
      seen.handlers.push(file.toString('latin1', from + 8, from + 12))
      break
    case 'mvhd': {
      const scale = file.readUInt32BE(from + (isLong ? 20 : 12))
      const units = isLong ? Number(file.readBigUInt64BE(from + 24)) : file.readUInt32BE(from + 16)
      // All ones: not known when it was written.
      const isKnown = units !== 0xffffffff && units < 2 ** 63
      if (scale > 0 && isKnown) seen.movieSeconds = units / scale
      break
    }
    case 'mdhd':
      seen.timescale = file.readUInt32BE(from + (isLong ? 20 : 12))
      break
    case 'trex':
      seen.defaultDuration = file.readUInt32BE(from + 12)
      break
    case 'tfhd':
      seen.fragmentDefault = defaultOf(file, from) ?? seen.defaultDuration
      break
    case 'trun':
      seen.fragmentUnits += unitsOf(file, from, seen.fragmentDefault)
      break
    default:
  }
}

/** `default_sample_duration` of a `tfhd`, when its flags say that it is there. */
function defaultOf(file: Buffer, from: number): number | null {
  const flags = file.readUInt32BE(from) & 0xffffff
  if ((flags & 0x8) === 0) return null
  const before = (flags & 0x1 ? 8 : 0) + (flags & 0x2 ? 4 : 0)
  return file.readUInt32BE(from + 8 + before)
}

/** Sum of the sample durations of a `trun`, in the track's time scale. */
function unitsOf(file: Buffer, from: number, byDefault: number): number {
  const flags = file.readUInt32BE(from) & 0xffffff
  const count = file.readUInt32BE(from + 4)
  if ((flags & 0x100) === 0) return count * byDefault
  const each = [0x100, 0x200, 0x400, 0x800].filter((bit) => flags & bit).length * 4
  let at = from + 8 + (flags & 0x1 ? 4 : 0) + (flags & 0x4 ? 4 : 0)
  let units = 0
  for (let sample = 0; sample < count; sample++) {
    units += file.readUInt32BE(at)
    at += each
  }
  return units
}
