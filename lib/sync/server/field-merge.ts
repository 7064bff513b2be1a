import canonicalize from 'canonicalize'
import type { FieldWrite } from '@/db/queries/field-history'
import type { Id } from '@/lib/model/id'
import { SAFETY_FIELDS } from '@/lib/model/setting'
import { hlcAt, hlcMs, nextHlc } from '@/lib/sync/protocol/hlc'

/**
 * Which of several values of one field stands (M1 to M5): the last writer by hybrid clock and device, and
 * whoever had seen a value comes after it whatever the clocks say. The same writes leave the same value and
 * the same losers in whatever order they arrive. A stamp of the future is put back for order only.
 */
/** A write as it arrives. `base`: the change number the writer had seen of the row. */
export type NewWrite = {
  id: Id
  value: unknown
  hlc: string
  base: number | null
  /** Whether the writer had the row at all: what it was first written with is known then. */
  hasRow: boolean
  /** Null, with its number, for the desk: it always has the row as it stands. */
  deviceId: Id | null
  dseq: number | null
  personId: Id
}

/** When it arrived: the shop's clock (ms) and the shop's last change number. */
export type Arrival = { nowMs: number; seq: number }

/** `changed`: the writes whose state changed, the new one among them. `loser`: what did not stand, if anything. */
export type Merged = { changed: FieldWrite[]; stands: boolean; loser: FieldWrite | null }

/** A stamp further ahead of the shop's clock than this is put back (sync.md 3.4). */
const AHEAD_MS = 60_000

/** Puts a write among those of its field. `held`: every write of the field, in no order. */
export function mergeWrite(
  held: readonly FieldWrite[],
  write: NewWrite,
  { field, at }: { field: string; at: Arrival },
): Merged {
  const seen = held.filter((other) => hadSeen(write, other))
  const isLate = held.some((other) => isLaterOfSame(other, write))
  const next = stamped(write, seen, at)
  const current = held.find((other) => other.state === 'current')
  const replaced = seen
    .filter((other) => other.state === 'current' || isGivenUp(other, write, field))
    .map((other) => ({ ...other, state: 'replaced' as const }))
  if (current === undefined || (!isLate && isAfter(next, current))) {
    const changed = [...replaced, next]
    if (current === undefined || seen.includes(current)) {
      return { changed, stands: true, loser: null }
    }
    const loser = beaten(current, next, at)
    return { changed: [...changed, loser], stands: true, loser: lost(loser) }
  }
  const loser: FieldWrite = isLate ? { ...next, state: 'replaced' } : beaten(next, current, at)
  return { changed: [...replaced, loser], stands: false, loser: lost(loser) }
}

const lost = (write: FieldWrite) => (write.state === 'lost' ? write : null)

/** A value that did not stand; the same value twice is no loss, nor is a field left empty at first. */
function beaten(write: FieldWrite, by: FieldWrite, { seq }: Arrival): FieldWrite {
  const isSame = canonicalize(write.value) === canonicalize(by.value)
  const isEmpty = write.claimedHlc === null && write.value === null
  return isSame || isEmpty
    ? { ...write, state: 'replaced' }
    : { ...write, state: 'lost', lostAfter: write.lostAfter ?? seq }
}

/** True when the writer knew that value: the first, its own device's earlier one, or one in the row it had. */
export function hadSeen(
  write: Pick<NewWrite, 'deviceId' | 'dseq' | 'base' | 'hasRow'>,
  other: FieldWrite,
): boolean {
  if (other.claimedHlc === null && write.hasRow) return true
  if (isOfSame(other, write)) return (other.dseq ?? 0) < (write.dseq ?? 0)
  return write.base !== null && write.base > other.afterSeq
}

const isOfSame = (other: FieldWrite, { deviceId }: Pick<NewWrite, 'deviceId'>) =>
  deviceId !== null && other.deviceId === deviceId

/** An op that was held up: its own device has written since. */
const isLaterOfSame = (other: FieldWrite, write: NewWrite) =>
  isOfSame(other, write) && (other.dseq ?? 0) > (write.dseq ?? 0)

/**
 * A value that did not stand is given up by a writer who knew it. Where a life may hang on the field it
 * stays on show, unless the writer gave up a value of its own, or had seen it while it still stood (M4).
 */
function isGivenUp(other: FieldWrite, write: NewWrite, field: string): boolean {
  if (other.state !== 'lost') return false
  if (!SAFETY_FIELDS.has(field) || isOfSame(other, write)) return true
  return write.base !== null && other.lostAfter !== null && write.base <= other.lostAfter
}

/** The write with the stamp it counts by: not of the future, and after everything its writer had seen. */
export function stamped(
  write: NewWrite,
  seen: readonly FieldWrite[],
  { nowMs, seq }: Arrival,
): FieldWrite {
  const limit = hlcAt(nowMs + AHEAD_MS)
  const isAhead = write.hlc > limit
  const own = isAhead ? limit : write.hlc
  const last =
    seen
      .map((other) => other.orderedHlc)
      .sort()
      .at(-1) ?? ''
  const isBehind = last !== '' && hlcMs(own) + AHEAD_MS < hlcMs(last)
  const receivedAt = new Date(nowMs).toISOString()
  return {
    id: write.id,
    value: write.value,
    claimedHlc: write.hlc,
    orderedHlc: last !== '' && own <= last ? nextHlc(last, 0) : own,
    clockOdd: isAhead || isBehind,
    deviceId: write.deviceId,
    dseq: write.dseq,
    personId: write.personId,
    writtenAt: isAhead ? receivedAt : new Date(hlcMs(write.hlc)).toISOString(),
    receivedAt,
    afterSeq: seq,
    state: 'current',
    lostAfter: null,
    isLookedAt: false,
  }
}

/** By stamp, then by device, then by the device's own number. */
function isAfter(left: FieldWrite, right: FieldWrite): boolean {
  if (left.orderedHlc !== right.orderedHlc) return left.orderedHlc > right.orderedHlc
  const [one, other] = [left.deviceId ?? '', right.deviceId ?? '']
  if (one !== other) return one > other
  return (left.dseq ?? 0) > (right.dseq ?? 0)
}
