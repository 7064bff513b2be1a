// The work that every arm does: records of 297 B from one person's trip, invented. Both kinds of notes
// fill a record to the same length: `phrases` is what people write in fact (a sentence of the trade and a
// figure), `random` is words drawn at random, the worst that a note can do to a packer.
import { v7 } from 'uuid'

export const RECORD_BYTES = 297
export const NOTE_KINDS = ['phrases', 'random'] as const
export type NoteKind = (typeof NOTE_KINDS)[number]

/** One record as the peers store it; our entry holds the same and more. */
export type BenchRecord = {
  id: string
  jobId: string
  happenedAt: string
  authorId: string
  body: { kind: 'note'; words: string }
}

/** A source of even figures in [0, 1) from a seed (mulberry32), so that a run can be had again. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32
  }
}

/** A UUIDv7 of that time, its random part from the source. */
export function idAt(ms: number, share: () => number): string {
  const random = Uint8Array.from({ length: 16 }, () => Math.floor(share() * 256))
  return v7({ msecs: Math.floor(ms), random, seq: Math.floor(share() * 2 ** 31) })
}

/**
 * `count` records of one person in one job, some 20 s to 10 min apart, the last one just before `untilMs`.
 */
export function makeRecords(of: {
  count: number
  kind: NoteKind
  seed: number
  untilMs: number
  jobId: string
  authorId: string
}): BenchRecord[] {
  const share = seeded(of.seed)
  const gaps = Array.from({ length: of.count }, () => 20_000 + Math.floor(share() * 580_000))
  let ms = of.untilMs - gaps.reduce((sum, gap) => sum + gap, 0)
  const words = of.kind === 'phrases' ? phrase : randomWords
  return gaps.map((gap) => {
    const record: BenchRecord = {
      id: idAt(ms, share),
      jobId: of.jobId,
      happenedAt: new Date(ms).toISOString(),
      authorId: of.authorId,
      body: { kind: 'note', words: '' },
    }
    record.body.words = words(share, RECORD_BYTES - JSON.stringify(record).length)
    ms += gap
    return record
  })
}

const pick = <T>(list: readonly T[], share: () => number): T =>
  list[Math.floor(share() * list.length)] as T

const PARTS = ['Plug cap', 'Pump relay', 'Coil plug', 'Ground strap', 'Stator plug', 'Fuel line']
const STATES = ['dry and tight', 'corroded, cleaned', 'loose, pushed home', 'wet, blown dry']
const TAILS = [
  'tried again and it runs a moment, then dies as before',
  'held at idle with the lamp on, same as it was before',
  'no change that I can hear, will look at it once more',
]

/** One of 72 sentences, a figure, and full stops to the length. */
function phrase(share: () => number, length: number): string {
  const figure = `${Math.floor(share() * 60)} s`
  const sentence = `${pick(PARTS, share)} ${pick(STATES, share)}, ${pick(TAILS, share)}`
  return `${sentence.slice(0, length - figure.length - 1)} ${figure}`.padEnd(length, '.')
}

const CONSONANTS = 'bdfghklmnprstv'
const VOWELS = 'aeiou'

/** 2,048 made-up words of two to four syllables. */
const VOCABULARY = (() => {
  const share = seeded(2048)
  return Array.from({ length: 2048 }, () =>
    Array.from(
      { length: 2 + Math.floor(share() * 3) },
      () => `${pick([...CONSONANTS], share)}${pick([...VOWELS], share)}`,
    ).join(''),
  )
})()

function randomWords(share: () => number, length: number): string {
  let text = pick(VOCABULARY, share)
  while (text.length < length) text += ` ${pick(VOCABULARY, share)}`
  return text.slice(0, length)
}
