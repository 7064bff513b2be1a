// The one clock and the one source of ids of a run: no wall clock and no chance in them.
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'

/** When every run begins. */
const START_MS = Date.UTC(2026, 10, 24, 6, 0)

export type Truth = {
  now(): number
  pass(ms: number): void
  /** The next id of that maker: a UUIDv7 whose random part is counted. */
  id(maker: number): string
}

/** `salt` keeps the ids of two runs of one seed in one process apart; it changes nothing else. */
export function newTruth(seed: number, salt = 0): Truth {
  let nowMs = START_MS
  let count = 0
  const tail = (salt * 0x100000 + seed).toString(16).padStart(8, '0').slice(-8)
  return {
    now: () => nowMs,
    pass: (ms) => {
      nowMs += ms
    },
    id: (maker) => {
      count += 1
      const ms = nowMs.toString(16).padStart(12, '0')
      const number = count.toString(16).padStart(6, '0')
      const low = (0x8000 + (maker & 0xfff)).toString(16)
      const high = `7${number.slice(0, 3)}`
      return `${ms.slice(0, 8)}-${ms.slice(8)}-${high}-${low}-${number.slice(3)}0${tail}`
    },
  }
}

/** The shop's side reads its clock and makes its ids from this run. Only one run at a time. */
export function takeOverShopPorts(truth: Truth): void {
  systemClock.now = () => truth.now()
  uuidv7.next = () => truth.id(0)
  uuidv7.share = () => 0.5
}
