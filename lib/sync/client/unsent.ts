import type { Id } from '@/lib/model/id'
import type { Op } from '@/lib/sync/protocol/op'
import type { OutboxRecord, PhotoRecord } from './phone-db'
import type { UnsentItem, UnsentView } from './views'

/** Before anything is known. */
export const NOTHING_UNSENT: UnsentView = {
  counted: false,
  count: 0,
  bytes: 0,
  oldestAt: null,
  items: [],
  stuckCount: 0,
  sending: null,
  online: false,
  storageKept: null,
  quotaShare: null,
  needs: null,
  fetchedAt: null,
  setAside: 0,
  draftsKept: true,
}

/** Why the shop will not take something; it is kept all the same (P16). */
const REFUSALS: Readonly<Record<string, string>> = {
  invalid: 'The shop cannot read this record as it is.',
  too_big: 'This record is too big to send.',
  unknown_kind:
    'The shop does not know this kind of record. Its server may be older than this app.',
  id_reuse: 'The shop already has something else under this number.',
  no_parent: 'The shop does not have what this record belongs to.',
  forbidden: 'Your roles in this shop do not allow this.',
  stale_status: 'The shop has moved this on in the meantime.',
  not_yours: 'The shop has this under another person or phone.',
  wrongPicture: 'The shop cannot read this picture.',
  hasPosition: 'The picture still says where it was taken, so the shop refuses it.',
}
const REFUSED = 'The shop refused this record.'
const BLOCKED = 'Waits for a record before it that the shop does not have.'

/** What a record is: a line of the log itself, else a few plain words. */
function whatOf(op: Op): UnsentItem['what'] {
  switch (op.kind) {
    case 'machine.add':
      return 'Machine'
    case 'job.open':
      return 'New job'
    case 'job.move':
      return 'Job state'
    case 'job.people':
      return 'Where the people are'
    case 'job.machine':
      return 'How the machine stands'
    case 'log.add':
      return op.fields.body
    case 'partRequest.ask':
      return 'Part request'
    case 'advice.keep':
      return 'Advice followed or not'
  }
}

const instantOf = (ms: number) => new Date(ms).toISOString()

/** An unsent record as the screen lists it. `sending` while the sender runs. */
export function opItem(record: OutboxRecord, op: Op, sending: boolean): UnsentItem {
  const moving = sending && record.state === 'waiting'
  return {
    key: record.opId,
    opId: record.opId,
    hash: null,
    kind: record.kind,
    jobId: record.jobId,
    what: whatOf(op),
    bytes: record.bytes,
    since: instantOf(record.since),
    state: moving ? 'sending' : stateOf(record.state),
    reason: reasonOf(record),
  }
}

const stateOf = (state: OutboxRecord['state']): UnsentItem['state'] =>
  state === 'stuck' || state === 'blocked' ? state : 'waiting'

function reasonOf(record: Pick<OutboxRecord, 'state' | 'reason' | 'detail'>): string | null {
  if (record.state === 'blocked') return BLOCKED
  if (record.state !== 'stuck') return null
  const words = REFUSALS[record.reason ?? ''] ?? REFUSED
  return record.reason === 'stale_status' && record.detail !== null
    ? `${words} It now stands at: ${stateWords(record.detail)}.`
    : words
}

/** `waitingParts` as words. */
const stateWords = (state: string) => state.replace(/[A-Z]/g, (big) => ` ${big.toLowerCase()}`)

/** An unsent photo as the screen lists it. */
export function photoItem(photo: PhotoRecord, sending: boolean): UnsentItem {
  const stuck = photo.state === 'stuck'
  return {
    key: photo.hash,
    opId: null,
    hash: photo.hash,
    kind: 'photoBytes',
    jobId: photo.jobId,
    what: 'Photo',
    bytes: photo.size,
    since: instantOf(photo.since),
    state: stuck ? 'stuck' : sending ? 'sending' : 'waiting',
    reason: stuck ? (REFUSALS[photo.reason ?? ''] ?? REFUSED) : null,
  }
}

/** The sums over the items. */
export function summed(
  items: UnsentItem[],
): Pick<UnsentView, 'count' | 'bytes' | 'oldestAt' | 'items' | 'stuckCount'> {
  const since = items.map((item) => item.since).sort()
  return {
    count: items.length,
    bytes: items.reduce((sum, item) => sum + item.bytes, 0),
    oldestAt: since[0] ?? null,
    items,
    stuckCount: items.filter((item) => item.state === 'stuck').length,
  }
}

/** Ids of entities with a record the shop does not have yet. */
export const unsentIds = (records: readonly OutboxRecord[]): Map<Id, number> =>
  new Map(
    records
      .filter((record) => record.state !== 'taken' && record.state !== 'done')
      .map((record) => [record.entityId, record.dseq]),
  )
