import type { Id } from '@/lib/model/id'
import type { JobSetting, MachineSetting } from '@/lib/model/setting'
import type { Op, OpKind } from '@/lib/sync/protocol/op'
import { wordsOf } from './op-words'
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
  stalled: null,
  letGoCount: 0,
  filesLetGo: 0,
  storageKept: null,
  quotaShare: null,
  freeBytes: null,
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
  tooManyPixels: 'The picture has more pixels than the shop opens.',
  wrongVoice: 'The shop cannot read this voice note.',
  hasPosition: 'The file still says where it was made, so the shop refuses it.',
  entryLetGo: 'Its entry in the log was let go, so the shop does not ask for it.',
  bytesGone: 'The shop has lost this file, and the phone no longer holds the whole of it.',
}
const REFUSED = 'The shop refused this record.'

/** The sentence for a refusal's code. */
export const refusalWords = (code: string | null): string => REFUSALS[code ?? ''] ?? REFUSED

const BLOCKED = 'Waits for a record before it that the shop does not have.'

const JOB_FIELD_TITLES: Readonly<Record<JobSetting['field'], string>> = {
  complaintWords: 'Complaint',
  place: 'Place',
  airTempC: 'Air temperature',
  weather: 'Weather',
}
const MACHINE_FIELD_TITLES: Readonly<Record<MachineSetting['field'], string>> = {
  hours: 'Engine hours',
  unitNumber: 'Unit number',
  serial: 'Serial number',
  year: 'Year of the machine',
}

/** Kinds that are called by what they are about have no name of their own here. */
const OP_TITLES: Readonly<Record<Exclude<OpKind, 'log.add' | 'job.set' | 'machine.set'>, string>> =
  {
    'machine.add': 'Machine',
    'job.open': 'New job',
    'job.move': 'Job state',
    'job.people': 'Where the people are',
    'job.machine': 'How the machine stands',
    'partRequest.ask': 'Part request',
    'advice.keep': 'Advice followed or not',
    'job.settle': 'Looked at what else was entered',
    'machine.settle': 'Looked at what else was entered',
    'partLine.add': 'One more part line',
    'partLine.cancel': 'Part line cancelled',
    'partLine.quantity': 'Quantity of a part line',
    'partRequest.drop': 'Part request taken back',
    'machine.drop': 'Machine taken back',
    'book.heard': 'Withdrawal acknowledged',
  }

/** What a kind of record is called; undefined for one this version does not know. */
export function opTitle(kind: string): string | undefined {
  if (kind === 'log.add') return 'Line of the job log'
  if (kind === 'job.set') return 'Value of a job'
  if (kind === 'machine.set') return 'Value of a machine'
  return Object.hasOwn(OP_TITLES, kind) ? OP_TITLES[kind as keyof typeof OP_TITLES] : undefined
}

/** What a record is: a line of the log itself, else a few plain words. */
function whatOf(op: Op): UnsentItem['what'] {
  switch (op.kind) {
    case 'log.add':
      return op.fields.body
    case 'job.set':
      return JOB_FIELD_TITLES[op.fields.field]
    case 'machine.set':
      return MACHINE_FIELD_TITLES[op.fields.field]
    default:
      return OP_TITLES[op.kind]
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
    bytesDone: 0,
    since: instantOf(record.since),
    state: moving ? 'sending' : stateOf(record.state),
    reason: reasonOf(record),
    waitsFor: null,
    code: record.state === 'stuck' ? record.reason : null,
    words: wordsOf(op),
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
export const stateWords = (state: string) =>
  state.replace(/[A-Z]/g, (big) => ` ${big.toLowerCase()}`)

/** An unsent photo or voice note as the screen lists it. */
export function photoItem(photo: PhotoRecord, sending: boolean): UnsentItem {
  const stuck = photo.state === 'stuck'
  return {
    key: photo.hash,
    opId: null,
    hash: photo.hash,
    kind: 'photoBytes',
    jobId: photo.jobId,
    what: photo.mime.startsWith('audio/') ? 'Voice note' : 'Photo',
    bytes: photo.size,
    bytesDone: photo.uploaded ?? 0,
    since: instantOf(photo.since),
    state: stuck ? 'stuck' : sending ? 'sending' : 'waiting',
    waitsFor: null,
    reason: stuck ? (REFUSALS[photo.reason ?? ''] ?? REFUSED) : null,
    code: stuck ? photo.reason : null,
    words: null,
  }
}

/** The sums over the items. */
export function summed(
  items: UnsentItem[],
): Pick<UnsentView, 'count' | 'bytes' | 'oldestAt' | 'items' | 'stuckCount'> {
  const since = items.map((item) => item.since).sort()
  return {
    count: items.length,
    bytes: items.reduce((sum, item) => sum + item.bytes - item.bytesDone, 0),
    oldestAt: since[0] ?? null,
    items,
    stuckCount: items.filter((item) => item.state === 'stuck').length,
  }
}

/** Blocked items say on what they wait: the record that is to land first, and that it is stuck when it is. */
export function withWaits(
  items: readonly UnsentItem[],
  records: readonly { record: OutboxRecord; op: Op }[],
): UnsentItem[] {
  return items.map((item, at) => {
    const mine = records[at]?.record
    if (item.state !== 'blocked' || mine === undefined) return item
    const first = records.find(
      ({ record }) =>
        record.dseq !== mine.dseq &&
        (record.opId === mine.reason || record.entityId === mine.reason),
    )
    if (first === undefined) return item
    return {
      ...item,
      waitsFor: { what: whatOf(first.op), isStuck: first.record.state === 'stuck' },
    }
  })
}

/** Ids of entities with a record the shop does not have yet. */
export const unsentIds = (records: readonly OutboxRecord[]): Map<Id, number> =>
  new Map(
    records
      .filter((record) => record.state !== 'taken' && record.state !== 'done')
      .map((record) => [record.entityId, record.dseq]),
  )
